// A ledger that fails at its n-th call, before or after the real one has stored: a full disk, or a process killed between
// commit and reply. Everything else goes through to the real ledger.
#pragma once

#include <memory>

#include "daemon/ledger/ledger.hpp"

namespace slipledger::testing {

enum class FailsWhen { before_storing, after_storing };
// The writer looks for closed hours of its own accord, sooner or later than the first batch comes: a test that wants a certain
// batch to fail counts storing alone.
enum class Counts { every_call, storing };

// Threads: one at a time, like the ledger it wraps.
class FailingLedger final : public ledger::Ledger {
    template <typename Call>
    auto counted(Call&& call) {
        const bool fails = ++calls_ == at_;
        if (fails && when_ == FailsWhen::before_storing) throw ledger::LedgerFailure("the disk is full (test)");
        auto result = call();
        if (fails) throw ledger::LedgerFailure("killed after the commit (test)");
        return result;
    }

public:
    // `at` counts from 1; later calls go through again.
    FailingLedger(std::unique_ptr<ledger::Ledger> real, int at, FailsWhen when, Counts counts = Counts::every_call)
        : real_(std::move(real)), at_(at), when_(when), counts_(counts) {}

    int calls() const { return calls_; }

    const ledger::Directory& directory() const override { return real_->directory(); }
    std::vector<ledger::IntakeOutcome> store(std::span<const ledger::IntakeBatch> batches) override {
        return counted([&] { return real_->store(batches); });
    }
    bool close_hours() override {
        if (counts_ == Counts::storing) return real_->close_hours();
        return counted([&] { return real_->close_hours(); });
    }
    bool store(const ledger::AnalysisResult& result) override {
        return counted([&] { return real_->store(result); });
    }
    std::int64_t store(const ledger::Event& event) override {
        return counted([&] { return real_->store(event); });
    }
    void store(std::span<const ledger::Notice> notices) override {
        counted([&] { return real_->store(notices), true; });
    }
    void store(std::span<const ledger::DeliveryUpdate> updates) override {
        counted([&] { return real_->store(updates), true; });
    }
    ledger::CopyStep begin_backup(const std::string& path) override {
        return counted([&] { return real_->begin_backup(path); });
    }

private:
    std::unique_ptr<ledger::Ledger> real_;
    int at_;
    FailsWhen when_;
    Counts counts_;
    int calls_ = 0;
};

}  // namespace slipledger::testing
