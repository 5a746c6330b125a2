#include "tools/plantsim/load.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <nlohmann/json.hpp>
#include <numbers>
#include <stdexcept>

#include "tools/plantsim/gap_sets.hpp"

namespace slipledger::plantsim {
namespace {

constexpr Millis lot = 45 * minute_ms;
constexpr std::size_t one_in_wears = 10;
constexpr double growth_per_day = 0.01;
constexpr double rated_bar = 280.0;
constexpr double setting_bar = 250.0;
constexpr std::size_t write_at = 1U << 20U;

double tenth(double value) {
    return std::round(value * 10.0) / 10.0;
}

std::ofstream open(const std::filesystem::path& file) {
    std::ofstream out(file, std::ios::binary);
    if (!out) throw std::runtime_error(fmt::format("{}: cannot write", file.string()));
    return out;
}

}  // namespace

LoadPlan::LoadPlan(std::size_t pumps, std::uint64_t seed)
    : gaps_(axial_piston_gaps()), production_(seed, "load/production"), noise_(seed, "load/noise") {
    const Chance size(seed, "load/size");
    for (std::size_t p = 0; p < pumps; ++p) {
        names_.push_back(fmt::format("load-{:03}", p + 1));
        sizes_.push_back(1.0 + 0.15 * size.normal(static_cast<std::int64_t>(p)));
    }
}

double LoadPlan::drain_lpm(std::size_t pump, double pressure_bar, double temperature_c, double speed_rpm,
                           Millis time) const {
    const double days = static_cast<double>(time % (30 * day_ms)) / static_cast<double>(day_ms);
    const double growth = pump % one_in_wears == 0 ? 1.0 + growth_per_day * days : 1.0;
    const Strain strain{
        .pressure_bar = pressure_bar, .speed_rpm = speed_rpm, .temperature_c = temperature_c, .growth = growth};
    double sum = 0.0;
    for (const Gap& gap : gaps_) sum += gap_flow_lpm(gap, oil_, strain, rated_bar);
    return sum * sizes_[pump];
}

Row LoadPlan::row(std::size_t pump, Millis time) const {
    const auto own = static_cast<std::int64_t>(pump) << 44;  // a stretch of the streams for each pump
    const auto noise = [&](int stream) { return noise_.normal(own + (time / second_ms) * 4 + stream); };
    const double draw = production_.uniform(own + time / lot);
    const bool holding = draw > 0.5;
    const double pressure = holding ? setting_bar - 1.5 : 120.0 + 180.0 * draw;
    const double hour = static_cast<double>(time % day_ms) / static_cast<double>(hour_ms);
    const double temperature = 46.0 + 4.0 * std::cos(2.0 * std::numbers::pi * (hour - 15.0) / 24.0);
    const double speed = 1500.0 - 18.0 * (holding ? 0.2 : 1.0) * pressure / rated_bar;

    Row row{.time = time, .pump = names_[pump]};
    row[Column::outlet_pressure] = tenth(pressure + 0.8 * noise(0));
    row[Column::shaft_speed] = std::round(speed + 0.6 * noise(1));
    const double drain = drain_lpm(pump, pressure, temperature, speed, time) + (holding ? 1.6 : 0.3);
    row[Column::case_drain_flow] = drain * (1.0 + 0.012 * noise(2));
    row[Column::fluid_temperature] = tenth(temperature + 0.1 * noise(3));
    return row;
}

void LoadPlan::write_plant(const std::filesystem::path& file, const std::string& listen,
                           const std::filesystem::path& folder) const {
    using Json = nlohmann::ordered_json;
    Json pumps = Json::array();
    for (const std::string& name : names_)
        pumps.push_back(
            Json{{"id", name},
                 {"name", name},
                 {"type", "axial-piston"},
                 {"control", "pressure-compensated"},
                 {"reservoir", "tank"},
                 {"displacement_cm3", 140.0},
                 {"rated", {{"pressure_bar", rated_bar}, {"speed_rpm", 1480.0}, {"fluid_temperature_c", 50.0}}},
                 {"compensator_bar", setting_bar},
                 {"drain", "external"}});
    const Json reservoir{{"id", "tank"}, {"fluid", "hydraulic-46"}};
    const Json by_tcp{{"id", "live"}, {"kind", "tcp"}, {"listen", listen}, {"format", "ndjson"}, {"reply", true}};
    const Json by_file{{"id", "files"}, {"kind", "drop"}, {"folder", (folder / "drop").string()}, {"format", "csv"}};
    const Json fluid{{"points", Json::array({Json{{"temperature_c", 40.0}, {"viscosity_cst", 46.0}},
                                             Json{{"temperature_c", 100.0}, {"viscosity_cst", 6.8}}})}};
    const Json plant{{"plant", "Load measurement (invented)"},
                     {"time_zone", "UTC"},
                     {"store", {{"path", (folder / "ledger.db").string()}}},
                     {"fluids", {{"hydraulic-46", fluid}}},
                     {"reservoirs", Json::array({reservoir})},
                     {"pumps", pumps},
                     {"feeds", Json::array({by_tcp, by_file})},
                     {"alerts", {{"log", (folder / "alerts.log").string()}}}};
    auto out = open(file);
    out << plant.dump(2) << '\n';
    if (!out.flush()) throw std::runtime_error(fmt::format("{}: cannot write", file.string()));
}

void write_load_csv(const LoadPlan& plan, Millis from, std::size_t rows, const std::filesystem::path& file) {
    const CsvLayout layout{
        .columns = {Column::outlet_pressure, Column::shaft_speed, Column::case_drain_flow, Column::fluid_temperature}};
    auto out = open(file);
    std::string text = csv_header(layout);
    for (std::size_t i = 0; i < rows; ++i) {
        const auto minute = static_cast<Millis>(i / plan.pumps());
        append_csv(text, plan.row(i % plan.pumps(), from + minute * minute_ms), layout);
        if (text.size() < write_at && i + 1 < rows) continue;
        out.write(text.data(), static_cast<std::streamsize>(text.size()));
        text.clear();
    }
    if (!out.flush()) throw std::runtime_error(fmt::format("{}: cannot write", file.string()));
}

}  // namespace slipledger::plantsim
