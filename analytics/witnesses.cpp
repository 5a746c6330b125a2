#include "analytics/witnesses.hpp"

#include <algorithm>
#include <cmath>
#include <numeric>
#include <vector>

#include "analytics/onset.hpp"
#include "analytics/stats/control_chart.hpp"
#include "analytics/stats/mann_kendall.hpp"
#include "analytics/stats/theil_sen.hpp"

namespace slipledger::analytics {

namespace {

constexpr double quantile_90 = 1.2815515655446004;  // of the standard normal
constexpr double two_sided = 0.8;
constexpr std::size_t fewest = 5;
constexpr double mean_weight = 0.1;  // of the newest day
constexpr double most_kept = 0.95;   // of a departure from one day to the next

struct CourseOfDays {
    std::vector<std::int32_t> dates;
    std::vector<double> thousand_h;  // of running in the life
    std::vector<double> ratios;
    std::vector<double> healthy_sds;
};

CourseOfDays course_of(std::span<const DayVerdict> days) {
    std::size_t first = days.size();
    for (std::size_t judged = 0; first > 0 && judged < looked_back_days && days[first - 1].life == days.back().life;)
        judged += days[--first].judged_h > 0.0 ? 1 : 0;
    CourseOfDays course;
    for (const DayVerdict& day : days.subspan(first)) {
        const double healthy = day.leakage_lpm - day.excess_lpm;
        if (!(day.leakage_lpm > 0.0 && healthy > 0.0)) continue;
        course.dates.push_back(day.day.date);
        course.thousand_h.push_back(day.life_running_h / 1000.0);
        course.ratios.push_back(day.leakage_lpm / healthy);
        course.healthy_sds.push_back(std::isfinite(day.healthy_sd) ? day.healthy_sd : 0.0);
    }
    return course;
}

void add_trend(Witnesses& witnesses, const CourseOfDays& course, std::int32_t since) {
    const auto from = static_cast<std::size_t>(std::ranges::lower_bound(course.dates, since) - course.dates.begin());
    const auto ratios = std::span(course.ratios).subspan(from);
    if (ratios.size() < fewest) return;
    const stats::MannKendall ranks = stats::mann_kendall_autocorrelated(ratios);
    const stats::SlopeRange slope =
        stats::theil_sen(std::span(course.thousand_h).subspan(from), ratios, two_sided, ranks.variance_factor);
    witnesses.slope_per_1000_h = {.value = slope.value, .low = slope.low, .high = slope.high};
    witnesses.rank_z = ranks.z;
    witnesses.rank_p = ranks.p;
}

void add_sum(Witnesses& witnesses, const CourseOfDays& course) {
    stats::CumulativeSum sum;
    for (std::size_t i = 0; i < course.ratios.size(); ++i) {
        sum = stats::cumulative_sum(sum, std::log(course.ratios[i]) - course.healthy_sds[i], sum_slack);
        if (sum.high <= sum_limit)
            witnesses.sum_passed.reset();
        else if (!witnesses.sum_passed)
            witnesses.sum_passed = course.dates[i];
    }
    witnesses.cumulative_sum = sum.high;
}

// Its range: scatter of the days about the mean that was expected, and what is not known of the baseline.
void add_mean(Witnesses& witnesses, const CourseOfDays& course) {
    double mean = std::log(course.ratios.front());
    double squares = 0.0;
    for (const double ratio : course.ratios) {
        squares += std::pow(std::log(ratio) - mean, 2);
        mean = stats::weighted_mean(mean, std::log(ratio), mean_weight);
    }
    const double scatter = std::sqrt(squares / static_cast<double>(course.ratios.size()));
    const double sd = std::hypot(stats::weighted_mean_sd(scatter, mean_weight), course.healthy_sds.back());
    witnesses.weighted_mean = {
        .value = std::exp(mean), .low = std::exp(mean - quantile_90 * sd), .high = std::exp(mean + quantile_90 * sd)};
}

// How strongly a day's departure from a shape goes on into the next, as the factor by which fewer days would say as
// much.
double days_per_independent_day(const std::vector<double>& departures) {
    double together = 0.0;
    double alone = 0.0;
    for (std::size_t i = 1; i < departures.size(); ++i) {
        together += departures[i] * departures[i - 1];
        alone += departures[i] * departures[i];
    }
    const double kept = alone > 0.0 ? std::clamp(together / alone, 0.0, most_kept) : 0.0;
    return (1.0 + kept) / (1.0 - kept);
}

std::vector<double> departures_from(const stats::SingleChange& change, const CourseOfDays& course) {
    const bool steps = change.bic_step <= change.bic_ramp;
    std::vector<double> left = course.ratios;
    for (std::size_t i = 0; i < left.size(); ++i) {
        if (steps)
            left[i] -= i >= change.before_step ? change.step : 0.0;
        else
            left[i] -= change.slope * std::fmax(0.0, course.thousand_h[i] - course.thousand_h[change.before_ramp - 1]);
    }
    const double mean = std::accumulate(left.begin(), left.end(), 0.0) / static_cast<double>(left.size());
    for (double& departure : left) departure -= mean;
    return left;
}

// Days that hang together look like steps and ramps of their own accord: what a shape gains must be worth its place by
// the days that count as independent.
void add_shape(Witnesses& witnesses, const CourseOfDays& course) {
    const stats::SingleChange change = stats::single_change(course.thousand_h, course.ratios, fewest);
    if (!std::isfinite(change.bic_level)) return;
    const double price = 2.0 * std::log(static_cast<double>(course.ratios.size()));
    const bool steps = change.bic_step <= change.bic_ramp;
    const double gain = change.bic_level - (steps ? change.bic_step : change.bic_ramp) + price;
    if (gain / days_per_independent_day(departures_from(change, course)) <= price) return;
    witnesses.shape = steps ? stats::Shape::step : stats::Shape::ramp;
    witnesses.changed = steps ? course.dates[change.before_step] : course.dates[change.before_ramp - 1];
}

}  // namespace

Witnesses witnesses_of(std::span<const DayVerdict> days, std::int32_t since) {
    Witnesses witnesses;
    const CourseOfDays course = course_of(days);
    witnesses.days = static_cast<int>(course.ratios.size());
    if (course.ratios.size() < fewest) return witnesses;
    add_trend(witnesses, course, since);
    add_sum(witnesses, course);
    add_mean(witnesses, course);
    add_shape(witnesses, course);
    return witnesses;
}

}  // namespace slipledger::analytics
