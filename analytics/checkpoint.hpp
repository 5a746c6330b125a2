// Puts down the exact state of an estimate as bytes and takes it up again. Every part names its fields once, in
// `each_field`, and both directions go through that list; no padding is written, so equal states are equal bytes.
// The bytes are for this machine's ledger, not for exchange: little endian, as in memory.
#pragma once

#include <array>
#include <cstddef>
#include <cstring>
#include <span>
#include <type_traits>
#include <utility>
#include <vector>

#include <Eigen/Core>

namespace slipledger::analytics {

template <typename T>
inline constexpr bool is_plain = std::is_trivially_copyable_v<T>&& std::has_unique_object_representations_v<T>;
template <>
inline constexpr bool is_plain<double> = true;

// Threads: one at a time.
class CheckpointWriter {
public:
    template <typename... Fields>
    void operator()(const Fields&... fields) {
        (put(fields), ...);
    }
    std::vector<std::byte> take() { return std::move(bytes_); }

private:
    template <typename T>
    void put(const T& field) {
        if constexpr (is_plain<T>) {
            append(&field, sizeof field);
        } else {
            T::each_field(field, *this);
        }
    }
    template <typename T, std::size_t N>
    void put(const std::array<T, N>& fields) {
        for (const T& field : fields) put(field);
    }
    template <int Rows, int Columns>
    void put(const Eigen::Matrix<double, Rows, Columns>& matrix) {
        append(matrix.data(), sizeof(double) * static_cast<std::size_t>(matrix.size()));
    }
    void append(const void* data, std::size_t size) {
        const auto at = bytes_.size();
        bytes_.resize(at + size);
        std::memcpy(bytes_.data() + at, data, size);
    }

    std::vector<std::byte> bytes_;
};

// Threads: one at a time.
class CheckpointReader {
public:
    explicit CheckpointReader(std::span<const std::byte> bytes) : left_(bytes) {}
    template <typename... Fields>
    void operator()(Fields&... fields) {
        (get(fields), ...);
    }
    // Everything was there, and nothing more.
    bool complete() const { return enough_ && left_.empty(); }

private:
    template <typename T>
    void get(T& field) {
        if constexpr (is_plain<T>) {
            fetch(&field, sizeof field);
        } else {
            T::each_field(field, *this);
        }
    }
    template <typename T, std::size_t N>
    void get(std::array<T, N>& fields) {
        for (T& field : fields) get(field);
    }
    template <int Rows, int Columns>
    void get(Eigen::Matrix<double, Rows, Columns>& matrix) {
        fetch(matrix.data(), sizeof(double) * static_cast<std::size_t>(matrix.size()));
    }
    void fetch(void* data, std::size_t size) {
        enough_ = enough_ && left_.size() >= size;
        if (!enough_) return;
        std::memcpy(data, left_.data(), size);
        left_ = left_.subspan(size);
    }

    std::span<const std::byte> left_;
    bool enough_ = true;
};

}  // namespace slipledger::analytics
