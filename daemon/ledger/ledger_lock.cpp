#include "daemon/ledger/ledger_lock.hpp"

#include <fcntl.h>
#include <sys/file.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <cstring>

#include "daemon/ledger/ledger.hpp"

namespace slipledger::ledger {
namespace {

std::string holder(int file) {
    std::array<char, 32> text{};
    const ssize_t length = pread(file, text.data(), text.size(), 0);
    return length > 0 ? std::string(text.data(), static_cast<std::size_t>(length)) : "unknown";
}

}  // namespace

LedgerLock::LedgerLock(const std::string& ledger_path) {
    const std::string path = ledger_path + ".lock";
    file_ = open(path.c_str(), O_RDWR | O_CREAT | O_CLOEXEC, 0660);
    if (file_ < 0) throw LedgerFailure("cannot open " + path + ": " + std::strerror(errno));
    if (flock(file_, LOCK_EX | LOCK_NB) != 0) {
        const std::string by = holder(file_);
        close(file_);
        throw LedgerFailure("process " + by + " is writing to " + ledger_path +
                            " already: ask that daemon or command, or stop it first");
    }
    const std::string self = std::to_string(getpid());
    if (ftruncate(file_, 0) != 0 || pwrite(file_, self.data(), self.size(), 0) < 0) {
        const int reason = errno;  // a full disk: the lock holds all the same, only its holder would be "unknown"
        if (reason != ENOSPC) {
            close(file_);
            throw LedgerFailure("cannot write to " + path + ": " + std::strerror(reason));
        }
    }
}

LedgerLock::~LedgerLock() { close(file_); }

}  // namespace slipledger::ledger
