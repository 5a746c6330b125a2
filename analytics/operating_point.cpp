#include "analytics/operating_point.hpp"

#include <algorithm>
#include <utility>

namespace slipledger::analytics {
namespace {

constexpr std::array<std::pair<Quantity, double OperatingPoint::*>, 8> joined_quantities{{
    {Quantity::outlet_pressure, &OperatingPoint::outlet_bar},
    {Quantity::case_pressure, &OperatingPoint::case_bar},
    {Quantity::inlet_pressure, &OperatingPoint::inlet_bar},
    {Quantity::shaft_speed, &OperatingPoint::speed_rpm},
    {Quantity::fluid_temperature, &OperatingPoint::temperature_c},
    {Quantity::stroke, &OperatingPoint::stroke},
    {Quantity::shaft_power, &OperatingPoint::power_kw},
    {Quantity::running, &OperatingPoint::running},
}};

std::size_t first_not_before(const Series& series, Instant time) {
    const auto found = std::lower_bound(series.times.begin(), series.times.end(), time);
    return static_cast<std::size_t>(found - series.times.begin());
}

bool still_stands(Instant taken, Instant time, Milliseconds hold) {
    return time - taken <= hold;
}

}  // namespace

Aligner::Aligner(const SectionReadings& readings, Basis basis, const Usual& usual, Instant from, Instant to)
    : flow_(readings[index_of(flow_quantity(basis))]) {
    next_ = first_not_before(flow_, from);
    end_ = first_not_before(flow_, to);
    for (const auto& [quantity, field] : joined_quantities) {
        const Series& series = readings[index_of(quantity)];
        if (series.times.empty()) continue;
        joined_[joined_count_++] = {.series = &series,
                                    .hold = hold_of(usual, quantity),
                                    .passed = first_not_before(series, from),
                                    .field = field};
    }
}

const OperatingPoint* Aligner::next() {
    if (next_ >= end_) return nullptr;
    point_.time = flow_.times[next_];
    point_.flow_lpm = flow_.values[next_];
    ++next_;
    for (std::size_t i = 0; i < joined_count_; ++i) {
        Joined& joined = joined_[i];
        const std::vector<Instant>& times = joined.series->times;
        while (joined.passed < times.size() && times[joined.passed] <= point_.time) ++joined.passed;
        const bool stands = joined.passed > 0 && still_stands(times[joined.passed - 1], point_.time, joined.hold);
        point_.*joined.field = stands ? joined.series->values[joined.passed - 1] : unknown;
    }
    return &point_;
}

std::vector<OperatingPoint> align(const SectionReadings& readings, Basis basis, const Usual& usual, Instant from,
                                  Instant to) {
    std::vector<OperatingPoint> points;
    Aligner aligner(readings, basis, usual, from, to);
    while (const OperatingPoint* point = aligner.next()) points.push_back(*point);
    return points;
}

std::vector<JoinedReading> readings_behind(const SectionReadings& readings, Basis basis, const Usual& usual,
                                           Instant time) {
    std::vector<JoinedReading> behind;
    const auto add = [&](Quantity quantity, Milliseconds hold) {
        const Series& series = readings[index_of(quantity)];
        const auto after = std::upper_bound(series.times.begin(), series.times.end(), time);
        if (after == series.times.begin() || !still_stands(*(after - 1), time, hold)) return;
        const auto last = static_cast<std::size_t>(after - series.times.begin()) - 1;
        behind.push_back(
            {.quantity = quantity, .taken = series.times[last], .value = series.values[last], .hold = hold});
    };
    add(flow_quantity(basis), Milliseconds{0});
    for (const auto& [quantity, field] : joined_quantities) add(quantity, hold_of(usual, quantity));
    return behind;
}

}  // namespace slipledger::analytics
