// A real ledger in a folder of its own, fed with the demo pumps' readings and judged by hand: what the end-to-end tests
// of the watch stand on.
#pragma once

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <functional>
#include <memory>
#include <span>
#include <string>
#include <vector>

#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/watch/judge.hpp"
#include "tests/daemon/watch/demo_pump.hpp"
#include "tests/support/temp_folder.hpp"

namespace slipledger::watch {

using namespace std::chrono_literals;
using analytics::Basis;
using ledger::Row;

// A ledger in a folder of its own, judged by hand.
class Mill {
    testing::TempFolder folder_;  // first: the plant lies in it

public:
    explicit Mill(std::vector<std::string> pumps = {"press-1"}, const std::function<void(config::Plant&)>& adjust = {})
        : plant(demo_plant(folder_.path().string(), pumps)) {
        if (adjust) adjust(plant);
        ledger_ = ledger::open_ledger(plant);
    }

    ledger::PointId point(const std::string& pump) { return *ledger_->directory().point(pump, ""); }

    void store(std::span<const Row> rows) {
        ledger::IntakeBatch batch;
        batch.rows.assign(rows.begin(), rows.end());
        batch.sources = static_cast<std::uint32_t>(rows.size());
        for (std::uint32_t i = 0; i < batch.sources; ++i) batch.rows[i].source = i;
        ledger_->store(std::vector{batch});
        while (ledger_->close_hours()) {
        }
    }

    void tell(const ledger::Event& event) { ledger_->store(event); }

    void judge() {
        const ledger::Reader reader(plant.store.path);
        for (int passes = 0; passes < 100; ++passes) {
            const auto marks = reader.marks();
            if (marks.empty()) return;
            // Not stored where an earlier one of these has just marked it anew: then the next round finds it.
            for (const ledger::Mark& mark : marks)
                ledger_->store(judge_pump(reader, plant, ledger_->directory(), mark));
        }
        FAIL() << "marks never come to an end";
    }

    ledger::TrackId track(const std::string& pump, Basis basis) {
        return ledger_->directory().track(pump, "A", basis).id;
    }
    std::vector<ledger::DayRecord> days(const std::string& pump, Basis basis = Basis::case_drain) {
        return ledger::Reader(plant.store.path).days(track(pump, basis), -1000000, 1000000);
    }
    std::vector<ledger::Notice> notices() { return ledger::Reader(plant.store.path).notices(""); }

    // Everything that is judged, to the last bit.
    std::string history() {
        const ledger::Reader reader(plant.store.path);
        std::string text;
        for (const ledger::TrackEntry& entry : ledger_->directory().tracks) {
            text += fmt::format("track {} {} {}\n", entry.pump_name, entry.section, name_of(entry.basis));
            for (const auto& day : reader.days(entry.id, -1000000, 1000000)) text += line(day);
            for (const auto& one : reader.summaries(entry.id, demo_begin - 24h, demo_begin + 24h * 400))
                text += line(one);
            for (const auto& change : reader.alarm_changes(entry.id)) text += line(change);
        }
        return text;
    }

    config::Plant plant;

private:
    static std::string line(const ledger::DayRecord& day) {
        const analytics::DayVerdict& v = day.verdict;
        return fmt::format("day {} {} life {} {} {} {} {:a} {:a} {:a} {:a} {:a} {:a} {:a} {:a}\n", v.day.date,
                           day.finished, v.life, name_of(v.baseline), name_of(v.level), name_of(v.reason),
                           v.leakage_ratio.value, v.leakage_ratio.low, v.leakage_ratio.high, v.efficiency.value,
                           v.excess_lpm, v.hours_in_hand.low, v.life_running_h, v.healthy.laminar);
    }
    static std::string line(const ledger::SummaryRecord& one) {
        return fmt::format("summary {} {} {} {:a} {:a} {:a} {:a}\n", one.summary.start.time_since_epoch().count(),
                           one.date, name_of(one.verdict.level), one.summary.judged[0].leakage_lpm,
                           one.verdict.leakage_ratio.value, one.verdict.filtered_ratio.value, one.summary.running_h);
    }
    static std::string line(const analytics::AlarmChange& change) {
        return fmt::format("alarm {} {} {} {} {}\n", name_of(change.rule), name_of(change.edge), name_of(change.level),
                           change.at.time_since_epoch().count(), change.began.time_since_epoch().count());
    }

    std::unique_ptr<ledger::Ledger> ledger_;
};

}  // namespace slipledger::watch
