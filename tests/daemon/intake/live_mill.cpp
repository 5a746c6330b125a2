#include "tests/daemon/intake/live_mill.hpp"

#include <date/date.h>

#include <thread>
#include <utility>

namespace slipledger::intake {

using namespace std::chrono_literals;

namespace {

// The real ledger, but the first batches meet a full disk; what the writer does in between does not count.
// Threads: one at a time.
class FullDiskOnce final : public ledger::Ledger {
public:
    explicit FullDiskOnce(std::unique_ptr<ledger::Ledger> real) : real_(std::move(real)) {}

    const ledger::Directory& directory() const override { return real_->directory(); }
    std::vector<ledger::IntakeOutcome> store(std::span<const ledger::IntakeBatch> batches) override {
        if (!std::exchange(full_, false)) return real_->store(batches);
        throw ledger::LedgerFailure("the disk is full (test)");
    }
    bool close_hours() override { return real_->close_hours(); }
    bool store(const ledger::AnalysisResult& result) override { return real_->store(result); }
    std::int64_t store(const ledger::Event& event) override { return real_->store(event); }
    void store(std::span<const ledger::Notice> notices) override { real_->store(notices); }
    void store(std::span<const ledger::DeliveryUpdate> updates) override { real_->store(updates); }
    ledger::CopyStep begin_backup(const std::string& path) override { return real_->begin_backup(path); }

private:
    std::unique_ptr<ledger::Ledger> real_;
    bool full_ = true;
};

}  // namespace

void LiveMill::fill_the_disk_once() {
    writer_ = std::make_unique<ledger::Writer>(std::make_unique<FullDiskOnce>(ledger::open_ledger(plant_)), 1ms);
}

std::string csv_rows(int count) {
    std::string text = "time,pump,outlet_pressure\n";
    for (int i = 0; i < count; ++i)
        text += date::format("%FT%TZ", mill::noon() - 24h + std::chrono::seconds(i)) + ",press-1," +
                std::to_string(100 + i % 100) + "." + std::to_string(i / 100) + "\n";
    return text;
}

bool soon(const std::function<bool()>& done) {
    for (int i = 0; i < 2000; ++i) {
        if (done()) return true;
        std::this_thread::sleep_for(5ms);
    }
    return false;
}

}  // namespace slipledger::intake
