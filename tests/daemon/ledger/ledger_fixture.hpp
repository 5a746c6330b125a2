// A small plant, its ledger in a folder of the test's own, and readings said in one line.
#pragma once

#include <gtest/gtest.h>

#include <algorithm>
#include <memory>
#include <random>
#include <string>
#include <vector>

#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "tests/support/temp_folder.hpp"

namespace slipledger::ledger {

using analytics::Quantity;
using namespace std::chrono_literals;

inline constexpr Instant day_one{std::chrono::sys_days(std::chrono::January / 5 / 2026)};

struct Told {
    Quantity quantity;
    double value;
};

inline Row row_of(PointId point, Instant time, std::vector<Told> told, FeedId feed = FeedId{1}) {
    Row row;
    row.time = time;
    row.point = point;
    row.feed = feed;
    for (const Told& cell : told) {
        row.present = static_cast<std::uint16_t>(row.present | 1U << analytics::index_of(cell.quantity));
        row.value[analytics::index_of(cell.quantity)] = cell.value;
    }
    return row;
}

inline IntakeBatch batch_of(std::vector<Row> rows) {
    IntakeBatch batch;
    batch.rows = std::move(rows);
    batch.sources = static_cast<std::uint32_t>(batch.rows.size());
    for (std::uint32_t i = 0; i < batch.sources; ++i) batch.rows[i].source = i;
    return batch;
}

class LedgerTest : public ::testing::Test {
protected:
    LedgerTest() {
        plant_.name = "Veneer mill";
        plant_.store.path = folder_ / "ledger.db";
        plant_.lateness = 10min;
        plant_.alerts.log = folder_ / "alerts.log";
        plant_.reservoirs.push_back({.id = "tank-1", .name = "Tank 1", .fluid = {}, .volume_l = {}});
        for (const char* id : {"press-1", "press-2", "lathe"}) add_pump(id, {"A"});
        add_pump("double", {"P1", "P2"});
        for (const char* id : {"plc", "lab"}) {
            config::Feed feed;
            feed.id = id;
            plant_.feeds.push_back(feed);
        }
    }

    void add_pump(const std::string& id, const std::vector<std::string>& sections) {
        config::Pump pump;
        pump.id = id;
        pump.reservoir = "tank-1";
        for (const std::string& section : sections) {
            config::Section made;
            made.id = section;
            pump.sections.push_back(made);
        }
        plant_.pumps.push_back(pump);
    }

    Ledger& ledger() {
        if (!ledger_) ledger_ = open_ledger(plant_);
        return *ledger_;
    }
    void close() { ledger_.reset(); }

    Reader reader() const { return Reader(plant_.store.path); }
    PointId point(const std::string& pump, const std::string& section = "") {
        return *ledger().directory().point(pump, section);
    }
    PumpId pump(const std::string& id) { return ledger().directory().pumps.at(id); }

    IntakeOutcome store(std::vector<Row> rows) {
        const std::vector<IntakeBatch> batches{batch_of(std::move(rows))};
        return ledger().store(batches).front();
    }
    void close_all_hours() {
        while (ledger().close_hours()) {
        }
    }

    testing::TempFolder folder_;
    config::Plant plant_;
    std::unique_ptr<Ledger> ledger_;
};

}  // namespace slipledger::ledger
