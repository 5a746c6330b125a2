#include "daemon/intake/file_load.hpp"

#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

#include <algorithm>
#include <array>
#include <cerrno>
#include <condition_variable>
#include <cstring>
#include <filesystem>
#include <memory>
#include <mutex>
#include <system_error>
#include <utility>

#include <date/date.h>
#include <nlohmann/json.hpp>

#include "daemon/intake/row_reader.hpp"
#include "daemon/intake/sha256.hpp"

namespace slipledger::intake {
namespace {

constexpr std::size_t piece_bytes = 1 << 20;
constexpr std::size_t rows_of_batch = 32768;  // an hour block is rewritten once per batch that touches it
constexpr std::size_t most_on_their_way = 3;  // batches

// The bytes of a file up to the size it had when opened.
class FileBytes {
public:
    explicit FileBytes(int file) : file_(file), buffer_(piece_bytes) {
        struct stat facts {};
        if (::fstat(file, &facts) != 0) throw std::system_error(errno, std::generic_category(), "cannot be read");
        if (!S_ISREG(facts.st_mode)) throw std::system_error(EINVAL, std::generic_category(), "is not a regular file");
        size_ = static_cast<std::uint64_t>(facts.st_size);
    }

    std::uint64_t size() const { return size_; }
    std::uint64_t at() const { return at_; }
    void rewind() { at_ = 0; }

    std::string_view next() {
        const std::size_t wanted = static_cast<std::size_t>(std::min<std::uint64_t>(buffer_.size(), size_ - at_));
        ssize_t got = 0;
        do got = ::pread(file_, buffer_.data(), wanted, static_cast<off_t>(at_));
        while (got < 0 && errno == EINTR);
        if (got < 0) throw std::system_error(errno, std::generic_category(), "cannot be read");
        if (got == 0 && wanted > 0) throw std::system_error(EIO, std::generic_category(), "became shorter while it was read");
        at_ += static_cast<std::uint64_t>(got);
        return std::string_view(buffer_.data(), static_cast<std::size_t>(got));
    }

private:
    int file_;
    std::vector<char> buffer_;
    std::uint64_t size_ = 0;
    std::uint64_t at_ = 0;
};

std::string sha256_of(FileBytes& bytes) {
    Sha256 hash;
    for (bytes.rewind(); bytes.at() < bytes.size();) {
        const std::string_view piece = bytes.next();
        hash.add(std::span<const char>(piece.data(), piece.size()));
    }
    bytes.rewind();
    return hash.digest();
}

// What the ledger said of the batches so far. Shared with the writer's callbacks, which may come after a failed load.
// Threads: any.
class Tally {
public:
    void sent() {
        std::unique_lock lock(mutex_);
        changed_.wait(lock, [&] { return on_their_way_ < most_on_their_way; });
        ++on_their_way_;
    }
    void committed(const ledger::IntakeOutcome& outcome) {
        const std::lock_guard lock(mutex_);
        --on_their_way_;
        stored_ += outcome.stored;
        repeated_ += outcome.repeated;
        if (outcome.failed) failure_ = outcome.failure.empty() ? "could not be stored" : outcome.failure;
        changed_.notify_all();
    }
    void wait_for_all() {
        std::unique_lock lock(mutex_);
        changed_.wait(lock, [&] { return on_their_way_ == 0; });
    }
    std::uint64_t stored() const { return locked(stored_); }
    std::uint64_t repeated() const { return locked(repeated_); }
    std::string failure() const { return locked(failure_); }

private:
    template <class T>
    T locked(const T& value) const {
        const std::lock_guard lock(mutex_);
        return value;
    }

    mutable std::mutex mutex_;
    std::condition_variable changed_;
    std::size_t on_their_way_ = 0;
    std::uint64_t stored_ = 0;
    std::uint64_t repeated_ = 0;
    std::string failure_;
};

// Threads: one at a time.
class Load {
public:
    Load(FileBytes& bytes, const std::string& name, const LoadWorld& world)
        : bytes_(bytes), world_(world), reader_(world.mapping, ReadOptions{name + " ", rows_of_batch, true}) {
        outcome_.receipt.feed = world.mapping.feed_id();
        outcome_.receipt.file = name;
    }

    LoadOutcome run(std::string sha256) {
        outcome_.receipt.sha256 = std::move(sha256);
        while (bytes_.at() < bytes_.size() && !reader_.hopeless()) {
            if (world_.stop != nullptr && *world_.stop) return ended(LoadEnd::stopped);
            if (!read_piece(bytes_.next())) return ended(LoadEnd::failed);
            if (world_.progress) world_.progress(LoadProgress{bytes_.at(), bytes_.size(), outcome_.receipt.rows});
        }
        reader_.finish(world_.clock.now());
        return close();
    }

private:
    bool read_piece(std::string_view piece) {
        while (!piece.empty() && !reader_.hopeless()) {
            reader_.read(piece, world_.clock.now());
            if (reader_.full()) submit(reader_.take());
        }
        return tally_->failure().empty();
    }

    // The last rows, with the receipt, once it is known what became of those before.
    LoadOutcome close() {
        tally_->wait_for_all();
        if (!tally_->failure().empty()) return ended(LoadEnd::failed);
        ReadBatch last = reader_.take();
        account(last);
        ledger::Receipt receipt = outcome_.receipt;
        receipt.taken = world_.clock.now();
        receipt.stored = tally_->stored();
        receipt.repeated = tally_->repeated();
        outcome_.receipt.taken = receipt.taken;
        last.batch.receipt = std::move(receipt);
        hand_over(std::move(last.batch));
        return ended(LoadEnd::taken);
    }

    LoadOutcome ended(LoadEnd end) {
        tally_->wait_for_all();
        outcome_.failure = tally_->failure();
        outcome_.end = outcome_.failure.empty() ? end : LoadEnd::failed;
        outcome_.receipt.stored = tally_->stored();
        outcome_.receipt.repeated = tally_->repeated();
        return std::move(outcome_);
    }

    void submit(ReadBatch read) {
        account(read);
        hand_over(std::move(read.batch));
    }

    void account(const ReadBatch& read) {
        outcome_.receipt.refused += read.account.refused;
        outcome_.receipt.rows += read.batch.sources + read.account.refused;
        outcome_.newest = std::max(outcome_.newest, read.account.newest);
        outcome_.more_faults += read.account.more_faults;
        for (const LineFault& fault : read.account.faults) {
            if (outcome_.faults.size() < BatchBuilder::most_faults) outcome_.faults.push_back(fault);
            else ++outcome_.more_faults;
        }
    }

    void hand_over(ledger::IntakeBatch batch) {
        tally_->sent();
        world_.writer.submit(std::move(batch), [tally = tally_](const ledger::IntakeOutcome& outcome) { tally->committed(outcome); });
    }

    FileBytes& bytes_;
    const LoadWorld& world_;
    RowReader reader_;
    LoadOutcome outcome_;
    std::shared_ptr<Tally> tally_ = std::make_shared<Tally>();
};

LoadOutcome could_not(const std::string& name, std::string failure) {
    LoadOutcome outcome;
    outcome.receipt.file = name;
    outcome.failure = std::move(failure);
    return outcome;
}

}  // namespace

LoadOutcome load_file(int file, const std::string& name, const LoadWorld& world) try {
    FileBytes bytes(file);
    std::string sha256 = sha256_of(bytes);
    // A file of which nothing was taken is read again: the feed's entry may have been mended since.
    const auto before = world.find_receipt && !world.again ? world.find_receipt(sha256) : std::nullopt;
    if (before && before->stored + before->repeated > 0) {
        LoadOutcome outcome;
        outcome.end = LoadEnd::already_taken;
        outcome.receipt = *before;
        return outcome;
    }
    return Load(bytes, name, world).run(std::move(sha256));
} catch (const std::system_error& error) {
    return could_not(name, error.what());
}

LoadOutcome load_path(const std::string& path, const LoadWorld& world) {
    const std::string name = std::filesystem::path(path).filename();
    const int file = ::open(path.c_str(), O_RDONLY | O_CLOEXEC | O_NONBLOCK);
    if (file < 0) return could_not(name, std::string("cannot be opened: ") + std::strerror(errno));
    LoadOutcome outcome = load_file(file, name, world);
    ::close(file);
    return outcome;
}

std::optional<config::Feed> feed_for_load(const std::vector<config::Feed>& feeds, const std::string& feed_id,
                                          const std::string& file, const std::string& time_zone) {
    if (!feed_id.empty()) {
        const auto found = std::find_if(feeds.begin(), feeds.end(), [&](const auto& feed) { return feed.id == feed_id; });
        return found == feeds.end() ? std::nullopt : std::optional(*found);
    }
    const std::string ending = std::filesystem::path(file).extension();
    config::Feed plain;
    plain.id = "command";
    plain.time.zone = time_zone;
    const bool json = ending == ".ndjson" || ending == ".jsonl" || ending == ".json";
    plain.format = json ? config::FeedFormat::ndjson : config::FeedFormat::csv;
    return plain;
}

std::string receipt_json(const LoadOutcome& outcome, const std::string& feed) {
    const ledger::Receipt& receipt = outcome.receipt;
    nlohmann::ordered_json json;
    json["file"] = receipt.file;
    json["sha256"] = receipt.sha256;
    json["feed"] = feed;
    json["taken"] = date::format("%FT%TZ", receipt.taken);
    json["already_taken"] = outcome.end == LoadEnd::already_taken;
    json["rows"] = receipt.rows;
    json["stored"] = receipt.stored;
    json["repeated"] = receipt.repeated;
    json["refused"] = receipt.refused;
    json["faults"] = nlohmann::ordered_json::array();
    for (const LineFault& fault : outcome.faults) json["faults"].push_back({{"line", fault.line}, {"reason", fault.reason}});
    if (outcome.more_faults > 0) json["more_faults"] = outcome.more_faults;
    return json.dump(2, ' ', false, nlohmann::ordered_json::error_handler_t::replace) + "\n";
}

}  // namespace slipledger::intake
