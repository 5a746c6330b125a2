#include "daemon/notify/alert_log.hpp"

#include <fcntl.h>
#include <spdlog/spdlog.h>
#include <sys/stat.h>
#include <unistd.h>

#include <algorithm>
#include <cerrno>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string_view>
#include <system_error>

namespace slipledger::notify {
namespace {

constexpr off_t tail_bytes = 1 << 20;         // far more than one batch of the outbox
constexpr std::size_t ids_remembered = 10000;  // far more than stand in the tail

std::system_error failed(const std::string& doing, const std::string& path) {
    return {errno, std::generic_category(), "cannot " + doing + " alert log " + path};
}

bool write_whole(int file, std::string_view text) {
    while (!text.empty()) {
        const ssize_t count = ::write(file, text.data(), text.size());
        if (count < 0 && errno == EINTR) continue;
        if (count < 0) return false;
        text.remove_prefix(static_cast<std::size_t>(count));
    }
    return true;
}

std::string id_of(const std::string& line) {
    const auto object = nlohmann::json::parse(line, nullptr, false);
    return object.is_object() ? object.value("id", "") : std::string();
}

}  // namespace

AlertLog::AlertLog(std::string path) : path_(std::move(path)) {
    open();
    read_tail();
}

AlertLog::~AlertLog() {
    if (file_ >= 0) ::close(file_);
}

void AlertLog::open() {
    file_ = ::open(path_.c_str(), O_RDWR | O_CREAT | O_APPEND | O_CLOEXEC, 0640);
    if (file_ < 0) throw failed("open", path_);
}

void AlertLog::read_tail() {
    struct stat facts {};
    if (::fstat(file_, &facts) != 0) throw failed("read", path_);
    const off_t from = std::max<off_t>(0, facts.st_size - tail_bytes);
    std::string tail(static_cast<std::size_t>(facts.st_size - from), '\0');
    const ssize_t count = ::pread(file_, tail.data(), tail.size(), from);
    if (count < 0) throw failed("read", path_);
    tail.resize(static_cast<std::size_t>(count));
    const std::size_t whole = tail.rfind('\n') + 1;  // npos + 1 is 0
    if (S_ISREG(facts.st_mode) && whole < tail.size() && ::ftruncate(file_, from + static_cast<off_t>(whole)) != 0)
        throw failed("mend", path_);
    std::istringstream lines(tail.substr(0, whole));
    for (std::string line; std::getline(lines, line);) remember(id_of(line));
}

void AlertLog::remember(const std::string& id) {
    if (id.empty() || !written_.insert(id).second) return;
    order_.push_back(id);
    if (order_.size() <= ids_remembered) return;
    written_.erase(order_.front());
    order_.pop_front();
}

DeliveryOutcome AlertLog::deliver(const ledger::Notice& notice) {
    const std::lock_guard lock(mutex_);
    if (written_.contains(notice.id)) return {};
    if (file_ < 0) return {Delivery::try_again, "alert log " + path_ + " is not open"};
    const off_t before = ::lseek(file_, 0, SEEK_END);
    const bool synced = write_whole(file_, notice.body + "\n") && ::fsync(file_) == 0;
    if (!synced) {
        const std::string error = failed("write", path_).what();
        if (before >= 0 && ::ftruncate(file_, before) != 0) spdlog::error("a torn line stays in alert log {}", path_);
        return {Delivery::try_again, error};
    }
    remember(notice.id);
    return {};
}

void AlertLog::reopen() {
    const std::lock_guard lock(mutex_);
    if (file_ >= 0) ::close(file_);
    file_ = -1;
    open();
}

}  // namespace slipledger::notify
