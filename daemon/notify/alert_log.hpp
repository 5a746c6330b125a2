// The alert log: one JSON object a line, on disk when deliver() returns. A notice whose line is there already is not written
// twice, also after a crash between the line and the ledger's note of it.
#pragma once

#include <deque>
#include <mutex>
#include <set>
#include <string>

#include "daemon/notify/channel.hpp"

namespace slipledger::notify {

// Threads: any thread may call.
class AlertLog final : public Channel {
public:
    // std::system_error: cannot open or read it. A last line without its end is what a crash left: it is cut off.
    explicit AlertLog(std::string path);
    ~AlertLog() override;

    AlertLog(const AlertLog&) = delete;
    AlertLog& operator=(const AlertLog&) = delete;

    DeliveryOutcome deliver(const ledger::Notice& notice) override;
    void abandon() override {}

    // Closes the file and opens the path anew, for log rotation.
    void reopen();

private:
    void open();
    void read_tail();
    void remember(const std::string& id);

    std::mutex mutex_;
    std::string path_;
    int file_ = -1;
    std::set<std::string> written_;
    std::deque<std::string> order_;  // of `written_`, oldest first
};

}  // namespace slipledger::notify
