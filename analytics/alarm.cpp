#include "analytics/alarm.hpp"

#include <algorithm>

namespace slipledger::analytics {

namespace {

constexpr std::array<Level, 3> raised_levels{Level::watch, Level::plan, Level::act};

std::optional<AlarmEdge> edge_between(Level before, Level after) {
    if (before == after) return std::nullopt;
    if (before == Level::unjudged) return AlarmEdge::raised;
    if (after == Level::unjudged) return AlarmEdge::returned;
    return after > before ? AlarmEdge::worsened : AlarmEdge::eased;
}

}  // namespace

double limit_of(const Ladder& ladder, Level level) {
    switch (level) {
        case Level::watch:
            return ladder.watch;
        case Level::plan:
            return ladder.plan;
        case Level::act:
            return ladder.act;
        case Level::unjudged:
        case Level::sound:
            break;
    }
    return unknown;
}

RuleJudgement judge_ladder(double value, const Ladder& ladder) {
    RuleJudgement judgement{.value = value};
    for (const Level level : raised_levels) {
        if (value > limit_of(ladder, level)) judgement.beyond = level;
        if (value > limit_of(ladder, level) - ladder.deadband) judgement.within = level;
    }
    return judgement;
}

void AlarmState::Latch::judge(bool beyond, bool within, const RuleTiming& timing, Instant at) {
    const bool against = on ? !within : beyond;
    if (!against) {
        turned = 0;
        return;
    }
    if (turned++ == 0) since = at;
    if (turned < timing.judgements || at - since < (on ? timing.off_delay : timing.on_delay)) return;
    on = !on;
    turned = 0;
}

std::optional<AlarmChange> AlarmState::judge(Rule rule, const RuleJudgement& judgement, const Ladder& ladder,
                                             const RuleTiming& timing, Instant at) {
    const Level before = level();
    for (std::size_t i = 0; i < latches_.size(); ++i)
        latches_[i].judge(judgement.beyond >= raised_levels[i], judgement.within >= raised_levels[i], timing, at);
    const Level after = level();
    for (std::size_t i = 0; i < latches_.size() && raised_levels[i] < after; ++i) latches_[i].on = true;
    const auto edge = edge_between(before, after);
    if (!edge) return std::nullopt;
    if (*edge == AlarmEdge::raised) began_ = at;
    AlarmChange change{.rule = rule, .edge = *edge, .at = at, .began = began_, .value = judgement.value};
    change.level = after == Level::unjudged ? before : after;
    change.limit = limit_of(ladder, change.level);
    return change;
}

std::optional<AlarmChange> AlarmState::end(Rule rule, Instant at) {
    const Level before = level();
    const Instant began = began_;
    *this = AlarmState{};
    if (before == Level::unjudged) return std::nullopt;
    return AlarmChange{.rule = rule, .edge = AlarmEdge::returned, .level = before, .at = at, .began = began};
}

Level AlarmState::level() const {
    for (std::size_t i = latches_.size(); i-- > 0;)
        if (latches_[i].on) return raised_levels[i];
    return Level::unjudged;
}

std::optional<AlarmChange> HeldAlarm::judge(Rule rule, const RuleJudgement& judgement, const Ladder& ladder,
                                            const RuleTiming& timing, Instant at, bool held) {
    alarm_.judge(rule, judgement, ladder, timing, at);
    const Level before = shown_;
    shown_ = held ? std::min(before, alarm_.level()) : alarm_.level();
    const auto edge = edge_between(before, shown_);
    if (!edge) return std::nullopt;
    if (*edge == AlarmEdge::raised) began_ = at;
    AlarmChange change{.rule = rule, .edge = *edge, .at = at, .began = began_, .value = judgement.value};
    change.level = shown_ == Level::unjudged ? before : shown_;
    change.limit = limit_of(ladder, change.level);
    return change;
}

std::optional<AlarmChange> HeldAlarm::end(Rule rule, Instant at) {
    const Level before = shown_;
    const Instant began = began_;
    *this = HeldAlarm{};
    if (before == Level::unjudged) return std::nullopt;
    return AlarmChange{.rule = rule, .edge = AlarmEdge::returned, .level = before, .at = at, .began = began};
}

}  // namespace slipledger::analytics
