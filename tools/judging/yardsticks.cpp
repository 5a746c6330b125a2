#include "tools/judging/yardsticks.hpp"

#include <algorithm>
#include <cmath>

#include "analytics/stats/theil_sen.hpp"

namespace slipledger::judging {
namespace {

using plantsim::Column;
using plantsim::day_ms;

constexpr double least_load = 1.0 / 3.0;                   // of rated pressure
constexpr Millis least_spacing = 4 * plantsim::minute_ms;  // of notes: nobody writes down every second
constexpr double idle_bar = 5.0;
constexpr Millis longest_gap = 30 * plantsim::minute_ms;
constexpr std::size_t least_points = 12;  // in a day, else it says nothing
constexpr int learning_days = 30;
constexpr double watch_ratio = 1.25;
constexpr double quiet_ratio = 1.2;
constexpr double act_ratio = 3.0;
constexpr std::size_t most_weeks = 26;
constexpr std::size_t least_weeks = 6;

analytics::Fluid fluid_of(const config::Fluid& fluid) {
    if (fluid.points.size() == 2)
        return analytics::Fluid::from_points({fluid.points[0].temperature_c, fluid.points[0].viscosity_cst},
                                             {fluid.points[1].temperature_c, fluid.points[1].viscosity_cst})
            .value_or(analytics::Fluid());
    return analytics::Fluid::from_grade(fluid.iso_vg.value_or(46.0), fluid.viscosity_index.value_or(100.0))
        .value_or(analytics::Fluid());
}

double median(std::vector<double> values) {
    if (values.empty()) return not_told;
    const auto middle = values.begin() + static_cast<std::ptrdiff_t>(values.size() / 2);
    std::ranges::nth_element(values, middle);
    return *middle;
}

plantsim::Seen seen_by(const Notes& notes) {
    return notes.by_drain() ? plantsim::Seen::drain : plantsim::Seen::everything;
}

void set_alert(SectionTold& told, bool above, bool below, Millis at) {
    const bool open = !told.alerts.empty() && !told.alerts.back().cleared;
    if (!open && above) told.alerts.push_back({.raised = at});
    if (open && below) told.alerts.back().cleared = at;
}

// leakage = slope drive + constant, by least squares.
struct Line {
    double slope = 0.0;
    double constant = 0.0;
    double at(double drive) const { return slope * drive + constant; }
};

std::optional<Line> line_through(std::span<const WorkingPoint> points) {
    if (points.size() < 100) return std::nullopt;
    double x = 0.0;
    double y = 0.0;
    for (const WorkingPoint& point : points) {
        x += point.drive;
        y += point.leakage_lpm;
    }
    const auto n = static_cast<double>(points.size());
    x /= n;
    y /= n;
    double xx = 0.0;
    double xy = 0.0;
    for (const WorkingPoint& point : points) {
        xx += (point.drive - x) * (point.drive - x);
        xy += (point.drive - x) * (point.leakage_lpm - y);
    }
    if (!(xx > 0.0)) return std::nullopt;
    return Line{.slope = xy / xx, .constant = y - xy / xx * x};
}

// Theil-Sen through the last weeks. Threads: one at a time.
class Weeks {
public:
    void add(double running_h, double ratio) {
        hours_.push_back(running_h);
        ratios_.push_back(ratio);
        if (hours_.size() <= most_weeks) return;
        hours_.erase(hours_.begin());
        ratios_.erase(ratios_.begin());
    }
    std::optional<analytics::stats::SlopeRange> slope() const {
        if (hours_.size() < least_weeks) return std::nullopt;
        return analytics::stats::theil_sen(hours_, ratios_, 0.8);
    }

private:
    std::vector<double> hours_{};
    std::vector<double> ratios_{};
};

}  // namespace

Notes::Notes(const config::Pump& pump, const config::Section& section, bool by_drain, bool only_section, Millis begins,
             Millis ends)
    : pump_(pump.id),
      section_(only_section ? std::string_view() : std::string_view(section.id)),
      by_drain_(by_drain),
      begins_(begins),
      ends_(ends),
      displacement_cm3_(section.displacement_cm3),
      rated_(section.rated),
      nominal_rpm_(pump.motor.nominal_rpm),
      fluid_(fluid_of(pump.fluid)) {}

void Notes::see(std::span<const plantsim::Row> rows) {
    for (const plantsim::Row& row : rows) {
        if (row.pump != pump_) continue;
        if (!std::isnan(row[Column::fluid_temperature])) temperature_c_ = row[Column::fluid_temperature];
        if (!std::isnan(row[Column::shaft_speed])) speed_rpm_ = row[Column::shaft_speed];
        if (row.section != section_ || std::isnan(row[Column::outlet_pressure])) continue;
        const double rpm = std::isnan(speed_rpm_) ? nominal_rpm_ : speed_rpm_;
        const double bar = row[Column::outlet_pressure];
        const double flow = row[by_drain_ ? Column::case_drain_flow : Column::delivery_flow];
        const bool working = rpm > 100.0 && bar > least_load * rated_.pressure_bar && flow > 0.0;
        const Millis gap = row.time - last_row_;
        const bool turning = std::isnan(speed_rpm_) ? bar > idle_bar : rpm > 100.0;
        if (turning && gap > 0 && gap < longest_gap)
            running_h_ += static_cast<double>(gap) / static_cast<double>(plantsim::hour_ms);
        last_row_ = row.time;
        const auto day = static_cast<std::size_t>(std::max<Millis>(0, (row.time - begins_) / day_ms));
        running_by_day_.resize(std::max(running_by_day_.size(), day + 1), running_h_);
        running_by_day_[day] = running_h_;
        const double cst = fluid_.kinematic_cst(temperature_c_);
        if (!working || !(cst > 0.0) || row.time - last_ < least_spacing) continue;
        last_ = row.time;
        const double theoretical = displacement_cm3_ * rpm / 1000.0;
        const double leakage = by_drain_ ? flow : theoretical - flow;
        points_.push_back({.time = row.time,
                           .drive = static_cast<float>(bar / cst),
                           .leakage_lpm = static_cast<float>(leakage),
                           .share = static_cast<float>(leakage / theoretical)});
    }
}

std::span<const WorkingPoint> Notes::between(Millis from, Millis to) const {
    const auto first = std::ranges::lower_bound(points_, from, {}, &WorkingPoint::time);
    const auto last = std::ranges::lower_bound(points_, to, {}, &WorkingPoint::time);
    return {first, last};
}

double Notes::running_h(Millis at) const {
    if (running_by_day_.empty()) return 0.0;
    const auto day = static_cast<std::size_t>(std::max<Millis>(0, (at - 1 - begins_) / day_ms));
    return running_by_day_[std::min(day, running_by_day_.size() - 1)];
}

double Notes::rated_drive() const {
    return rated_.pressure_bar / fluid_.kinematic_cst(rated_.fluid_temperature_c);
}

double Notes::rated_lpm() const {
    return displacement_cm3_ * rated_.speed_rpm / 1000.0;
}

SectionTold by_fixed_limit(const Notes& notes, double limit_percent) {
    SectionTold told;
    int above = 0;
    int below = 0;
    for (Millis day = notes.begins(); day + day_ms <= notes.ends(); day += day_ms) {
        std::vector<double> shares;
        for (const WorkingPoint& point : notes.between(day, day + day_ms)) shares.push_back(100.0 * point.share);
        if (shares.size() < least_points) continue;
        const double share = median(std::move(shares));
        above = share > limit_percent ? above + 1 : 0;
        below = share > limit_percent ? 0 : below + 1;
        set_alert(told, above >= 2, below >= 2, day + day_ms);
        told.days.push_back(
            {.end = day + day_ms, .judged = true, .seen = seen_by(notes), .efficiency = 1.0 - share / 100.0});
    }
    return told;
}

SectionTold by_notebook(const Notes& notes) {
    SectionTold told;
    const Millis learned = notes.begins() + learning_days * day_ms;
    const auto line = line_through(notes.between(notes.begins(), learned));
    if (!line) return told;
    const double healthy_share = line->at(notes.rated_drive()) / notes.rated_lpm();
    Weeks weeks;
    int day_of_week = 0;
    for (Millis day = learned; day + day_ms <= notes.ends(); day += day_ms) {
        std::vector<double> ratios;
        for (const WorkingPoint& point : notes.between(day - 6 * day_ms, day + day_ms))
            if (const double usual = line->at(point.drive); usual > 0.0) ratios.push_back(point.leakage_lpm / usual);
        if (ratios.size() < 7 * least_points) continue;
        const double ratio = median(std::move(ratios));
        if (++day_of_week % 7 == 0) weeks.add(notes.running_h(day + day_ms), ratio);
        set_alert(told, ratio > watch_ratio, ratio < quiet_ratio, day + day_ms);
        DayTold now{.end = day + day_ms,
                    .judged = true,
                    .alerting = ratio > watch_ratio,
                    .seen = seen_by(notes),
                    .ratio = ratio,
                    .efficiency = 1.0 - ratio * healthy_share};
        const auto slope = weeks.slope();
        if (slope && slope->low > 0.0 && ratio < act_ratio) {
            now.life_given = true;
            now.life_low_h = (act_ratio - ratio) / slope->high;
            now.life_mid_h = (act_ratio - ratio) / slope->value;
            now.life_high_h = (act_ratio - ratio) / slope->low;
        }
        told.days.push_back(now);
    }
    return told;
}

}  // namespace slipledger::judging
