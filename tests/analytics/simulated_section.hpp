// Hour summaries of one invented section, made point by point from physics that is not the filter's own model: laminar
// leakage bends with pressure, its oil warms in the gap, the thermometer and the operation drift together over days.
// For tests of the filter and the course; readings and regimes have tests of their own.
#pragma once

#include <cmath>
#include <cstdint>
#include <functional>
#include <numbers>
#include <random>
#include <vector>

#include "analytics/course.hpp"
#include "analytics/leakage.hpp"

namespace slipledger::analytics::testing {

// What the instruments show at one point.
struct Shown {
    double flow_lpm;
    double pressure_bar;
    double speed_rpm;
    double temperature_c;
};

struct SimulatedSection {
    std::uint32_t seed = 1;
    Basis basis = Basis::case_drain;
    int days = 365;
    std::function<double(double running_h)> ratio = [](double) { return 1.0; };
    double point_noise = 0.015;   // of leakage, by drain; of delivery a tenth of it
    double season_c = 8.0;        // amplitude of the oil's temperature over the year
    std::function<double(double running_h)> heat = [](double) { return 0.0; };  // K more than the season's
    double slow_sd = 0.02;        // of ln leakage, over some ten days: production, thermometer, ageing oil
    double pressure_shift = 1.0;  // factor on pressure in the second half
    double plate_error = 0.01;    // name plate over true displacement, less one
    double meter_gain = 1.0;      // of the drain meter: what it shows over what flows
    Fluid oil{};                  // in the machine
    Fluid told_oil{};             // in the plant file
    // What the instruments make of it, point by point, and what else happens to the hour before it is looked at.
    std::function<void(Shown& point, double running_h)> instruments = [](Shown&, double) {};
    std::function<void(Summary& hour, double running_h)> spoil = [](Summary&, double) {};

    SectionSpec spec() const {
        SectionSpec s;
        s.displacement_cm3 = 71.0;
        s.rated = {.pressure_bar = 280.0, .speed_rpm = 1480.0, .temperature_c = 50.0};
        s.reference = {.pressure_bar = 210.0, .speed_rpm = 1480.0, .temperature_c = 50.0};
        s.drain_meter = {.accuracy_lpm = 0.02, .gain_error = 0.01, .resolution_lpm = 0.01};
        s.delivery_meter = {.accuracy_lpm = 0.2, .gain_error = 0.005, .resolution_lpm = 0.05};
        s.spare_lead_days = 42.0;
        s.fluid = told_oil;
        return s;
    }
};

// Day 0 begins here; a Monday.
inline const Instant simulation_start = std::chrono::sys_days{std::chrono::year{2026} / 1 / 5};

inline DaySpan simulated_day(int day) {
    const Instant begin = simulation_start + std::chrono::hours(24 * day);
    return {.date = static_cast<std::int32_t>(begin.time_since_epoch() / std::chrono::hours(24)),
            .begin = begin,
            .end = begin + std::chrono::hours(24)};
}

struct SimulatedHour {
    Summary summary;
    int day = 0;
    double true_ratio = 1.0;
};

// Sums of the points of one hour, turned into moments.
// Threads: one at a time.
class MomentsOf {
public:
    void add(double leakage, const Features& f, double dp, double temperature, double viscosity, double speed) {
        const double v[4] = {leakage, f.laminar, f.orifice, f.speed};
        ++count_;
        for (int i = 0; i < 4; ++i) {
            mean_[i] += v[i];
            for (int j = 0; j <= i; ++j) square_[i * (i + 1) / 2 + j] += v[i] * v[j];
        }
        dp_ += dp;
        dp2_ += dp * dp;
        temperature_ += temperature;
        viscosity_ += viscosity;
        speed_ += speed;
    }

    Moments moments(double point_sd) const {
        Moments m;
        const double n = count_;
        m.count = count_;
        m.leakage_lpm = mean_[0] / n;
        for (int i = 0; i < 4; ++i) {
            if (i > 0) m.feature[static_cast<std::size_t>(i - 1)] = mean_[i] / n;
            for (int j = 0; j <= i; ++j)
                m.covariance[static_cast<std::size_t>(i * (i + 1) / 2 + j)] =
                    square_[i * (i + 1) / 2 + j] / n - mean_[i] * mean_[j] / n / n;
        }
        m.standard_error_lpm = point_sd / std::sqrt(n);
        m.dp_bar = dp_ / n;
        m.dp_variance = std::fmax(dp2_ / n - m.dp_bar * m.dp_bar, 0.0);
        m.temperature_c = temperature_ / n;
        m.viscosity_cst = viscosity_ / n;
        m.speed_rpm = speed_ / n;
        return m;
    }

private:
    std::uint32_t count_ = 0;
    double mean_[4] = {};
    double square_[10] = {};
    double dp_ = 0.0, dp2_ = 0.0, temperature_ = 0.0, viscosity_ = 0.0, speed_ = 0.0;
};

// One of six points into what an hour's instruments showed.
inline void show(Summary& hour, const Shown& point) {
    const auto widen = [](Extent& extent, double value) {
        extent = {.low = std::fmin(extent.low, value), .high = std::fmax(extent.high, value)};
    };
    const auto add = [](double& mean, double value) { mean = (std::isnan(mean) ? 0.0 : mean) + value / 6.0; };
    widen(hour.flow_lpm, point.flow_lpm);
    widen(hour.pressure_bar, point.pressure_bar);
    widen(hour.speed_rpm, point.speed_rpm);
    widen(hour.temperature_c, point.temperature_c);
    add(hour.mean_flow_lpm, point.flow_lpm);
    add(hour.mean_pressure_bar, point.pressure_bar);
    add(hour.mean_speed_rpm, point.speed_rpm);
    add(hour.mean_temperature_c, point.temperature_c);
}

// Two shifts, 06 to 22 h, Monday to Saturday; six points an hour.
inline std::vector<SimulatedHour> simulate(const SimulatedSection& section) {
    const SectionSpec spec = section.spec();
    const LeakageState reference = reference_state(spec);
    const LeakageState true_reference = reference_state(SimulatedSection{}.spec());
    std::mt19937 random(section.seed);
    std::normal_distribution<double> normal;
    std::vector<SimulatedHour> hours;
    double slow = 0.0;
    double running_h = 0.0;
    const bool by_delivery = section.basis == Basis::delivery;
    for (int day = 0; day < section.days; ++day) {
        const double keep = std::exp(-1.0 / 10.0);
        slow = keep * slow + section.slow_sd * std::sqrt(1.0 - keep * keep) * normal(random);
        if (day % 7 == 6) continue;
        const double season = section.season_c * std::sin(2.0 * std::numbers::pi * (day - 100) / 365.0);
        const double shift = day >= section.days / 2 ? section.pressure_shift : 1.0;
        for (int hour = 6; hour < 22; ++hour) {
            SimulatedHour made;
            made.day = day;
            made.true_ratio = section.ratio(running_h);
            MomentsOf sums;
            const double warm = 48.0 + season + section.heat(running_h) + 4.0 * (1.0 - std::exp(-(hour - 6) / 2.0)) + 0.8 * normal(random);
            const double load = 0.9 + 0.1 * std::sin(hour * 0.7) + 0.05 * normal(random);
            double noise_sd = 0.0;
            double delivered = 0.0;
            double theoretical = 0.0;
            for (int point = 0; point < 6; ++point) {
                const double dp = shift * 190.0 * load * (point % 2 == 0 ? 1.12 : 0.85) + 2.0 * normal(random);
                const double temperature = warm + 0.2 * normal(random);
                const double speed = 1480.0 - 8.0 * dp / 280.0 + normal(random);
                const auto state_of = [](const Fluid& fluid, double at_bar, double at_rpm, double at_c) {
                    return LeakageState{.pressure_rise_bar = at_bar,
                                        .viscosity_pas = fluid.dynamic_pas(at_c),
                                        .density_kgm3 = fluid.density_kgm3(at_c),
                                        .speed_rpm = at_rpm};
                };
                const auto features = [&](double at_bar, double at_rpm, double at_c) {
                    return features_at(state_of(spec.fluid, at_bar, at_rpm, at_c), reference);
                };
                const Features t = features_at(state_of(section.oil, dp, speed, temperature), true_reference);
                const double healthy = 2.2 * std::pow(t.laminar, 0.97) + 0.30 * t.orifice + 0.10 * t.speed;
                const double worn = made.true_ratio * std::exp(slow) * healthy;
                const double flow = spec.displacement_cm3 * speed / 1000.0;
                noise_sd = by_delivery ? 0.1 * section.point_noise * flow : section.point_noise * worn;
                double seen = section.meter_gain * (worn + noise_sd * normal(random));
                if (by_delivery) seen += flow * section.plate_error / (1.0 + section.plate_error);
                Shown shown{by_delivery ? flow - seen : seen, dp, speed, temperature};
                section.instruments(shown, running_h);
                const double plate = spec.displacement_cm3 * shown.speed_rpm / 1000.0;
                sums.add(by_delivery ? plate - shown.flow_lpm : shown.flow_lpm,
                         features(shown.pressure_bar, shown.speed_rpm, shown.temperature_c), shown.pressure_bar,
                         shown.temperature_c, spec.fluid.kinematic_cst(shown.temperature_c), shown.speed_rpm);
                show(made.summary, shown);
                delivered += by_delivery ? shown.flow_lpm / 6.0 : 0.0;
                theoretical += plate / 6.0;
            }
            Summary& s = made.summary;
            s.start = simulation_start + std::chrono::hours(24 * day + hour);
            s.length = std::chrono::hours(1);
            s.basis = section.basis;
            s.running_h = s.judged_h = 1.0;
            s.counts[static_cast<std::size_t>(Standing::full_flow)] = 6;
            s.judged[0] = sums.moments(noise_sd);
            s.judged[0].delivery_lpm = delivered;
            s.judged[0].theoretical_lpm = theoretical;
            if (!by_delivery) s.drain_share = s.mean_flow_lpm / theoretical;
            section.spoil(s, running_h);
            running_h += 1.0;
            hours.push_back(made);
        }
    }
    return hours;
}

// Feeds all hours through a course, each day finished in its turn, and gives the days.
inline std::vector<DayVerdict> run_course(Course& course, const std::vector<SimulatedHour>& hours, int first_day,
                                          int end_day) {
    std::vector<DayVerdict> days;
    auto hour = hours.begin();
    while (hour != hours.end() && hour->day < first_day) ++hour;
    for (int day = first_day; day < end_day; ++day) {
        for (; hour != hours.end() && hour->day == day; ++hour) course.take(hour->summary);
        days.push_back(course.finish_day(simulated_day(day)));
    }
    return days;
}

}  // namespace slipledger::analytics::testing
