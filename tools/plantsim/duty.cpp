#include "tools/plantsim/duty.hpp"

#include <algorithm>
#include <array>
#include <cmath>

namespace slipledger::plantsim {
namespace {

constexpr Millis jam_slot = 20 * minute_ms;
constexpr double jam_share = 0.012;            // of slots in which the machine stands for a jam or a knife change
constexpr Millis lot = 100 * minute_ms;        // one product runs so long
constexpr Millis season_length = 91 * day_ms;  // orders change by the quarter
constexpr double closing_share = 0.05;         // of moments in which the machine opens or closes
constexpr double closing_pressure = 0.55;

// Streams of one Chance are told apart by where their indices lie.
constexpr std::int64_t product_stream = 1LL << 40;
constexpr std::int64_t hold_stream = 2LL << 40;
constexpr std::int64_t stroke_stream = 3LL << 40;
constexpr std::int64_t season_stream = 4LL << 40;
constexpr std::int64_t closing_stream = 5LL << 40;

}  // namespace

DutyPlan::DutyPlan(const PumpDrawing& pump, const Calendar& calendar, std::uint64_t seed)
    : pump_(pump), calendar_(calendar), stops_(seed, pump.id + "/stops") {
    for (const SectionDrawing& section : pump.sections)
        production_.emplace_back(seed, pump.id + "/" + section.id + "/production");
}

bool DutyPlan::running(Millis time) const {
    if (pump_.starts && time < *pump_.starts) return false;
    if (pump_.overhaul && time >= (*pump_.overhaul)[0] && time < (*pump_.overhaul)[1]) return false;
    if (calendar_.timetable(pump_.shifts, time) == Timetable::off) return false;
    return stops_.uniform(time / jam_slot) >= jam_share;
}

Demand DutyPlan::demand(std::size_t section, Millis time) const {
    if (!running(time)) return {};
    if (calendar_.timetable(pump_.shifts, time) == Timetable::pause)
        return {.doing = Doing::idling, .pressure_bar = pump_.idle_bar};
    return working(section, time);
}

// Thick boards, thin boards: what is ordered moves all pressures of a section for months.
double DutyPlan::season(std::size_t section, Millis time) const {
    constexpr std::array<double, 5> levels{0.90, 0.96, 1.0, 1.04, 1.08};
    const double draw = production_[section].uniform(season_stream + time / season_length);
    return levels[static_cast<std::size_t>(draw * static_cast<double>(levels.size()))];
}

Demand DutyPlan::working(std::size_t section, Millis time) const {
    const Chance& chance = production_[section];
    const std::int64_t slot = time / lot;
    const std::vector<double>& products = pump_.sections[section].product_bar;
    const double draw = chance.uniform(product_stream + slot);
    const double product = products[static_cast<std::size_t>(draw * static_cast<double>(products.size()))];
    const double heavier = 1.0 + total(pump_.troubles, TroubleKind::heavier_work, time);
    const double load_bar =
        product * season(section, time) * heavier * (1.0 + 0.025 * chance.wander(time, 12 * minute_ms));

    const bool closing = chance.uniform(closing_stream + time / minute_ms) < closing_share;
    if (closing) return {.doing = Doing::working, .pressure_bar = closing_pressure * load_bar};
    if (!pump_.compensator || chance.uniform(hold_stream + slot) >= pump_.compensator->hold_share)
        return {.doing = Doing::working, .pressure_bar = load_bar};

    const double stroke = 0.08 + 0.3 * chance.uniform(stroke_stream + time / (5 * minute_ms));
    const double setting = pump_.compensator->setting_bar + total(pump_.troubles, TroubleKind::compensator_moved, time);
    const double plateau = setting - pump_.compensator->droop_bar * stroke;
    return {.doing = Doing::holding, .pressure_bar = plateau + 0.4 * chance.wander(time, 2 * day_ms), .stroke = stroke};
}

}  // namespace slipledger::plantsim
