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
    writer_.on_marks([bell = bell_] { bell->ring(); });
    thread_ = std::thread([this] { work(); });
}

Analyst::~Analyst() {
    writer_.on_marks({});
    {
        const std::lock_guard lock(bell_->mutex);
        stop_ = true;
    }
    bell_->ring();
    thread_.join();
}

bool Analyst::wait_until_judged(std::chrono::milliseconds timeout) {
    std::unique_lock lock(bell_->mutex);
    const std::uint64_t asked = ++asked_;
    bell_->rung.notify_all();
    return bell_->rung.wait_for(lock, timeout, [&] { return answered_ >= asked; });
}

void Analyst::work() {
    std::unique_lock lock(bell_->mutex);
    while (wait_for_work(lock)) {
        const std::uint64_t asked = asked_;
        heard_ = bell_->rings;
        look_again_ = false;
        lock.unlock();
        const bool nothing_left = pass();
        lock.lock();
        if (!nothing_left) continue;
        answered_ = asked;
        bell_->rung.notify_all();
    }
}

// false: asked to stop.
bool Analyst::wait_for_work(std::unique_lock<std::mutex>& lock) {
    const auto has_work = [&] { return stop_ || look_again_ || bell_->rings != heard_ || asked_ != answered_; };
    if (retry_) bell_->rung.wait_for(lock, pace_.retry, [&] { return stop_; });  // what failed is not tried in a rush
    else bell_->rung.wait(lock, has_work);
    if (!stop_ && asked_ == answered_ && bell_->rings != heard_) wait_for_quiet(lock);
    return !stop_;
}

void Analyst::wait_for_quiet(std::unique_lock<std::mutex>& lock) {
    const auto hurry = [&] { return stop_ || asked_ != answered_; };
    std::uint64_t rings = heard_;
    for (std::chrono::milliseconds waited{0}; rings != bell_->rings && waited < pace_.longest; waited += pace_.quiet) {
        rings = bell_->rings;
        if (bell_->rung.wait_for(lock, pace_.quiet, hurry)) return;
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
    const std::lock_guard lock(bell_->mutex);
    const bool any_failing = std::ranges::any_of(failing_, [](const auto& pump) { return pump.second.failures > 0; });
    retry_ = !reader_ || any_failing;
    look_again_ = !marks.empty() && !any_failing;  // at what moved on meanwhile, or at nothing
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
    const std::lock_guard lock(bell_->mutex);
    return stop_;
}

}  // namespace slipledger::watch
