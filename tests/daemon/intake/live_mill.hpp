// The mill of mill.hpp with a real ledger and a running writer in a folder of the test's own, and a clock that stands at noon.
#pragma once

#include <gtest/gtest.h>

#include <chrono>
#include <functional>
#include <memory>
#include <string>

#include "config/plant.hpp"
#include "daemon/intake/file_load.hpp"
#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/writer.hpp"
#include "tests/daemon/intake/mill.hpp"
#include "tests/support/manual_clock.hpp"
#include "tests/support/temp_folder.hpp"

namespace slipledger::intake {

// Threads: one at a time.
class LiveMill : public ::testing::Test {
protected:
    LiveMill() {
        plant_.name = "Mill";
        plant_.store.path = folder_ / "ledger.db";
        plant_.reservoirs.emplace_back().id = "tank";
        plant_.pumps = mill::pumps();
        for (auto& pump : plant_.pumps) pump.reservoir = "tank";
        plant_.feeds = {mill::ndjson_feed(), mill::csv_feed()};
        plant_.feeds[1].folder = folder_ / "drop";
    }

    ledger::Writer& writer() {
        if (!writer_) writer_ = std::make_unique<ledger::Writer>(ledger::open_ledger(plant_), std::chrono::milliseconds(1));
        return *writer_;
    }
    // Instead of writer(), before its first use: the first batches are not stored.
    void fill_the_disk_once();
    ledger::Reader reader() const { return ledger::Reader(plant_.store.path); }
    std::uint64_t stored_readings(const std::string& pump) {
        return reader().count(*writer().directory().point(pump, "")).readings;
    }
    FindReceipt find_receipt() const {
        return [path = plant_.store.path](std::string_view sha256) { return ledger::Reader(path).receipt(sha256); };
    }

    testing::TempFolder folder_;
    config::Plant plant_;
    support::ManualClock clock_{mill::noon()};
    std::unique_ptr<ledger::Writer> writer_;
};

// `count` rows of press-1, a second apart from noon of the day before on.
std::string csv_rows(int count);

// Looks every few milliseconds until `done`, at most ten seconds.
bool soon(const std::function<bool()>& done);

}  // namespace slipledger::intake
