// A ledger that notes how long its transactions take: while one runs, readings wait for their reply.
#pragma once

#include <deque>
#include <memory>
#include <mutex>

#include "daemon/clock.hpp"
#include "daemon/ledger/ledger.hpp"

namespace slipledger {

// Threads: any thread may ask; the ledger's thread adds.
class CommitTimes {
public:
    struct Longest {
        double of_last_minute_ms = 0.0;
        double since_start_ms = 0.0;
    };

    void add(std::chrono::nanoseconds took);
    Longest longest() const;

private:
    struct Commit {
        std::chrono::nanoseconds ended;
        std::chrono::nanoseconds took;
    };
    static constexpr std::chrono::minutes window{1};

    mutable std::mutex mutex_;
    Stopwatch since_start_;
    std::chrono::nanoseconds longest_{0};
    std::deque<Commit> recent_;  // of the last minute: each longer than all after it
};

// Passes everything on to the real ledger. `times` must outlive it. Threads: one at a time.
class TimedLedger final : public ledger::Ledger {
public:
    TimedLedger(std::unique_ptr<ledger::Ledger> real, CommitTimes& times) : real_(std::move(real)), times_(times) {}

    const ledger::Directory& directory() const override { return real_->directory(); }
    std::vector<ledger::IntakeOutcome> store(std::span<const ledger::IntakeBatch> batches) override;
    bool close_hours() override;
    bool store(const ledger::AnalysisResult& result) override;
    std::int64_t store(const ledger::Event& event) override;
    void store(std::span<const ledger::Notice> notices) override;
    void store(std::span<const ledger::DeliveryUpdate> updates) override;
    ledger::CopyStep begin_backup(const std::string& path) override {
        return real_->begin_backup(path);
    }

private:
    std::unique_ptr<ledger::Ledger> real_;
    CommitTimes& times_;
};

}  // namespace slipledger
