#include "daemon/watch/analyst.hpp"

#include <spdlog/spdlog.h>

#include <algorithm>

#include "daemon/watch/judge.hpp"

namespace slipledger::watch {
namespace {

constexpr int most_passes_to_wait = 64;

}  // namespace

Analyst::Analyst(const config::Plant& plant, ledger::Writer& writer, std::string ledger_path, AnalystPace pace)
    : plant_(plant), writer_(writer), ledger_path_(std::move(ledger_path)), pace_(pace) {
    writer_.on_marks([this] {
        const std::lock_guard lock(mutex_);
        ++raised_;
        changed_.notify_all();
    });
    thread_ = std::thread([this] { work(); });
}

Analyst::~Analyst() {
    writer_.on_marks({});
    {
        const std::lock_guard lock(mutex_);
        stop_ = true;
        changed_.notify_all();
    }
    thread_.join();
}

bool Analyst::wait_until_judged(std::chrono::milliseconds timeout) {
    std::unique_lock lock(mutex_);
    const std::uint64_t asked = ++asked_;
    changed_.notify_all();
    return changed_.wait_for(lock, timeout, [&] { return answered_ >= asked; });
}

void Analyst::work() {
    std::unique_lock lock(mutex_);
    while (wait_for_work(lock)) {
        const std::uint64_t asked = asked_;
        seen_ = raised_;
        lock.unlock();
        const bool nothing_left = pass();
        lock.lock();
        if (!nothing_left) continue;
        answered_ = asked;
        changed_.notify_all();
    }
}

// false: asked to stop.
bool Analyst::wait_for_work(std::unique_lock<std::mutex>& lock) {
    const auto has_work = [&] { return stop_ || raised_ != seen_ || asked_ != answered_; };
    if (retry_) changed_.wait_for(lock, pace_.retry, has_work);
    else changed_.wait(lock, has_work);
    if (!stop_ && asked_ == answered_ && raised_ != seen_) wait_for_quiet(lock);
    return !stop_;
}

void Analyst::wait_for_quiet(std::unique_lock<std::mutex>& lock) {
    const auto hurry = [&] { return stop_ || asked_ != answered_; };
    std::uint64_t raised = seen_;
    for (std::chrono::milliseconds waited{0}; raised != raised_ && waited < pace_.longest; waited += pace_.quiet) {
        raised = raised_;
        if (changed_.wait_for(lock, pace_.quiet, hurry)) return;
    }
}

// true: no mark was left to judge.
bool Analyst::pass() {
    std::vector<ledger::Mark> marks;
    try {
        if (!reader_) reader_.emplace(ledger_path_);
        marks = reader_->marks();
    } catch (const std::exception& failure) {
        spdlog::error("analysis cannot read the ledger: {}", failure.what());
        reader_.reset();
    }
    const bool nothing_left = reader_ && marks.empty();
    for (const ledger::Mark& mark : marks) {
        if (stopping()) return false;
        Failing& failing = failing_[mark.pump];
        if (failing.passes_to_wait > 0) --failing.passes_to_wait;
        else judge(mark);
    }
    const std::lock_guard lock(mutex_);
    const bool any_failing = std::ranges::any_of(failing_, [](const auto& pump) { return pump.second.failures > 0; });
    retry_ = !reader_ || any_failing;
    if (!marks.empty() && !any_failing) ++raised_;  // look again: what moved on meanwhile, or nothing
    return nothing_left;
}

void Analyst::judge(const ledger::Mark& mark) {
    try {
        writer_.store(judge_pump(*reader_, plant_, writer_.directory(), mark));  // moved on: still marked, found again
        failing_.erase(mark.pump);
    } catch (const std::exception& failure) {
        fail(mark.pump, failure.what());
    }
}

void Analyst::fail(ledger::PumpId pump, const char* what) {
    Failing& failing = failing_[pump];
    failing.failures = std::min(failing.failures + 1, 16);
    failing.passes_to_wait = std::min(1 << failing.failures, most_passes_to_wait);
    const auto& names = writer_.directory().pumps;
    const auto name = std::ranges::find(names, pump, [](const auto& entry) { return entry.second; });
    spdlog::error("pump {} could not be judged, tried again later: {}", name == names.end() ? "?" : name->first, what);
}

bool Analyst::stopping() {
    const std::lock_guard lock(mutex_);
    return stop_;
}

}  // namespace slipledger::watch
