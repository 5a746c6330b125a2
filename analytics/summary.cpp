#include "analytics/summary.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

#include "analytics/stats/quantile.hpp"
#include "analytics/trimmed_moments.hpp"

namespace slipledger::analytics {
namespace {

using std::chrono::minutes;

constexpr Milliseconds settled_stop = minutes(10);  // a shorter stop leaves the case draining and the meter coasting
constexpr Milliseconds stop_dropped = minutes(2);

struct Mean {
    double sum = 0.0;
    std::uint32_t count = 0;

    void add(double value) {
        if (std::isnan(value)) return;
        sum += value;
        ++count;
    }
    double value() const { return count == 0 ? unknown : sum / count; }
};

void widen(Extent& extent, double value) {
    extent.low = std::fmin(extent.low, value);  // which pass over NaN
    extent.high = std::fmax(extent.high, value);
}

// One summary in the making.
class Builder {
public:
    void begin(Instant start, Milliseconds length, Basis basis, std::int32_t life) {
        summary_ = {};
        summary_.start = start;
        summary_.length = length;
        summary_.basis = basis;
        summary_.life = life;
        points_ = 0;
        drain_share_ = pressure_ = flow_ = speed_ = temperature_ = {};
        for (PointSample& sample : samples_) sample.clear();
        stop_flows_.clear();
        stop_tail_ = 0;
    }

    void add(const JudgedPoint& point) {
        ++points_;
        ++summary_.counts[static_cast<std::size_t>(point.standing)];
        // fmax and fmin pass over NaN.
        summary_.highest_temperature_c = std::fmax(summary_.highest_temperature_c, point.temperature_c);
        summary_.highest_case_bar = std::fmax(summary_.highest_case_bar, point.case_bar);
        if (point.standing == Standing::stopped) return add_stopped(point);
        drop_short_stop();
        summary_.lowest_inlet_bar = std::fmin(summary_.lowest_inlet_bar, point.inlet_bar);
        summary_.running_h += point.hours;
        take_shown(point);
        if (summary_.basis == Basis::case_drain && point.theoretical_lpm > 0.0)
            drain_share_.add(point.flow_lpm / point.theoretical_lpm);
        if (!is_judged(point.standing)) return;
        summary_.judged_h += point.hours;
        samples_[static_cast<std::size_t>(point.standing)].add(point);
    }

    std::optional<Summary> finish() {
        if (points_ == 0) return std::nullopt;
        drop_short_stop();
        summary_.stop_count = static_cast<std::uint32_t>(stop_flows_.size());
        summary_.stop_flow_lpm = stats::median(stop_flows_);
        summary_.drain_share = drain_share_.value();
        summary_.mean_pressure_bar = pressure_.value();
        summary_.mean_flow_lpm = flow_.value();
        summary_.mean_speed_rpm = speed_.value();
        summary_.mean_temperature_c = temperature_.value();
        for (std::size_t i = 0; i < judged_regimes; ++i) summary_.judged[i] = samples_[i].moments();
        return summary_;
    }

private:
    void take_shown(const JudgedPoint& point) {
        pressure_.add(point.pressure_bar);
        flow_.add(point.flow_lpm);
        speed_.add(point.speed_rpm);
        temperature_.add(point.temperature_c);
        widen(summary_.pressure_bar, point.pressure_bar);
        widen(summary_.flow_lpm, point.flow_lpm);
        widen(summary_.speed_rpm, point.speed_rpm);
        widen(summary_.temperature_c, point.temperature_c);
    }

    // Whether a stop lasts ten minutes shows only at its end (or the summary's): until then its readings are on trial.
    void add_stopped(const JudgedPoint& point) {
        if (point.stopped_for < last_stopped_for_) drop_short_stop();
        last_stopped_for_ = point.stopped_for;
        if (point.stopped_for < stop_dropped) return;
        stop_flows_.push_back(point.flow_lpm);
        ++stop_tail_;
        if (point.stopped_for >= settled_stop) stop_tail_ = 0;
    }

    void drop_short_stop() {
        stop_flows_.resize(stop_flows_.size() - stop_tail_);
        stop_tail_ = 0;
        last_stopped_for_ = Milliseconds{0};
    }

    Summary summary_;
    std::uint32_t points_ = 0;
    Mean drain_share_;
    Mean pressure_;
    Mean flow_;
    Mean speed_;
    Mean temperature_;
    std::array<PointSample, judged_regimes> samples_;
    std::vector<double> stop_flows_;
    std::size_t stop_tail_ = 0;  // newest of stop_flows_ that belong to a stop still too short
    Milliseconds last_stopped_for_{0};
};

Instant end_of_slot(Instant time, Milliseconds length) {
    const Milliseconds since_epoch = time.time_since_epoch();
    Milliseconds into = since_epoch % length;
    if (into < Milliseconds{0}) into += length;
    return time - into + length;
}

}  // namespace

std::vector<Summary> summarise(const SectionReadings& readings, const SectionSpec& spec, const Usual& usual,
                               Basis basis, std::int32_t life, Instant from, Instant to, Milliseconds length) {
    std::vector<Summary> summaries;
    PointJudge judge(readings, spec, usual, basis, from, to);
    Builder builder;
    const JudgedPoint* point = judge.next();
    while (point != nullptr) {
        const Instant end = std::min(end_of_slot(point->time, length), to);
        const Instant start = std::max(end_of_slot(point->time, length) - length, from);
        builder.begin(start, end - start, basis, life);
        for (; point != nullptr && point->time < end; point = judge.next()) builder.add(*point);
        if (std::optional<Summary> summary = builder.finish()) summaries.push_back(*summary);
    }
    return summaries;
}

}  // namespace slipledger::analytics
