// How long a row that comes eleven months late costs: a year of one section is stored and judged, one more row is
// stored in its second month, and what follows from it is judged anew. Prints the middle of some runs and ends 1 above
// 50 ms.
//
//   tools/measure/late-row        builds and runs it
#include <fmt/format.h>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <cstdlib>
#include <filesystem>
#include <numbers>
#include <string>
#include <vector>

#include "config/plant_reader.hpp"
#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/watch/judge.hpp"

namespace {

using namespace slipledger;
using namespace std::chrono_literals;
using analytics::Instant;
using analytics::Quantity;

constexpr double aim_ms = 50.0;
constexpr int days = 365;
constexpr int late_day = 31;  // that is eleven months before the end
constexpr int runs = 9;
constexpr auto sampling = 5min;
constexpr Instant year_begins{std::chrono::sys_days(std::chrono::January / 5 / 2026)};

constexpr const char* plant_file = R"({
  "plant": "one section", "time_zone": "Europe/Berlin",
  "reservoirs": [{"id": "tank", "fluid": "HLP 46"}],
  "pumps": [{"id": "press-1", "reservoir": "tank", "type": "axial-piston", "control": "fixed", "displacement_cm3": 71,
    "rated": {"pressure_bar": 280, "speed_rpm": 1480, "fluid_temperature_c": 50}}]
})";

config::Plant plant_in(const std::filesystem::path& folder) {
    config::PlantReading reading = config::read_plant(plant_file);
    if (!reading) {
        fmt::print(stderr, "late-row: {}\n", config::format_fault(reading.faults.front()));
        std::exit(3);
    }
    reading.plant->store.path = folder / "ledger.db";
    return *std::move(reading.plant);
}

// A pump that runs round the clock, the costliest case, and wears from its fourth month on.
ledger::Row row_at(ledger::PointId point, Instant at) {
    const double day = std::chrono::duration<double, std::ratio<86400>>(at - year_begins).count();
    const double pressure = 180.0 + 60.0 * std::sin(day * 106.0);
    const double temperature = 48.0 + 6.0 * std::sin(2.0 * std::numbers::pi * day) + 4.0 * std::sin(day / 60.0);
    const double ratio = 1.0 + std::fmax(0.0, day - 100.0) * 0.004;
    const double noise = 0.02 * std::sin(day * 7919.0);
    const double healthy = 2.0 * pressure / 210.0 * std::exp(0.035 * (temperature - 50.0)) + 0.3;
    ledger::Row row;
    row.time = at;
    row.point = point;
    row.feed = ledger::FeedId{1};
    const auto put = [&](Quantity quantity, double value) {
        row.present = static_cast<std::uint16_t>(row.present | 1U << index_of(quantity));
        row.value[index_of(quantity)] = std::round(value * 1000.0) / 1000.0;
    };
    put(Quantity::outlet_pressure, pressure);
    put(Quantity::shaft_speed, 1480.0 + std::sin(day * 977.0));
    put(Quantity::case_drain_flow, ratio * healthy * (1.0 + noise));
    put(Quantity::fluid_temperature, temperature);
    return row;
}

void store(ledger::Ledger& ledger, std::vector<ledger::Row> rows) {
    ledger::IntakeBatch batch;
    batch.sources = static_cast<std::uint32_t>(rows.size());
    for (std::uint32_t i = 0; i < batch.sources; ++i) rows[i].source = i;
    batch.rows = std::move(rows);
    ledger.store(std::vector{std::move(batch)});
    while (ledger.close_hours()) {
    }
}

void store_year(ledger::Ledger& ledger, ledger::PointId point) {
    for (int day = 0; day < days; ++day) {
        std::vector<ledger::Row> rows;
        for (Instant at = year_begins + 24h * day; at < year_begins + 24h * (day + 1); at += sampling)
            rows.push_back(row_at(point, at));
        store(ledger, std::move(rows));
    }
}

double ms_since(std::chrono::steady_clock::time_point begun) {
    return std::chrono::duration<double, std::milli>(std::chrono::steady_clock::now() - begun).count();
}

}  // namespace

int main() try {
    const std::filesystem::path folder =
        std::filesystem::temp_directory_path() / fmt::format("late-row-{}", std::rand());
    std::filesystem::create_directories(folder);
    const config::Plant plant = plant_in(folder);
    double middle = 0.0;
    {
        const auto ledger = ledger::open_ledger(plant);
        const ledger::Reader reader(plant.store.path);
        const ledger::PointId point = *ledger->directory().point("press-1", "");
        store_year(*ledger, point);
        for (auto marks = reader.marks(); !marks.empty(); marks = reader.marks())
            ledger->store(watch::judge_pump(reader, plant, ledger->directory(), marks.front()));
        store(*ledger, {row_at(point, year_begins + 24h * late_day + 12h + 2min)});
        const ledger::Mark mark = reader.marks().front();
        std::vector<double> took;
        for (int run = 0; run < runs; ++run) {
            const auto begun = std::chrono::steady_clock::now();
            const ledger::AnalysisResult result = watch::judge_pump(reader, plant, ledger->directory(), mark);
            took.push_back(ms_since(begun));
            if (run > 0) continue;
            std::size_t summaries = 0;
            for (const ledger::TrackResult& track : result.tracks) summaries += track.summaries.size();
            fmt::print("{} summaries and {} days judged anew\n", summaries, result.tracks.front().days.size());
        }
        std::ranges::sort(took);
        middle = took[took.size() / 2];
        const auto begun = std::chrono::steady_clock::now();
        ledger->store(watch::judge_pump(reader, plant, ledger->directory(), mark));
        fmt::print("judged in {:.1f} ms (fastest {:.1f}, slowest {:.1f}); judged and stored in {:.1f} ms\n", middle,
                   took.front(), took.back(), ms_since(begun));
    }
    std::filesystem::remove_all(folder);
    return middle < aim_ms ? 0 : 1;
} catch (const std::exception& failure) {
    fmt::print(stderr, "late-row: {}\n", failure.what());
    return 3;
}
