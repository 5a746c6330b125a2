// When an alarm is raised, worsens, eases and returns to normal: one state machine per rule, fed with values in data
// time, with on-delay, off-delay and deadband so that it neither flickers nor floods. It knows no operator:
// acknowledging and shelving are acts laid over the episodes it makes (IEC 62682 words; see daemon/watch).
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <string_view>

#include "analytics/instant.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

enum class Rule : std::uint8_t {
    leakage_ratio,
    efficiency,
    hours_in_hand,
    step_change,
    drain_share,
    over_temperature,
    case_pressure,
    inlet_vacuum,
    instrument_suspect,
    unrecorded_replacement,
};
inline constexpr std::size_t rule_count = 10;
inline constexpr std::array<std::string_view, rule_count> rule_names{
    "leakage-ratio",    "efficiency",    "hours-in-hand", "step-change",        "drain-share",
    "over-temperature", "case-pressure", "inlet-vacuum",  "instrument-suspect", "unrecorded-replacement"};
constexpr std::string_view name_of(Rule rule) {
    return rule_names[static_cast<std::size_t>(rule)];
}
// Rules that decide the level; the others raise alarms only.
constexpr bool decides_level(Rule rule) {
    return rule <= Rule::step_change;
}

enum class AlarmEdge : std::uint8_t { raised, worsened, eased, returned };
constexpr std::string_view name_of(AlarmEdge edge) {
    constexpr std::array<std::string_view, 4> names{"raised", "worsened", "eased", "returned"};
    return names[static_cast<std::size_t>(edge)];
}

// One change of one rule's alarm. An episode is known by rule, life and `began` (data time of its raising).
struct AlarmChange {
    Rule rule = Rule::leakage_ratio;
    AlarmEdge edge = AlarmEdge::raised;
    Level level = Level::watch;  // after the change; of `returned` the level it had
    Instant at;                  // data time of the change: end of the summary or day that showed it
    Instant began;               // of the episode
    std::int32_t life = 1;
    double value = unknown;  // what was judged
    double limit = unknown;  // what it passed
};

// One judgement of a rule. `beyond`: the most urgent level whose limit is passed; `within`: the most urgent level not
// yet left, its deadband counted. `unjudged` in both: nothing passed, all left.
struct RuleJudgement {
    Level beyond = Level::unjudged;
    Level within = Level::unjudged;
    double value = unknown;
};

// How long a judgement must last before it counts, in data time and in judgements; both must be met.
struct RuleTiming {
    Milliseconds on_delay{0};
    Milliseconds off_delay{0};
    std::int32_t judgements = 1;
};

// Limit of a level on a ladder; NaN where it has none.
// Not computed: a lookup. Returns the ladder's unit. Source: plant file.
double limit_of(const Ladder& ladder, Level level);

// Judges a value that is worse the higher it is: beyond a limit when above it, still within while above limit less
// deadband. NaN passes nothing. Example: watch 80, plan 90, deadband 3: 85 -> beyond watch, within watch; 78 -> beyond
// nothing, within watch. Source: IEC 62682 (deadband).
RuleJudgement judge_ladder(double value, const Ladder& ladder);

// The state of one rule. Feed it judgements in time order; it answers with the change, if one came of it.
//
// A level is raised once its limit has been passed for the on-delay and the wanted number of judgements in a row;
// raising one raises those below. It is left once the value has been inside, deadband counted, for the off-delay and as
// many judgements. Source: IEC 62682 (on-delay, off-delay, deadband).
//
// Threads: one at a time.
class AlarmState {
public:
    std::optional<AlarmChange> judge(Rule rule, const RuleJudgement& judgement, const Ladder& ladder,
                                     const RuleTiming& timing, Instant at);
    // Ends the episode, if one is on: at the end of a life.
    std::optional<AlarmChange> end(Rule rule, Instant at);

    // `unjudged` while no episode is on. Not computed: reads the state.
    Level level() const;
    // Data time the episode was raised. Not computed: reads the state.
    Instant began() const { return began_; }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.latches_, self.began_);
    }

private:
    struct Latch {
        bool on = false;
        std::int32_t turned = 0;  // judgements in a row against the present position
        Instant since;            // first of them

        void judge(bool beyond, bool within, const RuleTiming& timing, Instant at);

        template <typename Self, typename Io>
        static void each_field(Self& self, Io& io) {
            io(self.on, self.turned, self.since);
        }
    };
    std::array<Latch, 3> latches_{};  // watch, plan, act
    Instant began_;
};

// An alarm that can be held back while an instrument it rests on is in doubt. It goes on being judged unseen; while
// held it may ease and return but neither begins nor worsens, and when the doubt goes it shows what it then stands at.
//
// Threads: one at a time.
class HeldAlarm {
public:
    // Not computed: a state machine over AlarmState::judge.
    std::optional<AlarmChange> judge(Rule rule, const RuleJudgement& judgement, const Ladder& ladder,
                                     const RuleTiming& timing, Instant at, bool held);
    // Ends the episode, if one is on: at the end of a life.
    std::optional<AlarmChange> end(Rule rule, Instant at);

    // As shown. Not computed: reads the state.
    Level level() const { return shown_; }
    // As it would be if no instrument were in doubt. Not computed: reads the state.
    Level unheld() const { return alarm_.level(); }
    // Data time the episode shown was raised. Not computed: reads the state.
    Instant began() const { return began_; }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.alarm_, self.shown_, self.began_);
    }

private:
    AlarmState alarm_;
    Level shown_ = Level::unjudged;
    Instant began_;
};

}  // namespace slipledger::analytics
