#include "tools/plantsim/weather.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace slipledger::plantsim {
namespace {

constexpr double turn = 2.0 * std::numbers::pi;
constexpr double coldest = 22.0 / 365.0;            // share of the year: 22 January
constexpr double heat_wave_middle = 208.0 / 365.0;  // the end of July
constexpr double heat_wave_width = 28.0 / 365.0;
constexpr double hottest_hour = 15.0;

}  // namespace

Weather::Weather(const Calendar& calendar, std::uint64_t seed) : calendar_(calendar), spells_(seed, "weather") {}

double Weather::season_c(Millis time) const {
    const double share = calendar_.season(time);
    const double heat_wave = std::exp(-std::pow((share - heat_wave_middle) / heat_wave_width, 2.0));
    return 6.0 - 13.0 * std::cos(turn * (share - coldest)) + 6.0 * heat_wave;
}

double Weather::outdoors_c(Millis time) const {
    const double hour = static_cast<double>(calendar_.local(time) % day_ms) / static_cast<double>(hour_ms);
    const double day = 4.0 * std::cos(turn * (hour - hottest_hour) / 24.0);
    return season_c(time) + day + 3.5 * spells_.wander(time, 5 * day_ms);
}

double Weather::hall_c(Millis time) const {
    return 18.0 + 0.75 * std::max(0.0, outdoors_c(time) - 7.0);
}

double Weather::water_c(Millis time) const {
    return 5.0 + 0.8 * std::max(0.0, season_c(time - 20 * day_ms) + 1.5 * spells_.wander(time, 9 * day_ms));
}

}  // namespace slipledger::plantsim
