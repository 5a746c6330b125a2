#include "daemon/timed_ledger.hpp"

#include <algorithm>

namespace slipledger {
namespace {

// Adds the time from its making to its end, however the transaction ended. Threads: one.
class Timing {
public:
    explicit Timing(CommitTimes& times) : times_(times) {}
    ~Timing() { times_.add(took_.elapsed()); }
    Timing(const Timing&) = delete;
    Timing& operator=(const Timing&) = delete;

private:
    CommitTimes& times_;
    Stopwatch took_;
};

double in_ms(std::chrono::nanoseconds span) {
    return std::chrono::duration<double, std::milli>(span).count();
}

}  // namespace

void CommitTimes::add(std::chrono::nanoseconds took) {
    const std::lock_guard lock(mutex_);
    const std::chrono::nanoseconds now = since_start_.elapsed();
    longest_ = std::max(longest_, took);
    while (!recent_.empty() && recent_.back().took <= took) recent_.pop_back();
    recent_.push_back({now, took});
    while (recent_.front().ended < now - window) recent_.pop_front();
}

CommitTimes::Longest CommitTimes::longest() const {
    const std::lock_guard lock(mutex_);
    const std::chrono::nanoseconds from = since_start_.elapsed() - window;
    const auto longest = std::ranges::find_if(recent_, [&](const Commit& commit) { return commit.ended >= from; });
    return {longest == recent_.end() ? 0.0 : in_ms(longest->took), in_ms(longest_)};
}

std::vector<ledger::IntakeOutcome> TimedLedger::store(std::span<const ledger::IntakeBatch> batches) {
    const Timing timing(times_);
    return real_->store(batches);
}

bool TimedLedger::close_hours() {
    const Timing timing(times_);
    return real_->close_hours();
}

bool TimedLedger::store(const ledger::AnalysisResult& result) {
    const Timing timing(times_);
    return real_->store(result);
}

std::int64_t TimedLedger::store(const ledger::Event& event) {
    const Timing timing(times_);
    return real_->store(event);
}

void TimedLedger::store(std::span<const ledger::Notice> notices) {
    const Timing timing(times_);
    real_->store(notices);
}

void TimedLedger::store(std::span<const ledger::DeliveryUpdate> updates) {
    const Timing timing(times_);
    real_->store(updates);
}

}  // namespace slipledger
