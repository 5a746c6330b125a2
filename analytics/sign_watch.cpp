#include "analytics/sign_watch.hpp"

#include <algorithm>
#include <cmath>

#include "analytics/flow.hpp"
#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

namespace {

constexpr Pace by_shifts{.learn = 50.0, .memory = 12.0};  // running hours
constexpr Pace by_stops{.learn = 12.0, .memory = 6.0};    // summaries with a settled stop
constexpr double least_departure = 0.1;                   // in ln ratio
constexpr double fresh_h = 24.0;                          // after a step only what came after it counts
constexpr double usually_plateau = 0.2;      // share of points: less often, the highest pressure is not the plateau
constexpr double least_ratio_to_test = 1.1;  // nearer to 1 a slope cannot tell wear from a constant
constexpr double slope_error_share = 0.15;   // of the excess: three terms fit no pump exactly
constexpr double successive_hours = 2.0;     // on a standard error: an hour is like the one before it
constexpr double stopped_share = 0.05;       // of leakage: a smaller excess makes no measure of a zero

SignReading sign_of(double value, double beside, double strength) {
    const bool known = std::isfinite(value) && std::isfinite(strength);
    return {.known = known, .strength = known ? strength : 0.0, .value = value, .beside = beside};
}

// Judged regime with most points; null where nothing was judged.
const Moments* dominant(const Summary& summary) {
    const auto& [full, compensating] = summary.judged;
    const Moments& most = compensating.count > full.count ? compensating : full;
    return most.count > 0 ? &most : nullptr;
}

double share_of(const Summary& summary, Standing standing) {
    double running = 0.0;
    for (std::size_t i = 0; i < standing_count; ++i)
        if (static_cast<Standing>(i) != Standing::stopped) running += summary.counts[i];
    return running > 0.0 ? summary.counts[static_cast<std::size_t>(standing)] / running : unknown;
}

// What a slope is not known by beside its own error: hours are alike, and three terms fit no pump exactly.
std::optional<Slope> with_model_error(const std::optional<Slope>& slope, double excess) {
    if (!slope) return std::nullopt;
    return slope_of(slope->value,
                    std::hypot(successive_hours * slope->standard_error, slope_error_share * excess, 0.05));
}

}  // namespace

OtherBasis other_basis_of(const DayVerdict& verdict) {
    const Ranged& ratio = verdict.leakage_ratio;
    const double healthy = verdict.leakage_lpm - verdict.excess_lpm;
    return {.excess_lpm = (ratio.value - 1.0) * healthy,
            .excess_low = (ratio.low - 1.0) * healthy,
            .excess_high = (ratio.high - 1.0) * healthy};
}

SignWatch::SignWatch()
    : share_(by_shifts),
      viscosity_(by_shifts),
      pressure_(by_shifts),
      highest_pressure_(by_shifts),
      compensating_(by_shifts),
      case_pressure_(by_shifts),
      inlet_(by_shifts),
      stop_flow_(by_stops),
      leakage_(by_shifts),
      excess_(by_shifts) {}

void SignWatch::add(const Summary& summary, const OwnReading& own, const LeakageCoefficients& coefficients,
                    const SectionSpec& spec) {
    basis_ = summary.basis;
    rated_cst_ = spec.fluid.kinematic_cst(spec.rated.temperature_c);
    instruments_.add(summary, spec);
    take_running(summary);
    if (!instruments_.broken()) take_leakage(summary, own, coefficients, spec);
}

void SignWatch::take_running(const Summary& summary) {
    const double h = summary.running_h;
    pressure_.add(summary.mean_pressure_bar, h);
    highest_pressure_.add(summary.pressure_bar.high, h);
    compensating_.add(share_of(summary, Standing::compensating), h);
    case_pressure_.add(summary.highest_case_bar, h);
    inlet_.add(summary.lowest_inlet_bar, h);
    if (summary.stop_count > 0) stop_flow_.add(summary.stop_flow_lpm, 1.0);
}

void SignWatch::take_leakage(const Summary& summary, const OwnReading& own, const LeakageCoefficients& coefficients,
                             const SectionSpec& spec) {
    const Moments* moments = dominant(summary);
    if (moments == nullptr) return;
    const double h = summary.judged_h;
    viscosity_.add(moments->viscosity_cst, h);
    share_.add(moments->leakage_lpm / theoretical_flow_lpm(spec.displacement_cm3, moments->speed_rpm), h);
    if (!(own.leakage_lpm > 0.0) || !(own.healthy_lpm > 0.0)) return;
    leakage_.add(own.leakage_lpm, h);
    excess_.add(own.leakage_lpm - own.healthy_lpm, h);
    pattern_.add(*moments, coefficients, h);
    departure_.add(summary.start, own, h);
    since_departure_h_ += h;
}

bool SignWatch::begin_departure(Instant began) {
    if (!departure_.begin(began)) return false;
    since_departure_h_ = 0.0;
    return true;
}

void SignWatch::change_facts(const SectionSpec& before, const SectionSpec& now) {
    instruments_.begin_anew();
    if (before.compensator_bar != now.compensator_bar) highest_pressure_.forget();
}

Signs SignWatch::signs(const LeakageStanding& leakage) const {
    Signs signs;
    instruments_.fill(signs);
    fill_leakage(signs, leakage);
    fill_slope(signs, leakage);
    fill_zero(signs);
    fill_oil(signs);
    fill_ports(signs);
    fill_pattern(signs, leakage);
    fill_departure(signs, leakage);
    fill_other_basis(signs, leakage);
    return signs;
}

void SignWatch::fill_leakage(Signs& signs, const LeakageStanding& leakage) const {
    const Ranged& ratio = leakage.ratio;
    // Plain where `watch` begins to be possible: its low end half way to the limit of 1.17.
    signs[Sign::ratio_up] = sign_of(ratio.value, ratio.low, strength_between(ratio.low, 1.0, 1.085));
    signs[Sign::ratio_down] = sign_of(ratio.value, ratio.high, strength_between(ratio.high, 1.0, 0.9));
    const double step = leakage.step ? 1.0 : 0.0;
    signs[Sign::step] = {.known = true, .strength = step, .value = leakage.step_ratio};
    signs[Sign::step_explained] = {
        .known = leakage.step, .strength = leakage.step_explained ? step : 0.0, .value = leakage.step_ratio};
}

// The slope over a hundred hours and the one within hours, each by what is known of it.
std::optional<Slope> SignWatch::slope_of_all(const std::optional<Slope>& between_hours, double excess) const {
    double weights = 0.0;
    double sum = 0.0;
    for (const auto& slope : {between_hours, pattern_.slope(since_departure_h_ < fresh_h)}) {
        const auto found = with_model_error(slope, excess);
        if (!found) continue;
        const double weight = 1.0 / (found->standard_error * found->standard_error);
        weights += weight;
        sum += weight * found->value;
    }
    if (!(weights > 0.0)) return std::nullopt;
    return slope_of(sum / weights, 1.0 / std::sqrt(weights));
}

// Two lines are held beside what is seen: wear, whose slope is the ratio, and something added, whose slope is 1.
void SignWatch::fill_slope(Signs& signs, const LeakageStanding& leakage) const {
    const double worn = leakage.ratio.value;
    if (!(worn > least_ratio_to_test)) return;
    const auto slope = slope_of_all(leakage.slope, worn - 1.0);
    if (!slope) return;
    const auto off = [](const Slope& found, double expected) {
        return (found.value - expected) / found.standard_error;
    };
    // Thick oil comes and goes with days, not within the hour.
    const auto by_days = with_model_error(leakage.slope, worn - 1.0);
    const double thick = by_days ? strength_between(off(*by_days, 1.0), -1.5, -3.0) : 0.0;
    const double wear = off(*slope, worn);
    const double constant = off(*slope, 1.0);
    const double for_constant = (wear * wear - constant * constant) / 2.0;
    const bool scales = slope->low > 1.1 && for_constant < 0.0;
    signs[Sign::excess_scales] = sign_of(slope->value, slope->low, scales ? 1.0 : 0.0);
    signs[Sign::excess_constant] =
        sign_of(slope->value, slope->high, scales ? 0.0 : (1.0 - thick) * strength_between(for_constant, 1.0, 4.0));
    if (by_days) signs[Sign::worse_when_thick] = sign_of(by_days->value, by_days->high, thick);
}

void SignWatch::fill_zero(Signs& signs) const {
    if (!stop_flow_.known() || !(excess_.recent() > stopped_share * leakage_.recent())) return;
    const double more = (basis_ == Basis::case_drain ? 1.0 : -1.0) * stop_flow_.moved();
    signs[Sign::zero_moved] =
        sign_of(stop_flow_.recent(), stop_flow_.learned(), strength_between(more / excess_.recent(), 0.2, 0.6));
}

void SignWatch::fill_oil(Signs& signs) const {
    if (share_.known() && share_.learned() > 0.0 && share_.recent() > 0.0) {
        const double ln = std::log(share_.recent() / share_.learned());
        const double now = 100.0 * share_.recent();
        const double then = 100.0 * share_.learned();
        signs[Sign::share_up] = sign_of(now, then, strength_between(ln, 0.08, 0.22));
        signs[Sign::share_down] = sign_of(now, then, strength_between(-ln, 0.1, 0.3));
    }
    if (viscosity_.known())
        signs[Sign::oil_thinner] =
            sign_of(viscosity_.recent(), viscosity_.learned(),
                    strength_between(std::log(viscosity_.learned() / viscosity_.recent()), 0.08, 0.25));
    if (pressure_.known())
        signs[Sign::pressure_up] = sign_of(pressure_.recent(), pressure_.learned(),
                                           strength_between(pressure_.recent() / pressure_.learned(), 1.05, 1.2));
}

void SignWatch::fill_ports(Signs& signs) const {
    if (case_pressure_.known()) {
        const double from = std::max({0.2, 0.3 * case_pressure_.learned(), 2.0 * case_pressure_.learned_sd()});
        signs[Sign::case_pressure_up] = sign_of(case_pressure_.recent(), case_pressure_.learned(),
                                                strength_between(case_pressure_.moved(), from, 2.5 * from));
    }
    if (inlet_.known()) {
        const double from = std::max(0.04, inlet_.learned_sd());
        signs[Sign::inlet_lower] =
            sign_of(inlet_.recent(), inlet_.learned(), strength_between(-inlet_.moved(), from, from + 0.12));
    }
    if (highest_pressure_.known() && compensating_.known() && compensating_.learned() > usually_plateau) {
        const double learned = highest_pressure_.learned();
        const double from = std::max(0.012, highest_pressure_.learned_sd() / learned);
        const double moved = std::abs(highest_pressure_.moved()) / learned;
        signs[Sign::plateau_moved] =
            sign_of(highest_pressure_.recent(), learned, strength_between(moved, from, from + 0.02));
    }
}

void SignWatch::fill_pattern(Signs& signs, const LeakageStanding& leakage) const {
    // A worn pump's scatter grows with its leakage.
    const double grown = pattern_.scatter_grown() / std::fmax(1.0, leakage.ratio.value);
    signs[Sign::unsteady] = sign_of(grown, 1.0, strength_between(std::log(grown), 0.3, 0.9));
    if (const auto slope = pattern_.slope(false))
        signs[Sign::pattern_lost] = sign_of(slope->value, 1.0, strength_between(slope->value, 0.6, 0.3));
}

// Where leakage departed, what was seen ought to have moved. If instead what is expected of it moved, and by enough to
// account for the ratio as it stands, the reading behind that did.
void SignWatch::fill_departure(Signs& signs, const LeakageStanding& leakage) const {
    const DepartureChanges changes = departure_.changes();
    const double ln_ratio = std::log(leakage.ratio.value);
    if (!(ln_ratio > least_departure) || !(changes.seen - changes.expected > least_departure)) return;
    const double share_of_departure = changes.seen / (changes.seen - changes.expected);
    const double out_of_daily_life = -changes.expected / std::max(changes.expected_scatter, 0.05);
    const double accounts_for = -changes.expected / ln_ratio;
    const double strength =
        std::min({strength_between(share_of_departure, 0.35, 0.1), strength_between(out_of_daily_life, 0.5, 1.0),
                  strength_between(accounts_for, 0.4, 0.7)});
    signs[Sign::flow_unmoved] =
        sign_of(100.0 * std::expm1(changes.seen), 100.0 * std::expm1(changes.expected), strength);
}

void SignWatch::fill_other_basis(Signs& signs, const LeakageStanding& leakage) const {
    const OtherBasis& other = leakage.other;
    const double own = excess_.recent();
    if (!(leakage.ratio.low > 1.03) || !(own > 0.0) || !std::isfinite(other.excess_low + other.excess_high)) return;
    signs[Sign::other_basis_agrees] =
        sign_of(other.excess_lpm, own, strength_between(other.excess_low / own, 0.25, 0.6));
    signs[Sign::other_basis_differs] =
        sign_of(other.excess_lpm, own, strength_between(other.excess_high / own, 0.55, 0.25));
}

bool SignWatch::ask_for_explanation(const Signs& signs) const {
    constexpr double plain = 0.8;
    constexpr double far_below = 0.8;  // high end of a leakage ratio that slow disturbances do not explain
    constexpr double thin = 0.8;       // of the viscosity at rated temperature
    for (const Sign sign : {Sign::unit_jump, Sign::stuck, Sign::off_the_scale, Sign::contradicting, Sign::missing,
                            Sign::flow_at_standstill, Sign::plateau_moved, Sign::case_pressure_up, Sign::inlet_lower,
                            Sign::pattern_lost, Sign::step})
        if (signs[sign].strength >= plain) return true;
    if (signs[Sign::ratio_down].beside < far_below) return true;
    return viscosity_.recent() < thin * rated_cst_ &&
           std::min(signs[Sign::share_up].strength, signs[Sign::oil_thinner].strength) >= plain;
}

}  // namespace slipledger::analytics
