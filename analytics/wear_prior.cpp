#include "analytics/wear_prior.hpp"

#include <algorithm>
#include <cmath>

#include "analytics/flow.hpp"

namespace slipledger::analytics {

namespace {

constexpr std::array<double, 3> share{1.0, 0.15, 0.06};
constexpr std::array<double, 3> share_sd{0.6, 0.7, 0.7};
constexpr double level_sd = 0.6;
constexpr double least_slip = 0.005;  // of theoretical flow: no displacement pump leaks less or, healthy, more
constexpr double most_slip = 0.15;
constexpr double zero_of_flow = 0.002;  // a meter's zero where its accuracy is not told, of theoretical flow
constexpr double pilot_of_flow = 0.01;  // of theoretical flow, give or take as much
constexpr double drift_sd = 0.0008;     // per running day
constexpr double taken_over_sd = 0.35;  // ln of what a pump may have worn before it was watched

double square(double v) {
    return v * v;
}

void spread_level(WearBelief& belief, double level) {
    for (int i = 0; i < 3; ++i) {
        const auto at = static_cast<std::size_t>(i);
        belief.mean(i) = level + std::log(share[at]);
        for (int j = 0; j < 3; ++j) belief.covariance(i, j) = square(level_sd);
        belief.covariance(i, i) += square(share_sd[at]);
    }
}

// A figure of healthy leakage as one sighting of ln(a f1 + b f2 + c f3); false: it says nothing.
bool heed(WearBelief& belief, double leakage_lpm, const Features& f, double sd) {
    if (!(leakage_lpm > 0.0) || !std::isfinite(f.laminar + f.orifice + f.speed)) return false;
    const Eigen::Vector3d features(f.laminar, f.orifice, f.speed);
    const auto parts = [&] { return (belief.mean.head<3>().array().exp() * features.array()).matrix().eval(); };
    belief.mean.head<3>().array() += std::log(leakage_lpm / parts().sum());
    stats::Sighting<wear_states> seen;
    seen.design.head<3>() = parts() / leakage_lpm;
    seen.variance = square(sd);
    stats::take_in(belief, seen, stats::best_gain(belief, seen));
    return true;
}

bool heed_test(WearBelief& belief, const SectionSpec& spec) {
    const MakerTest& test = *spec.maker_test;
    const LeakageState at = leakage_state(test.at, test.viscosity_cst, spec);
    return heed(belief, test.leakage_lpm, features_at(at, reference_state(spec)), test.accuracy);
}

// What says how much the part leaked when new, if anything does.
bool heed_what_is_told(WearBelief& belief, const SectionSpec& spec) {
    if (spec.maker_test) return heed_test(belief, spec);
    return spec.sisters && heed(belief, spec.sisters->leakage_lpm, Features{}, spec.sisters->sd);
}

}  // namespace

LeakageState leakage_state(const DutyPoint& at, const Fluid& fluid) {
    return {.pressure_rise_bar = at.pressure_bar,
            .viscosity_pas = fluid.dynamic_pas(at.temperature_c),
            .density_kgm3 = fluid.density_kgm3(at.temperature_c),
            .speed_rpm = at.speed_rpm};
}

LeakageState leakage_state(const DutyPoint& at, double viscosity_cst, const SectionSpec& spec) {
    const auto told_or = [](double told, double otherwise) { return std::isfinite(told) ? told : otherwise; };
    LeakageState state = leakage_state({.pressure_bar = told_or(at.pressure_bar, spec.reference.pressure_bar),
                                        .speed_rpm = told_or(at.speed_rpm, spec.reference.speed_rpm),
                                        .temperature_c = told_or(at.temperature_c, spec.reference.temperature_c)},
                                       spec.fluid);
    if (std::isfinite(viscosity_cst)) state.viscosity_pas = viscosity_cst * state.density_kgm3 * 1e-6;
    return state;
}

BaselineKind baseline_kind(const SectionSpec& spec) {
    if (spec.maker_test) return spec.maker_test->made_here ? BaselineKind::reference_test : BaselineKind::maker_test;
    if (spec.watched_from_new) return BaselineKind::from_new;
    return spec.sisters ? BaselineKind::sisters : BaselineKind::watching_began;
}

double zero_spread(const SectionSpec& spec, Basis basis) {
    const FlowMeter& meter = basis == Basis::delivery ? spec.delivery_meter : spec.drain_meter;
    if (std::isfinite(meter.accuracy_lpm)) return meter.accuracy_lpm;
    return zero_of_flow *
           theoretical_flow_lpm(spec.displacement_cm3, spec.reference.speed_rpm, spec.max_stroke_fraction);
}

double disturbance_spread(Basis basis) {
    return basis == Basis::case_drain ? 0.03 : 0.05;
}

WearBelief prior_belief(const SectionSpec& spec, Basis basis, double first_leakage_lpm, const Features& features) {
    WearBelief belief;
    const double flow = theoretical_flow_lpm(spec.displacement_cm3, spec.reference.speed_rpm, spec.max_stroke_fraction);
    const double weight = healthy_leakage_lpm({share[0], share[1], share[2]}, features);
    const double level = std::clamp(first_leakage_lpm, least_slip * flow, most_slip * flow) / weight;
    spread_level(belief, std::log(level));
    const bool told = heed_what_is_told(belief, spec);
    const bool by_delivery = basis == Basis::delivery;
    const FlowMeter& meter = by_delivery ? spec.delivery_meter : spec.drain_meter;
    // A meter's gain error that stays put looks just like a displacement that is off.
    const double displacement_sd =
        by_delivery ? spec.displacement_cm3 * std::hypot(spec.displacement_accuracy, meter.gain_error) : 0.0;
    belief.mean(pilot) = pilot_of_flow * flow;
    belief.covariance(displacement, displacement) = square(displacement_sd);
    belief.covariance(meter_zero, meter_zero) = square(zero_spread(spec, basis));
    belief.covariance(pilot, pilot) = square(pilot_of_flow * flow);
    if (told && !spec.watched_from_new) belief.covariance(ln_wear, ln_wear) = square(taken_over_sd);
    belief.covariance(drift, drift) = square(drift_sd);
    belief.covariance(disturbance, disturbance) = square(disturbance_spread(basis));
    return belief;
}

}  // namespace slipledger::analytics
