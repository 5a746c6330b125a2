#include "tools/judging/marks.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace slipledger::judging {
namespace {

using plantsim::day_ms;

constexpr double wears_from = 1.1;  // true ratio below which an alert is wrong
constexpr double wear_begun_from = 1.02;
constexpr double told_by = 2.0;
constexpr double delay_from = 1.25;
constexpr double life_wanted_from = 1.5;  // true ratio by which a range should have been given
constexpr double points_limit = 10.0;
constexpr double step_within_h = 24.0;
constexpr double step_called_within_h = 240.0;
constexpr double ratio_up_to = 3.0;
constexpr int error_every = 7;  // judged days: the errors of one day are those of the next
constexpr double days_a_year = 365.25;
constexpr double most_width = 1000.0;         // of a range without an end, in its score
constexpr double interval_penalty = 10.0;     // 2 / alpha at 80 %
constexpr double meter_error_percent = 0.33;  // of a delivery meter, and of speed, one standard deviation
constexpr Millis cause_after = 14 * day_ms;   // how long evidence may gather

double infinite() {
    return std::numeric_limits<double>::infinity();
}

// The first alert that is about real wear: raised once it was there, or raised before and not taken back.
std::optional<Millis> first_told(const SectionTold& told, Millis wears_since) {
    for (const AlertTold& alert : told.alerts)
        if (!alert.cleared || *alert.cleared > wears_since) return alert.raised;
    return std::nullopt;
}

// Threads: one section's, then gone.
class Marking {
public:
    Marking(const SectionStory& story, const Truth& truth, const ActLimits& limits, const SectionTold& told)
        : story_(story), truth_(truth), limits_(limits), told_(told) {}

    Marks run() {
        wears_since_ = story_.wears() && !story_.taken_over ? truth_.ratio_passes(wears_from) : std::nullopt;
        mark_alerts();
        if (!story_.taken_over) mark_timeliness();
        if (story_.steps) mark_step();
        mark_errors(told_.days);
        mark_errors(told_.other_days);
        if (story_.wears() && !story_.steps && !story_.taken_over) mark_life();
        mark_cause();
        if (story_.taken_over) mark_comparison();
        marks_.told_at_end = !told_.days.empty() && told_.days.back().alerting;
        return std::move(marks_);
    }

private:
    bool is_sound(Millis at) const { return !wears_since_ || at < *wears_since_; }

    void mark_alerts() {
        if (told_.days.empty()) return;
        for (const DayTold& day : told_.days) {
            if (!day.judged) continue;
            marks_.judged_years += 1.0 / days_a_year;
            if (is_sound(day.end)) marks_.sound_years += 1.0 / days_a_year;
        }
        if (story_.taken_over) {
            marks_.sound_years = 0.0;
            return;
        }
        for (const AlertTold& alert : told_.alerts) marks_.false_alerts += is_sound(alert.raised) ? 1 : 0;
    }

    void mark_timeliness() {
        if (!wears_since_) return;
        const auto first = first_told(told_, *wears_since_);
        const Millis when = first.value_or(std::numeric_limits<Millis>::max());
        if (const auto passed = truth_.ratio_passes(told_by)) marks_.told_before_2 = when < *passed;
        if (const auto passed = truth_.points_pass(points_limit)) marks_.told_before_10_points = when < *passed;
        if (story_.steps) return;
        if (const auto passed = truth_.ratio_passes(delay_from))
            marks_.delay_days = first ? static_cast<double>(when - *passed) / static_cast<double>(day_ms) : infinite();
    }

    void mark_step() {
        const auto at = truth_.ratio_passes(wears_from);
        if (!at) return;
        const double began_h = truth_.running_h(*at);
        const auto first = first_told(told_, *at);
        marks_.step_told = first && truth_.running_h(*first) - began_h <= step_within_h;
        marks_.step_called = std::ranges::any_of(told_.steps, [&](Millis step) {
            return step >= *at && truth_.running_h(step) - began_h <= step_called_within_h;
        });
    }

    // A pump that was worn when watching began is held against what it was then, unless the report says otherwise.
    double reference_ratio(Seen seen) const {
        const bool from_new = told_.compared_with == "when new";
        return story_.taken_over && !from_new ? truth_.ratio(seen, told_.days.front().end) : 1.0;
    }

    void mark_errors(const std::vector<DayTold>& days) {
        int count = 0;
        for (const DayTold& day : days) {
            if (!day.judged || ++count % error_every != 0) continue;
            const double true_ratio = truth_.ratio(day.seen, day.end) / reference_ratio(day.seen);
            ErrorMark error{.seen = day.seen};
            if (true_ratio <= ratio_up_to) error.ratio = day.ratio / true_ratio - 1.0;
            error.efficiency = 100.0 * (day.efficiency - truth_.efficiency(day.seen, day.at_rated, day.end));
            marks_.errors.push_back(error);
            if (day.seen == Seen::everything)
                marks_.meter_limit_percent =
                    std::hypot(6.0, meter_error_percent / truth_.healthy_slip(Seen::everything));
        }
    }

    LifeMark life_mark(const DayTold& day) const {
        const double life = truth_.life_h(day.seen, day.at_rated, limits_, day.end);
        const double high = std::isnan(day.life_high_h) ? infinite() : day.life_high_h;
        LifeMark made{.holds = day.life_low_h <= life && life <= high};
        made.width = (high - day.life_low_h) / life;
        const double counted = std::min(made.width, most_width);
        const double below = std::max(0.0, day.life_low_h - life) / life;
        const double above = std::isinf(high) ? 0.0 : std::max(0.0, life - high) / life;
        made.score = counted + interval_penalty * (below + above);
        return made;
    }

    void mark_life() {
        marks_.life_wanted = truth_.ratio_passes(life_wanted_from).has_value();
        const auto given = [&](Millis from) {
            return std::ranges::find_if(told_.days,
                                        [&](const DayTold& day) { return day.life_given && day.end >= from; });
        };
        const auto first = given(0);
        if (first == told_.days.end()) return;
        const double life = truth_.life_h(first->seen, first->at_rated, limits_, first->end);
        if (!std::isfinite(life) || life <= 0.0) return;
        marks_.first_life = life_mark(*first);
        marks_.life_before_wear = truth_.ratio(truth_.seen(), first->end) < wear_begun_from;
        const auto half = truth_.hours_pass(truth_.running_h(first->end) + 0.5 * life);
        if (!half) return;
        const auto later = given(*half);
        if (later != told_.days.end() && truth_.life_h(later->seen, later->at_rated, limits_, later->end) > 0.0)
            marks_.half_life = life_mark(*later);
    }

    std::string true_cause() const {
        if (story_.steps) return "sudden damage";
        if (story_.inside) return "internal return";
        if (story_.wears()) return "wear";
        if (!story_.confounders.empty()) return std::string(name_of(story_.confounders.front()));
        return "nothing";
    }

    // What is told of its cause once it has been told for a while; where alerts were raised and taken back, the first.
    void mark_cause() {
        marks_.true_cause = true_cause();
        marks_.cause_counts = !story_.taken_over && (story_.wears() ? story_.confounders.empty() && wears_since_
                                                                    : story_.confounders.size() <= 1);
        const Millis from = story_.wears() && wears_since_ ? *wears_since_ : story_.confounded_from;
        const auto speaks = [](const DayTold& day) { return !day.cause.empty() && day.cause != "none"; };
        const auto first =
            std::ranges::find_if(told_.days, [&](const DayTold& day) { return day.end >= from && speaks(day); });
        marks_.told_cause = "nothing";
        if (first == told_.days.end()) return;
        marks_.told_cause = first->cause;
        for (auto day = first; day != told_.days.end() && day->end <= first->end + cause_after; ++day)
            if (speaks(*day)) marks_.told_cause = day->cause;
        const bool instrument = std::ranges::any_of(story_.confounders, is_of_instrument);
        const bool as_wear = std::any_of(first, told_.days.end(), [&](const DayTold& day) {
            return day.alerting && (day.cause == "wear" || day.cause == "sudden-damage");
        });
        marks_.instrument_as_wear = instrument && !story_.wears() && as_wear;
    }

    void mark_comparison() {
        const bool says = told_.sentence.find("when watching began") != std::string::npos;
        const bool claims_new = told_.compared_with == "when new";
        marks_.hides_what_it_is_compared_with = told_.sound_at_end && (claims_new || !says);
    }

    const SectionStory& story_;
    const Truth& truth_;
    const ActLimits& limits_;
    const SectionTold& told_;
    std::optional<Millis> wears_since_;
    Marks marks_;
};

// What is told of a part's predecessor is not told of it.
SectionTold told_since(SectionTold told, Millis fitted) {
    std::erase_if(told.days, [&](const DayTold& day) { return day.end <= fitted; });
    std::erase_if(told.other_days, [&](const DayTold& day) { return day.end <= fitted; });
    std::erase_if(told.alerts, [&](const AlertTold& alert) { return alert.raised <= fitted; });
    std::erase_if(told.steps, [&](Millis step) { return step <= fitted; });
    return told;
}

}  // namespace

Marks mark(const SectionStory& story, const Truth& truth, const ActLimits& limits, const SectionTold& told) {
    if (!story.fitted_at) return Marking(story, truth, limits, told).run();
    const SectionTold of_its_life = told_since(told, *story.fitted_at);
    return Marking(story, truth, limits, of_its_life).run();
}

}  // namespace slipledger::judging
