// The course of one section on one basis: summaries go in in time order, verdicts come out. Ties together wear filter,
// step detection, prognosis, levels and alarm rules, and can be put down at the end of any day and taken up again there
// bit for bit, so that late data cost only what comes after them.
//
// Use: `begin_life` at each fitting, then for every closed summary `take`, and at the end of each day `finish_day`.
// While a day is not over `quote` gives the day so far and changes nothing.
#pragma once

#include <cstddef>
#include <memory>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "analytics/alarm.hpp"
#include "analytics/causes.hpp"
#include "analytics/day_state.hpp"
#include "analytics/fact_change.hpp"
#include "analytics/instant.hpp"
#include "analytics/leakage.hpp"
#include "analytics/reference_test.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/summary.hpp"

namespace slipledger::analytics {

class WearFilter;

// A value with its 80 % range. NaN: not known.
struct Ranged {
    double value = unknown;
    double low = unknown;
    double high = unknown;
};

// A calendar day of the plant: `date` as days since 1970, and where it begins and ends in UTC (23 to 25 h).
struct DaySpan {
    std::int32_t date = 0;
    Instant begin;
    Instant end;
};

// Why a section has no level. `none`: it has one.
enum class UnjudgedReason : std::uint8_t {
    none,
    no_data,         // nothing judged yet at all
    learning,        // fewer judged running hours than the baseline wants
    seldom_judged,   // under 10 % of the last 30 days' running hours could be judged
    shared_drain,    // one drain meter for several sections, not told apart
    no_basis,        // the sensors fitted give none
    no_temperature,  // the oil's viscosity is unknown: only the raw drain share is watched
    silent,          // only ever laid over by a report: newest reading 24 h older than the plant's newest
    instrument,      // an instrument is in doubt and holds back the wear alert that rests on it
};

std::string_view name_of(UnjudgedReason reason);  // "no-data", "learning", ...

// Judgement on one closed summary.
struct SummaryVerdict {
    Instant start;
    Level level = Level::unjudged;
    UnjudgedReason reason = UnjudgedReason::no_data;
    Ranged leakage_ratio;  // the summary's own, with the coefficients known at its end
    Ranged filtered_ratio;
    Ranged efficiency;             // fraction, at the rated (else reference) point
    double leakage_lpm = unknown;  // wear-dependent leakage seen at the summary's own operating point
    double excess_lpm = unknown;   // above healthy, at the same operating point
    double leakage_kw = unknown;
    bool outside_coverage = false;
};

struct HoursInHand {
    double low = unknown;  // 10, 50, 90 % quantiles, running hours; NaN: null
    double mid = unknown;
    double high = unknown;
    std::string_view
        limit;  // rule whose act limit comes first: "leakage-ratio", "efficiency", "drain-share"; empty: none
    double duty_h_per_day = unknown;  // running hours a calendar day by which they become dates: planned, else usual
};

struct Trend {
    Ranged per_1000_h;  // change of the ratio itself
    bool established = false;
    std::optional<Instant> onset;  // simplest: first day of the present run of levels above sound
};

// A replacement that nobody told, where the readings look like one.
struct LikelyReplacement {
    std::optional<Instant> at;  // start of the first summary that leaked less; none: nothing looks like one
    double ratio_before = unknown;
    double ratio_after = unknown;
};

// Judgement on one day, as it stood at its end (or so far).
struct DayVerdict {
    DaySpan day;
    std::int32_t life = 1;
    Level level = Level::unjudged;
    UnjudgedReason reason = UnjudgedReason::no_data;
    Ranged leakage_ratio;  // the filter's, at the day's last summary
    Ranged efficiency;
    double efficiency_baseline = unknown;
    bool efficiency_at_rated = true;  // else at the reference point
    double clearance_growth_percent = unknown;
    double leakage_lpm = unknown;  // means over the day's judged hours
    double excess_lpm = unknown;
    double leakage_kw = unknown;
    Trend trend;
    HoursInHand hours_in_hand;
    double step_ratio = unknown;        // of a step found on this day: ratio after over before
    CauseKind cause = CauseKind::none;  // the likeliest
    double cause_weight = 0.0;
    std::vector<RankedCause> causes;  // empty where nothing asks for one
    double running_h = 0.0;           // of the day
    double judged_h = 0.0;
    double life_running_h = 0.0;  // since the life began, as far as watched
    double life_judged_h = 0.0;
    double learning_h_left = 0.0;  // judged running hours still wanted by the baseline
    double share_judged_30d = unknown;
    double slip_coefficient = unknown;  // Wilson's, mean of the day
    double zero_lpm = unknown;          // the meter's zero as the filter holds it
    BaselineKind baseline = BaselineKind::watching_began;
    LeakageLaw healthy;            // what the part leaks when healthy, wherever it works
    double healthy_sd = unknown;   // of its logarithm, at the reference point
    LikelyReplacement replacement;  // that nobody told, where it looks like one
    DayState state;                     // of the filter, for looking back
};

struct LifeStart {
    std::int32_t number = 1;
    Instant since;
};

// Threads: one at a time.
class Course {
public:
    explicit Course(Basis basis);
    ~Course();
    Course(Course&&) noexcept;
    Course& operator=(Course&&) noexcept;

    // A new cartridge / rotating group / gear set: nothing learned crosses over; open episodes of the old life end
    // here.
    void begin_life(const LifeStart& life, const SectionSpec& spec);
    // Facts of the same life changed (oil, setting, sensor): the estimate goes on, opened to what the change may have
    // brought; a change of leakage at this moment is attributed to it first.
    void change_facts(Instant at, const SectionSpec& spec, const FactChange& change = {});
    // A test with bucket and stopwatch, on this basis: a sighting of the leakage that no meter of the plant had a part
    // in. Where the meter had it otherwise it is the meter that is wrong: wear follows the test, the meter is suspect
    // until it is changed or the next test agrees. Before anything is learned it says nothing.
    void reference_test(Instant at, const ReferenceTest& test);

    // What the section's other basis said at the end of the day before, where both are fitted. Evidence on causes.
    void hear_other_basis(const DayVerdict& other);

    SummaryVerdict take(const Summary& summary);
    DayVerdict quote(const DaySpan& day) const;
    DayVerdict finish_day(const DaySpan& day);

    // Changes of alarm state since the last call, in time order (see alarm.hpp). Drained by the caller.
    std::vector<AlarmChange> drain_alarm_changes();

    // The estimate behind the verdicts, for showing their working; valid until the next call of a function that is not
    // const. Not computed: reads the state.
    const WearFilter& filter() const;

    // The whole state between two days, exactly; restore gives nullopt for bytes of another version.
    std::vector<std::byte> checkpoint() const;
    static std::optional<Course> restore(std::span<const std::byte> bytes, const SectionSpec& spec);

private:
    struct State;
    std::unique_ptr<State> state_;
};

}  // namespace slipledger::analytics
