// An open file handed from one process to another over a Unix socket: whoever asks for a load opens the file with its own
// rights, and the daemon needs none.
#pragma once

#include <cstddef>
#include <span>
#include <string_view>
#include <utility>

namespace slipledger::intake {

// Owns one file handle. Threads: one at a time.
class PassedFile {
public:
    PassedFile() = default;
    explicit PassedFile(int file) : file_(file) {}
    ~PassedFile();
    PassedFile(PassedFile&& other) noexcept : file_(std::exchange(other.file_, -1)) {}
    PassedFile& operator=(PassedFile&& other) noexcept {
        std::swap(file_, other.file_);
        return *this;
    }

    int get() const { return file_; }
    explicit operator bool() const { return file_ >= 0; }

private:
    int file_ = -1;
};

struct ReceivedBytes {
    std::ptrdiff_t size = -1;  // as recvmsg: 0 at the end, -1 with errno
    PassedFile file;
};

// Does not wait.
ReceivedBytes receive_with_file(int socket, std::span<char> space);

// Sends all of `text`, with `file` along; false with errno where it cannot.
bool send_with_file(int socket, std::string_view text, int file);

}  // namespace slipledger::intake
