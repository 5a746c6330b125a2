// The thread that judges. It sleeps until the writer says that marks were raised, takes them one pump after another on a
// reader of its own, and hands each result to the writer, which stores it only if nothing new came for that pump meanwhile;
// else the pump is judged again. Used by the daemon and by `slipledger load` alike.
#pragma once

#include <chrono>
#include <map>
#include <memory>
#include <mutex>
#include <optional>
#include <string>
#include <thread>

#include "config/plant.hpp"
#include "daemon/bell.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/writer.hpp"

namespace slipledger::watch {

// How long marks may rest, so that a flood of rows is judged once and not over and over. Threads: a value, share freely.
struct AnalystPace {
    std::chrono::milliseconds quiet{300};      // judged when no mark was raised for so long,
    std::chrono::milliseconds longest{10000};  // but no later than this after the first
    std::chrono::milliseconds retry{1000};     // how soon a pump that could not be judged is tried again, at first
};

// Threads: any thread may call; owns the analysis thread.
class Analyst {
public:
    // `plant` and `writer` must outlive it. Starts at once on whatever marks are there.
    Analyst(const config::Plant& plant, ledger::Writer& writer, std::string ledger_path, AnalystPace pace = {});
    ~Analyst();  // the pump at hand is finished, the rest stays marked

    Analyst(const Analyst&) = delete;
    Analyst& operator=(const Analyst&) = delete;

    // Judges without resting and waits until no mark was left; false: not within `timeout`.
    bool wait_until_judged(std::chrono::milliseconds timeout);

private:
    // A pump that could not be judged: left alone for ever more passes, so that it neither floods the log nor holds up others.
    struct Failing {
        int failures = 0;
        int passes_to_wait = 0;
    };

    void work();
    bool wait_for_work(std::unique_lock<std::mutex>& lock);
    void wait_for_quiet(std::unique_lock<std::mutex>& lock);
    bool pass();
    void judge(const ledger::Mark& mark);
    void fail(ledger::PumpId pump, const char* what);
    bool stopping();

    const config::Plant& plant_;
    ledger::Writer& writer_;
    std::string ledger_path_;
    AnalystPace pace_;
    std::optional<ledger::Reader> reader_;  // analysis thread only, as the next
    std::map<ledger::PumpId, Failing> failing_;

    std::shared_ptr<Bell> bell_ = std::make_shared<Bell>();  // its mutex guards all below
    std::uint64_t heard_ = 0;     // rings before the newest pass
    bool look_again_ = true;      // at start: marks may be left from before
    std::uint64_t asked_ = 0;     // looks asked for by wait_until_judged
    std::uint64_t answered_ = 0;  // the newest of them after which no mark was left
    bool retry_ = false;          // a pump waits to be tried again
    bool stop_ = false;
    std::thread thread_;  // last: everything above is there when it starts
};

}  // namespace slipledger::watch
