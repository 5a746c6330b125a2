// One writer per ledger: an advisory lock on a file beside it, held as long as this object lives and given up by the system
// even when the process is killed. Readers do not need it.
#pragma once

#include <string>

namespace slipledger::ledger {

// Threads: one at a time.
class LedgerLock {
public:
    // Locks `<ledger>.lock`. Throws LedgerFailure that names the process to ask where another holds it.
    explicit LedgerLock(const std::string& ledger_path);
    ~LedgerLock();
    LedgerLock(LedgerLock&&) = delete;
    LedgerLock& operator=(LedgerLock&&) = delete;

private:
    int file_ = -1;
};

}  // namespace slipledger::ledger
