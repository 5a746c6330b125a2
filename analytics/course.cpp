#include "analytics/course.hpp"

#include <algorithm>
#include <cmath>
#include <tuple>
#include <utility>

#include "analytics/change.hpp"
#include "analytics/checkpoint.hpp"
#include "analytics/day_tally.hpp"
#include "analytics/duty.hpp"
#include "analytics/excess_slope.hpp"
#include "analytics/flow.hpp"
#include "analytics/leakage.hpp"
#include "analytics/outlook.hpp"
#include "analytics/rated_efficiency.hpp"
#include "analytics/replacement.hpp"
#include "analytics/sign_watch.hpp"
#include "analytics/verdict.hpp"
#include "analytics/wear_filter.hpp"
#include "analytics/wear_laws.hpp"

namespace slipledger::analytics {

namespace {

constexpr std::uint32_t checkpoint_version = 0x534c0005;  // raise the low half whenever a field is added or moved
constexpr double hours_per_day = 24.0;
constexpr double quantile_90 = 1.2815515655446004;
constexpr std::int32_t drift_days_wanted = 7;  // in a row, to establish a drift and to give it up again
constexpr double sure_drift = 0.98;            // that there is any: at 0.9 the first hours in hand are twice too long
constexpr double hours_deadband = 1.1;         // of the wait for a spare or a stop
constexpr double no_end_h = 1.0e6;             // stands for hours in hand without an end
constexpr double range_change = 0.2;           // in ln dp, ln viscosity: a new operating range
constexpr double long_gap_h = 3.0;             // without any summary: running hours are estimated by usual duty
constexpr double impossible_percent = 50.0;    // of running points: the instrument first
constexpr double step_deadband = 0.05;         // of a ratio limit
constexpr RuleTiming two_judged_days{.judgements = 2};
constexpr double doubted_from = 0.5;    // weight of instruments among the causes: they are likelier than all else
constexpr double doubted_until = 0.35;  // and no longer: between the two a doubt stays as it is

double hours(Milliseconds span) {
    return std::chrono::duration<double, std::ratio<3600>>(span).count();
}

// Means of a summary over its judged regimes, by points.
struct SummaryMeans {
    double pressure_rise_bar = unknown;
    double viscosity_cst = unknown;
    double temperature_c = unknown;
    double distance = 0.0;
};

SummaryMeans means_of(const Summary& summary, const WearFilter& filter) {
    const Moments& m = summary.judged[summary.judged[1].count > summary.judged[0].count ? 1 : 0];
    return {.pressure_rise_bar = m.dp_bar,
            .viscosity_cst = m.viscosity_cst,
            .temperature_c = m.temperature_c,
            .distance = filter.distance_from_seen(m)};
}

bool has_judged(const Summary& summary) {
    return summary.judged[0].count + summary.judged[1].count > 0;
}

// Share of the points of a turning pump that contradict each other, in percent; NaN where it did not turn.
double percent_impossible(const Summary& summary) {
    double running = 0.0;
    for (std::size_t i = 0; i < standing_count; ++i)
        if (static_cast<Standing>(i) != Standing::stopped) running += summary.counts[i];
    const double impossible = summary.counts[static_cast<std::size_t>(Standing::impossible)];
    return running > 0.0 ? 100.0 * impossible / running : unknown;
}

}  // namespace

struct Course::State {
    Basis basis = Basis::case_drain;
    SectionSpec spec;
    LifeStart life;
    WearFilter filter;
    WearLaws laws;
    ChangeDetector change;
    ExcessSlope slope;
    DutyWindow duty;
    DayTally today;
    SignWatch watch;
    OtherBasis other;
    double doubt = 0.0;          // weight of instruments among the causes
    bool doubted = false;        // enough to hold wear alerts back
    double contradicting = 0.0;  // percent of the last summary's running points
    Level set_aside_level{};     // that the last summary set aside for a broken instrument would have had by itself
    std::array<HeldAlarm, rule_count> alarms;
    double life_running_h = 0.0;
    double life_judged_h = 0.0;
    double fed_running_h = 0.0;  // since the end of run-in
    double fed_judged_h = 0.0;
    double waiting_running_h = 0.0;  // since the filter was last carried forward
    double laws_running_h = 0.0;     // since the laws last took a day
    std::int32_t laws_date = 0;      // of that day
    Instant carried_to;
    Instant seen_to;
    bool seen_any = false;
    bool carried_any = false;
    bool above_sound = false;
    Instant onset;
    ReplacementWatch replacement;
    BaselineKind baseline = BaselineKind::watching_began;  // once the filter is primed
    bool contradicted = false;           // by a reference test: the flow meter is suspect
    double relearned_judged_h = 0.0;     // fed judged hours until which an opened baseline is learned again
    bool drift_established = false;
    std::int32_t drift_days = 0;  // judged days in a row that speak against that
    std::int32_t last_date = 0;
    std::vector<AlarmChange> changes;

    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.life.number, self.life.since, self.filter, self.laws, self.change, self.slope, self.duty, self.today,
           self.watch, self.other.excess_lpm, self.other.excess_low, self.other.excess_high, self.doubt, self.doubted,
           self.contradicting, self.set_aside_level, self.alarms, self.life_running_h, self.life_judged_h,
           self.fed_running_h, self.fed_judged_h, self.waiting_running_h, self.laws_running_h, self.laws_date,
           self.carried_to, self.seen_to, self.seen_any, self.carried_any, self.above_sound, self.onset,
           self.replacement, self.baseline, self.contradicted, self.relearned_judged_h, self.drift_established,
           self.drift_days, self.last_date);
    }

    HeldAlarm& alarm(Rule rule) { return alarms[static_cast<std::size_t>(rule)]; }
    void judge(Rule rule, const RuleJudgement& judgement, const Ladder& ladder, const RuleTiming& timing, Instant at);
    void judge_summary(const Summary& summary, Instant end);
    void judge_instruments(Instant at);
    Signs signs() const;
    CauseSetting setting() const { return {.type = spec.type, .control = spec.control, .basis = basis}; }
    bool broken() const { return watch.instruments().broken(); }
    void weigh_doubt();
    Level held_back() const;
    bool asks_for_causes(Level level, const Signs& now) const;
    void set_aside(const OwnReading& own);
    void judge_step(Instant at);
    void judge_replacement(Instant at);
    void take_into_laws(const DaySpan& day);
    void judge_drift();
    void judge_day(const DayVerdict& day, const RatedEfficiency& efficiency);
    RuleJudgement judge_hours(const DayVerdict& day) const;

    bool settled(double running_h) const;
    void relearn_baseline() { relearned_judged_h = fed_judged_h + spec.baseline.least.h; }
    bool learning() const { return fed_judged_h < spec.baseline.least.h; }
    void count_hours(const Summary& summary);
    void let_go();
    void carry_to(Instant end);
    void feed(const Summary& summary, Instant end);
    SummaryVerdict verdict_on(const Summary& summary, double distance) const;
    double slip_of(const SummaryVerdict& verdict, const SummaryMeans& means) const;

    Level allowed() const { return most_urgent_allowed(spec, basis, filter.laminar_span()); }
    Level most_urgent() const;
    double share_judged(std::int32_t date) const;
    double duty_h_per_day(std::int32_t date) const;
    std::pair<Level, UnjudgedReason> standing(std::int32_t date) const;
    DayVerdict day_so_far(const DaySpan& day, const RatedEfficiency& efficiency) const;
    DayState day_state() const;
    void stamp(DayVerdict& verdict) const;
};

void Course::State::judge(Rule rule, const RuleJudgement& judgement, const Ladder& ladder, const RuleTiming& timing,
                          Instant at) {
    if (std::isnan(judgement.value)) return;
    const bool held = doubted && decides_level(rule);
    auto change_of_alarm = alarm(rule).judge(rule, judgement, ladder, timing, at, held);
    if (!change_of_alarm) return;
    change_of_alarm->life = life.number;
    changes.push_back(*change_of_alarm);
}

void Course::State::judge_summary(const Summary& summary, Instant end) {
    const RuleLimits& limits = spec.limits;
    const auto by_ladder = [&](Rule rule, double value, const Ladder& ladder) {
        judge(rule, judge_ladder(value, ladder), ladder, {ladder.on_delay, ladder.off_delay, 1}, end);
    };
    by_ladder(Rule::drain_share, 100.0 * summary.drain_share, limits.drain_share_percent);
    by_ladder(Rule::over_temperature, summary.highest_temperature_c, limits.over_temperature_c);
    by_ladder(Rule::case_pressure, summary.highest_case_bar, limits.case_pressure_bar);
    by_ladder(Rule::inlet_vacuum, -summary.lowest_inlet_bar, limits.inlet_vacuum_bar);
    const double impossible = contradicted || filter.impossible(summary) ? 100.0 : percent_impossible(summary);
    if (std::isfinite(impossible)) contradicting = impossible;
}

Signs Course::State::signs() const {
    const Step& step = change.step();
    return watch.signs({.ratio = quoted(filter.wear()),
                        .step = step.active,
                        .step_explained = step.attributed,
                        .step_ratio = std::exp(step.ln_size),
                        .slope = slope.slope(),
                        .other = other});
}

// Doubt comes at any summary and goes only with a finished day, so that no alert slips through between two hours.
void Course::State::weigh_doubt() {
    doubt = instrument_doubt(cause_weights(signs(), setting()));
    doubted = doubted || doubt > doubted_from;
}

// The level that is held back, or would be if the hours set aside were judged.
Level Course::State::held_back() const {
    if (!doubted) return Level::unjudged;
    Level level = broken() ? std::max(set_aside_level, Level::watch) : Level::unjudged;
    for (std::size_t i = 0; i < rule_count; ++i)
        if (decides_level(static_cast<Rule>(i))) level = std::max(level, alarms[i].unheld());
    return level;
}

// An hour that rests on a broken instrument moves nothing, but what it would have said is not forgotten.
void Course::State::set_aside(const OwnReading& own) {
    set_aside_level = capped(judge_ladder(own.ratio, spec.limits.leakage_ratio), allowed()).beyond;
    weigh_doubt();
}

void Course::State::judge_instruments(Instant at) {
    const Ladder ladder{.watch = impossible_percent};
    RuleJudgement judgement = judge_ladder(contradicting, ladder);
    if (const Level held = held_back(); held > Level::sound) {
        judgement.value = std::max(judgement.value, 100.0 * doubt);
        judgement.beyond = judgement.within = std::max(judgement.beyond, held);
    }
    judge(Rule::instrument_suspect, judgement, ladder, {}, at);
}

void Course::State::judge_step(Instant at) {
    const Step& step = change.step();
    const double ratio = std::exp(filter.wear().ln);
    RuleJudgement judgement{.value = ratio};
    if (step.active && !step.attributed && ratio > spec.limits.leakage_ratio.watch) {
        judgement = judge_ladder(ratio, spec.limits.leakage_ratio);
        judgement.beyond = std::max(judgement.beyond, Level::watch);
        Ladder left = spec.limits.leakage_ratio;
        left.deadband = std::max(left.deadband, step_deadband);
        judgement.within = std::max(judge_ladder(ratio, left).within, Level::watch);
    }
    judge(Rule::step_change, capped(judgement, allowed()), spec.limits.leakage_ratio, {}, at);
}

void Course::State::judge_replacement(Instant at) {
    const bool likely = replacement.likely().at.has_value();
    const Level level = likely ? Level::watch : Level::unjudged;
    judge(Rule::unrecorded_replacement, {.beyond = level, .within = level, .value = std::exp(filter.wear().ln)}, {}, {},
          at);
}

bool Course::State::settled(double running_h) const {
    const auto& most = spec.baseline.most;
    return most && fed_judged_h >= relearned_judged_h && fed_running_h + running_h / 2.0 > most->h;  // by the middle of the summary at hand
}

void Course::State::count_hours(const Summary& summary) {
    if (seen_any) {
        const double gap_h = hours(summary.start - seen_to);
        const double usual = duty.running_h_per_day(last_date);
        if (gap_h > long_gap_h && std::isfinite(usual)) {
            waiting_running_h += gap_h * usual / hours_per_day;
            laws_running_h += gap_h * usual / hours_per_day;
        }
    }
    seen_any = true;
    seen_to = summary.start + summary.length;
    waiting_running_h += summary.running_h;
    laws_running_h += summary.running_h;
    life_running_h += summary.running_h;
    life_judged_h += summary.judged_h;
    today.count(summary);
}

void Course::State::carry_to(Instant end) {
    if (carried_any) filter.advance(waiting_running_h / hours_per_day, hours(end - carried_to) / hours_per_day);
    carried_any = true;
    carried_to = end;
    waiting_running_h = 0.0;
}

void Course::State::let_go() {
    filter.open_wear();
    laws.let_go();
    today.mark_let_go();
}

void Course::State::feed(const Summary& summary, Instant end) {
    carry_to(end);
    const bool baseline_settled = settled(summary.running_h);
    const bool watching = !learning() || baseline_settled;
    if (watching) {
        const double surprise = filter.surprise(summary);
        if (means_of(summary, filter).distance > range_change) change.explain(summary.start);
        replacement.note(surprise, summary.start, life_running_h, filter.wear());
        if (change.add(surprise, summary.start, life_running_h, filter.wear())) {
            let_go();
            if (watch.begin_departure(change.departed())) slope.begin_anew();
        }
    }
    if (!filter.primed()) baseline = baseline_kind(spec);
    filter.feed(summary, baseline_settled);
    fed_running_h += summary.running_h;
    fed_judged_h += summary.judged_h;
    today.mark_fed();
    if (!watching) return;
    if (change.follow(filter.wear(), end, life_running_h, spec.limits.step_lasting.h)) today.mark_step(std::exp(change.step().ln_size));
    if (change.step().active) weigh_doubt();
    judge_step(end);
    replacement.follow(filter.wear(), life_running_h);
    judge_replacement(end);
}

SummaryVerdict Course::State::verdict_on(const Summary& summary, double distance) const {
    SummaryVerdict verdict;
    verdict.start = summary.start;
    if (!filter.primed() || !has_judged(summary) || filter.impossible(summary)) return verdict;
    const OwnReading own = filter.own_reading(summary);
    const double reach = quantile_90 * own.ratio_sd;
    verdict.leakage_ratio = {.value = own.ratio, .low = own.ratio - reach, .high = own.ratio + reach};
    verdict.filtered_ratio = quoted(filter.wear());
    verdict.efficiency = rated_efficiency(filter, spec, basis).now;
    verdict.leakage_lpm = own.leakage_lpm;
    verdict.excess_lpm = own.leakage_lpm - own.healthy_lpm;
    verdict.leakage_kw = hydraulic_power_kw(means_of(summary, filter).pressure_rise_bar, own.leakage_lpm);
    verdict.outside_coverage = distance > range_change;
    return verdict;
}

double Course::State::slip_of(const SummaryVerdict& verdict, const SummaryMeans& means) const {
    return slip_coefficient({.leakage_lpm = verdict.leakage_lpm,
                             .viscosity_pas = means.viscosity_cst * spec.fluid.density_kgm3(means.temperature_c) * 1e-6,
                             .displacement_cm3 = spec.displacement_cm3,
                             .pressure_rise_bar = means.pressure_rise_bar});
}

Level Course::State::most_urgent() const {
    Level level = Level::unjudged;
    for (std::size_t i = 0; i < rule_count; ++i)
        if (decides_level(static_cast<Rule>(i))) level = std::max(level, alarms[i].level());
    return level;
}

double Course::State::share_judged(std::int32_t date) const {
    const DutyDay total = duty.total(date, today.duty());
    return total.running_h > 0.0 ? total.judged_h / total.running_h : unknown;
}

std::pair<Level, UnjudgedReason> Course::State::standing(std::int32_t date) const {
    const Level active = most_urgent();
    if (active > Level::sound) return {active, UnjudgedReason::none};
    if (held_back() > Level::sound) return {Level::unjudged, UnjudgedReason::instrument};
    const UnjudgedReason reason =
        unjudged_reason({.temperature = spec.has_temperature_sensor,
                         .shared_drain = spec.shared_drain && basis == Basis::case_drain,
                         .judged_yet = life_judged_h > 0.0,
                         .learning_h_left = std::max(spec.baseline.least.h - fed_judged_h, 0.0),
                         .share_judged = share_judged(date)});
    return {reason == UnjudgedReason::none ? Level::sound : Level::unjudged, reason};
}

DayVerdict Course::State::day_so_far(const DaySpan& day, const RatedEfficiency& efficiency) const {
    DayVerdict verdict;
    verdict.day = day;
    verdict.life = life.number;
    verdict.leakage_ratio = quoted(filter.wear());
    verdict.efficiency = efficiency.now;
    verdict.efficiency_baseline = efficiency.healthy;
    verdict.efficiency_at_rated = efficiency.at_rated;
    if (!change.step().active)
        verdict.clearance_growth_percent = 100.0 * clearance_growth(filter.coefficients(), verdict.leakage_ratio.value);
    today.fill(verdict);
    verdict.baseline = filter.primed() ? baseline : baseline_kind(spec);
    verdict.replacement = replacement.likely();
    if (filter.primed()) {
        verdict.zero_lpm = filter.belief().mean(meter_zero);
        verdict.healthy = leakage_law(filter.coefficients(), reference_state(spec));
        verdict.healthy_sd = filter.healthy_leakage(spec.reference).sd;
    }
    verdict.hours_in_hand =
        hours_to(laws, spec.life_prior, first_limit(filter, spec, basis, efficiency), drift_established);
    verdict.hours_in_hand.duty_h_per_day = duty_h_per_day(day.date);
    verdict.state = day_state();
    today.fill(verdict.state);
    verdict.life_running_h = life_running_h;
    verdict.life_judged_h = life_judged_h;
    verdict.learning_h_left = std::max(spec.baseline.least.h - fed_judged_h, 0.0);
    verdict.share_judged_30d = share_judged(day.date);
    return verdict;
}

// As the filter stands, and the laws by the days alone.
DayState Course::State::day_state() const {
    DayState state;
    if (!filter.primed()) return state;
    const WearBelief& belief = filter.belief();
    state.wear = belief.mean(ln_wear);
    state.drift = belief.mean(drift);
    state.disturbance = belief.mean(disturbance);
    state.wear_variance = belief.covariance(ln_wear, ln_wear);
    state.wear_drift_covariance = belief.covariance(ln_wear, drift);
    state.drift_variance = belief.covariance(drift, drift);
    state.wear_disturbance_covariance = belief.covariance(ln_wear, disturbance);
    state.drift_disturbance_covariance = belief.covariance(drift, disturbance);
    state.disturbance_variance = belief.covariance(disturbance, disturbance);
    const auto by_days = laws.laws(LifePrior{}.laws);
    for (std::size_t i = 0; i < wear_laws; ++i) state.laws[i] = by_days[i].weight;
    return state;
}

void Course::State::take_into_laws(const DaySpan& day) {
    if (!laws.begun())
        laws.begin(filter.wear(), basis);
    else
        laws.take(today.ln_ratio(), laws_running_h / hours_per_day, day.date - laws_date, basis);
    laws_running_h = 0.0;
    laws_date = day.date;
}

void Course::State::judge_drift() {
    const bool sure = laws.drift(spec.life_prior.laws).positive > sure_drift;
    drift_days = sure == drift_established ? 0 : drift_days + 1;
    if (drift_days < drift_days_wanted) return;
    drift_established = !drift_established;
    drift_days = 0;
}

// What follows from the alarms as they stand: level, reason, trend and cause.
void Course::State::stamp(DayVerdict& verdict) const {
    std::tie(verdict.level, verdict.reason) = standing(verdict.day.date);
    verdict.trend.per_1000_h = growth_per_1000_h(std::exp(filter.wear().ln), laws.drift(spec.life_prior.laws));
    verdict.trend.established = drift_established;
    if (above_sound) verdict.trend.onset = onset;
    const Signs now = signs();
    if (!asks_for_causes(verdict.level, now)) return;
    verdict.causes = rank_causes(now, setting());
    verdict.cause = verdict.causes.front().kind;
    verdict.cause_weight = verdict.causes.front().weight;
}

bool Course::State::asks_for_causes(Level level, const Signs& now) const {
    const bool alarmed =
        std::any_of(alarms.begin(), alarms.end(), [](const HeldAlarm& alarm) { return alarm.level() > Level::sound; });
    return level > Level::sound || alarmed || doubted || watch.ask_for_explanation(now);
}

double Course::State::duty_h_per_day(std::int32_t date) const {
    return std::isfinite(spec.duty_h_per_week) ? spec.duty_h_per_week / 7.0 : duty.running_h_per_day(date);
}

// `plan` once the 10 % quantile, as a date, falls before a spare ordered today is here, or before the second-next
// planned stop.
RuleJudgement Course::State::judge_hours(const DayVerdict& day) const {
    const HoursInHand& left = day.hours_in_hand;
    if (!laws.begun()) return {};
    RuleJudgement judgement{.value = std::isfinite(left.low) ? left.low : no_end_h};
    if (!drift_established || !(left.duty_h_per_day > 0.0)) return judgement;
    const double days_left = judgement.value / left.duty_h_per_day;
    double wait_days = spec.spare_lead_days;
    if (spec.second_next_planned_stop)
        wait_days = std::fmax(wait_days, hours(*spec.second_next_planned_stop - day.day.end) / hours_per_day);
    if (days_left < wait_days) judgement.beyond = Level::plan;
    if (days_left < hours_deadband * wait_days) judgement.within = Level::plan;
    return judgement;
}

void Course::State::judge_day(const DayVerdict& day, const RatedEfficiency& efficiency) {
    const RuleLimits& limits = spec.limits;
    const auto daily = [&](Rule rule, const RuleJudgement& judgement, const Ladder& ladder) {
        RuleTiming timing = two_judged_days;
        timing.on_delay = ladder.on_delay;
        timing.off_delay = ladder.off_delay;
        judge(rule, capped(judgement, allowed()), ladder, timing, day.day.end);
    };
    daily(Rule::leakage_ratio, judge_ratio(day.leakage_ratio, limits.leakage_ratio), limits.leakage_ratio);
    daily(Rule::efficiency, judge_points_lost(efficiency.points_lost, limits.efficiency_points_lost),
          limits.efficiency_points_lost);
    daily(Rule::hours_in_hand, judge_hours(day), {});
}

Course::Course(Basis basis) : state_(std::make_unique<State>()) {
    state_->basis = basis;
}
Course::~Course() = default;
Course::Course(Course&&) noexcept = default;
Course& Course::operator=(Course&&) noexcept = default;

void Course::begin_life(const LifeStart& life, const SectionSpec& spec) {
    auto next = std::make_unique<State>();
    for (std::size_t i = 0; i < rule_count; ++i) {
        auto ended = state_->alarms[i].end(static_cast<Rule>(i), life.since);
        if (!ended) continue;
        ended->life = state_->life.number;
        state_->changes.push_back(*ended);
    }
    next->changes = std::move(state_->changes);
    next->duty = state_->duty;
    next->today.keep_hours_of(state_->today);
    next->last_date = state_->last_date;
    next->basis = state_->basis;
    next->spec = spec;
    next->life = life;
    next->filter.begin(spec, next->basis);
    state_ = std::move(next);
}

void Course::change_facts(Instant at, const SectionSpec& spec, const FactChange& change) {
    State& s = *state_;
    s.watch.change_facts(s.spec, spec);
    s.spec = spec;
    s.filter.adopt(spec);
    s.filter.open_for(change);
    s.change.explain(at);
    s.replacement.explain(at);
    if (change.changes(flow_quantity(s.basis))) s.contradicted = false;
    if (change.opens_baseline(s.basis)) s.relearn_baseline();
}

void Course::reference_test(Instant at, const ReferenceTest& test) {
    State& s = *state_;
    const auto tested = test.of == s.basis ? tested_leakage(test, s.spec) : std::nullopt;
    if (!tested || !s.filter.primed()) return;
    if (at > s.carried_to) s.carry_to(at);
    s.contradicted = s.filter.heed_test(*tested);
    if (test.as_new) {
        s.filter.heed_as_new();
        s.baseline = BaselineKind::reference_test;
    }
    if (!s.contradicted) return;
    s.change.explain(at);
    s.replacement.explain(at);
    s.relearn_baseline();
}

void Course::hear_other_basis(const DayVerdict& other) {
    state_->other = other_basis_of(other);
}

SummaryVerdict Course::take(const Summary& summary) {
    State& s = *state_;
    const Instant end = summary.start + summary.length;
    const bool running_in = s.life_running_h < s.spec.baseline.run_in.h;
    const bool possible = has_judged(summary) && !s.filter.impossible(summary);
    const OwnReading before = possible ? s.filter.own_reading(summary) : OwnReading{};
    if (!running_in) s.watch.add(summary, before, s.filter.coefficients(), s.spec);
    const bool fit = possible && !s.broken();
    if (s.broken()) s.set_aside(before);
    const double distance = fit ? means_of(summary, s.filter).distance : 0.0;
    s.count_hours(summary);
    s.judge_summary(summary, end);
    if (fit && !running_in) s.feed(summary, end);
    s.judge_instruments(end);
    SummaryVerdict verdict;
    verdict.start = summary.start;
    if (fit) verdict = s.verdict_on(summary, distance);
    if (fit) s.today.add(verdict, s.slip_of(verdict, means_of(summary, s.filter)), summary.judged_h);
    if (fit && !running_in)
        s.slope.add({.leakage_lpm = verdict.leakage_lpm, .healthy_lpm = verdict.leakage_lpm - verdict.excess_lpm});
    std::tie(verdict.level, verdict.reason) = s.standing(s.last_date);
    return verdict;
}

DayVerdict Course::quote(const DaySpan& day) const {
    DayVerdict verdict = state_->day_so_far(day, rated_efficiency(state_->filter, state_->spec, state_->basis));
    state_->stamp(verdict);
    return verdict;
}

DayVerdict Course::finish_day(const DaySpan& day) {
    State& s = *state_;
    const RatedEfficiency efficiency = rated_efficiency(s.filter, s.spec, s.basis);
    const bool judged = s.today.fed() && !s.learning();
    if (judged) {
        s.take_into_laws(day);
        s.judge_drift();
    }
    s.weigh_doubt();
    if (s.doubt < doubted_until) s.doubted = false;
    DayVerdict verdict = s.day_so_far(day, efficiency);
    if (judged) s.judge_day(verdict, efficiency);
    s.judge_instruments(day.end);
    const bool above = s.most_urgent() > Level::sound;
    if (above && !s.above_sound) s.onset = day.begin;
    s.above_sound = above;
    s.stamp(verdict);
    s.duty.add(day.date, s.today.duty());
    s.last_date = day.date;
    s.today = DayTally{};
    return verdict;
}

std::vector<AlarmChange> Course::drain_alarm_changes() {
    return std::exchange(state_->changes, {});
}

const WearFilter& Course::filter() const {
    return state_->filter;
}

std::vector<std::byte> Course::checkpoint() const {
    CheckpointWriter writer;
    writer(checkpoint_version, state_->basis, *state_);
    return writer.take();
}

std::optional<Course> Course::restore(std::span<const std::byte> bytes, const SectionSpec& spec) {
    std::uint32_t version = 0;
    Course course(Basis::case_drain);
    CheckpointReader reader(bytes);
    reader(version);
    if (version != checkpoint_version) return std::nullopt;
    reader(course.state_->basis, *course.state_);
    if (!reader.complete()) return std::nullopt;
    course.state_->spec = spec;
    course.state_->filter.attach(spec, course.state_->basis);
    return course;
}

}  // namespace slipledger::analytics
