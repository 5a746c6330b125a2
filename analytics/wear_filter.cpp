#include "analytics/wear_filter.hpp"

#include <algorithm>
#include <cmath>

#include <Eigen/Eigenvalues>

#include "analytics/operating_point.hpp"
#include "analytics/reopening.hpp"
#include "analytics/wear_motion.hpp"

namespace slipledger::analytics {

namespace {

constexpr double model_error = 0.06;        // of predicted leakage: how well three terms describe a pump; alike for hours on end
constexpr double contrast_error = 0.20;     // of a contrast: gaps bend and warm with pressure, hour after hour alike
constexpr double least_swing = 0.03;        // of the reference features: smaller swings are mostly gauge noise
constexpr double hourly_gain_share = 0.3;   // of a meter's gain error that comes and goes; the rest is one with dV
constexpr double stop_repeatability = 0.3;  // of the meter's accuracy, from one stop to the next
constexpr double outside_error = 0.3;       // of predicted leakage per unit of distance in ln dp, ln mu
constexpr double huber_limit = 2.5;
constexpr double misfit_memory = 100.0;  // summaries
constexpr double most_misfit = 4.0;      // standard deviations counted of one summary
constexpr double longest_step = 0.5;     // in any logarithm, by one sighting
constexpr double loose = 0.10;           // of predicted leakage: relinearise while less sure than this
constexpr int relinearisations = 3;
constexpr double speed_told_apart = 1.3;  // speed must vary by this factor before the speed term is learned
constexpr double most_lowered = 0.15;  // in ln ratio, of a life's baseline
constexpr double contradicting = 3.0;      // standard deviations between a reference test and what was expected
constexpr double test_model_error = 0.03;  // of predicted leakage, at a set point that is held
constexpr double least_worn = 0.1;         // of what was expected: a test that saw less still has a logarithm
constexpr double as_new_sd = 0.05;
constexpr double most_leakage = 1.2;      // of theoretical flow
constexpr double least_leakage = -0.2;

double square(double v) {
    return v * v;
}

// Rows of the packed lower triangle of Moments::covariance.
Eigen::Matrix3d feature_covariance(const Moments& m) {
    const auto& c = m.covariance;
    Eigen::Matrix3d packed;
    packed << c[2], c[4], c[7], c[4], c[5], c[8], c[7], c[8], c[9];
    return packed;
}

Eigen::Vector3d leakage_covariance(const Moments& m) {
    return {m.covariance[1], m.covariance[3], m.covariance[6]};
}

Eigen::Vector3d features_of(const Moments& m) {
    return {m.feature[0], m.feature[1], m.feature[2]};
}

const Moments* dominant(const Summary& summary) {
    const auto& [full, compensating] = summary.judged;
    if (full.count == 0 && compensating.count == 0) return nullptr;
    return compensating.count > full.count ? &compensating : &full;
}

bool is_log(int state) {
    return state == ln_laminar || state == ln_orifice || state == ln_speed || state == ln_wear || state == disturbance;
}

}  // namespace

void WearFilter::begin(const SectionSpec& spec, Basis basis) {
    *this = WearFilter();
    attach(spec, basis);
    plate_cm3_ = spec.displacement_cm3;
    reference_ = reference_state(spec);
}

void WearFilter::attach(const SectionSpec& spec, Basis basis) {
    spec_ = spec;
    basis_ = basis;
}

void WearFilter::adopt(const SectionSpec& spec) {
    const LeakageState next = reference_state(spec);
    const Features growth = features_at(next, reference_);
    if (primed_ && std::isfinite(growth.laminar + growth.orifice + growth.speed)) {
        belief_.mean(ln_laminar) += std::log(growth.laminar);
        belief_.mean(ln_orifice) += std::log(growth.orifice);
        belief_.mean(ln_speed) += std::log(growth.speed);
        if (basis_ == Basis::delivery) belief_.mean(displacement) += spec.displacement_cm3 - plate_cm3_;
    }
    reference_ = next;
    plate_cm3_ = spec.displacement_cm3;
    attach(spec, basis_);
}

bool WearFilter::impossible(const Summary& summary) const {
    for (const Moments& m : summary.judged) {
        if (m.count == 0) continue;
        const double flow = m.theoretical_lpm;
        const bool features_fit = m.feature[0] > 0.0 && m.feature[1] > 0.0 && m.feature[2] > 0.0 &&
                                  std::isfinite(m.feature[0] + m.feature[1] + m.feature[2]);
        // Written so that NaN is impossible too.
        const bool leakage_fits = m.leakage_lpm <= most_leakage * flow && m.leakage_lpm >= least_leakage * flow;
        if (!features_fit || !leakage_fits || !std::isfinite(m.standard_error_lpm)) return true;
    }
    return false;
}

void WearFilter::advance(double running_days, double calendar_days) {
    if (!primed_) return;
    const WearMotion wear = wear_motion(running_days, calendar_days, basis_);
    belief_.mean.tail<moving_states>() = wear.motion * belief_.mean.tail<moving_states>();
    belief_.covariance.bottomRows<moving_states>() = wear.motion * belief_.covariance.bottomRows<moving_states>();
    belief_.covariance.rightCols<moving_states>() *= wear.motion.transpose();
    belief_.covariance.bottomRightCorner<moving_states, moving_states>() += wear.noise;
}

WearFilter::Expected WearFilter::expect(const WearVector& mean, const Moments& m, bool compensating) const {
    Expected expected;
    const double worn = std::exp(mean(ln_wear) + mean(disturbance));
    expected.design.setZero();
    for (int i = 0; i < 3; ++i) expected.design(i) = worn * std::exp(mean(i)) * m.feature[static_cast<std::size_t>(i)];
    expected.worn_lpm = expected.design.head<3>().sum();
    expected.design(displacement) = basis_ == Basis::delivery ? m.speed_rpm / 1000.0 : 0.0;
    expected.design(meter_zero) = 1.0;
    expected.design(pilot) = compensating ? 1.0 : 0.0;
    expected.design(ln_wear) = expected.design(disturbance) = expected.worn_lpm;
    expected.leakage_lpm = expected.worn_lpm + mean(displacement) * expected.design(displacement) + mean(meter_zero) +
                           mean(pilot) * expected.design(pilot);
    return expected;
}

// From the predicted, not the measured leakage: else scatter biases it low.
double WearFilter::noise_variance(const Moments& m, double worn_lpm) const {
    const FlowMeter& meter = basis_ == Basis::delivery ? spec_.delivery_meter : spec_.drain_meter;
    const double through_meter = basis_ == Basis::delivery ? m.delivery_lpm : m.leakage_lpm;
    return square(2.0 * m.standard_error_lpm) + square(model_error * worn_lpm) + square(meter.resolution_lpm) +
           square(hourly_gain_share * meter.gain_error * through_meter) +
           square(outside_error * distance_from_seen(m) * worn_lpm);
}

double WearFilter::surprise(const Summary& summary) const {
    const Moments* m = dominant(summary);
    if (!primed_ || m == nullptr) return unknown;
    const Expected expected = expect(belief_.mean, *m, m == &summary.judged[1]);
    const Sighting seen{expected.design, m->leakage_lpm - expected.leakage_lpm,
                        inflation() * noise_variance(*m, expected.worn_lpm)};
    return seen.innovation / std::sqrt(stats::innovation_variance(belief_, seen));
}

void WearFilter::prime(const Summary& summary) {
    const Moments* m = dominant(summary);
    if (m == nullptr) return;
    belief_ = prior_belief(spec_, basis_, m->leakage_lpm, {m->feature[0], m->feature[1], m->feature[2]});
    primed_ = true;
}

void WearFilter::feed(const Summary& summary, bool settled) {
    if (!primed_) prime(summary);
    if (!primed_) return;
    feed_stop(summary, settled);
    for (std::size_t regime = 0; regime < judged_regimes; ++regime) {
        const Moments& m = summary.judged[regime];
        if (m.count == 0) continue;
        feed_mean(m, regime == 1, settled);
        feed_contrasts(m, settled);
        remember(m);
    }
}

void WearFilter::feed_mean(const Moments& m, bool compensating, bool settled) {
    const WearVector start = belief_.mean;
    Expected expected = expect(start, m, compensating);
    Sighting seen{expected.design, m.leakage_lpm - expected.leakage_lpm, noise_variance(m, expected.worn_lpm)};
    const double before = stats::innovation_variance(belief_, seen) - seen.variance;
    const double plain_surprise = std::abs(seen.innovation) / std::sqrt(before + seen.variance);
    seen.variance *= inflation();
    learn_misfit(plain_surprise);
    const double surprise = std::abs(seen.innovation) / std::sqrt(before + seen.variance);
    if (surprise > huber_limit) seen.variance = (before + seen.variance) * surprise / huber_limit - before;
    const bool relinearise = before > square(loose * expected.worn_lpm);
    for (int pass = 0; relinearise && pass < relinearisations; ++pass) {
        const WearVector gain = held(stats::best_gain(belief_, seen), settled);
        const double most = gain.cwiseAbs().maxCoeff() * std::abs(seen.innovation);
        const double bound = most > longest_step ? longest_step / most : 1.0;
        const WearVector trial = start + bound * seen.innovation * gain;
        expected = expect(trial, m, compensating);
        seen.design = expected.design;
        seen.innovation = m.leakage_lpm - expected.leakage_lpm - expected.design.dot(start - trial);
    }
    take(seen, settled);
}

// Three terms fit no pump exactly: gaps bend, and duty dwells where they do. What that adds to the scatter is learned,
// so that an hour at an unusual pressure is not taken for a change; a single wild hour hardly counts.
void WearFilter::learn_misfit(double surprise) {
    means_ = std::min(means_ + 1.0, misfit_memory);
    misfit_ += (square(std::min(surprise, most_misfit)) - misfit_) / means_;
}

// The covariance within a summary, turned to its own axes, where each axis is a sighting of its own of the slopes a w,
// b w and c w + dV n: free of zero and constants, and of dV where speed does not vary. By delivery without a speed
// sensor a swing says nothing: the motor slips more under load, and flow that is missing for that looks just like
// leakage.
void WearFilter::feed_contrasts(const Moments& m, bool settled) {
    if (basis_ == Basis::delivery && !spec_.has_speed_sensor) return;
    const Eigen::Matrix3d swings = feature_covariance(m);
    if (swings.trace() < square(least_swing)) return;
    const Eigen::SelfAdjointEigenSolver<Eigen::Matrix3d> axes(swings);
    const Eigen::Vector3d leakage = leakage_covariance(m);
    const double reference_speed = reference_.speed_rpm;
    for (int axis = 2; axis >= 0; --axis) {
        const double swing = std::sqrt(std::max(axes.eigenvalues()(axis), 0.0));
        if (swing < least_swing) return;  // ascending order: the rest are smaller
        const Eigen::Vector3d along = axes.eigenvectors().col(axis);
        const double worn = std::exp(belief_.mean(ln_wear) + belief_.mean(disturbance));
        Sighting seen;
        for (int i = 0; i < 3; ++i) seen.design(i) = swing * along(i) * worn * std::exp(belief_.mean(i));
        const double slip = seen.design.head<3>().sum();
        seen.design(ln_wear) = seen.design(disturbance) = slip;
        seen.design(displacement) = basis_ == Basis::delivery ? swing * along(2) * reference_speed / 1000.0 : 0.0;
        const double expected = slip + seen.design(displacement) * belief_.mean(displacement);
        seen.innovation = along.dot(leakage) / swing - expected;
        const double size = seen.design.head<3>().cwiseAbs().sum();
        seen.variance = square(2.0 * m.standard_error_lpm) + square(contrast_error * size) * (1.0 + contrasts_);
        const double spread = std::sqrt(stats::innovation_variance(belief_, seen));
        const double surprise = std::abs(seen.innovation) / spread;
        if (surprise > huber_limit) seen.variance += spread * spread * (surprise / huber_limit - 1.0);
        take(seen, settled);
        contrasts_ += 1.0;
    }
}

// Flow seen while stopped adds to the leakage seen by drain, and by delivery is taken from it. Below the meter's least
// flow it only says that the zero is small.
void WearFilter::feed_stop(const Summary& summary, bool settled) {
    if (summary.stop_count == 0 || !std::isfinite(summary.stop_flow_lpm) || spec_.case_flushing_lpm > 0.0) return;
    const FlowMeter& meter = basis_ == Basis::delivery ? spec_.delivery_meter : spec_.drain_meter;
    const double accuracy = std::sqrt(belief_.covariance(meter_zero, meter_zero));
    const double told = std::isfinite(meter.accuracy_lpm) ? meter.accuracy_lpm : accuracy;
    const bool too_little = std::abs(summary.stop_flow_lpm) < meter.least_lpm;
    Sighting seen;
    seen.design(meter_zero) = 1.0;
    seen.innovation = (basis_ == Basis::delivery ? -1.0 : 1.0) * summary.stop_flow_lpm - belief_.mean(meter_zero);
    seen.variance =
        square(stop_repeatability * told) + square(meter.resolution_lpm) + (too_little ? square(meter.least_lpm) : 0.0);
    if (seen.variance > 0.0) take(seen, settled);
}

// Which states a sighting may not move: the baseline once it is settled, the speed term until speed has varied.
WearVector WearFilter::held(WearVector gain, bool settled) const {
    if (settled) gain.head<5>().setZero();
    if (speed_.width() < std::log(speed_told_apart)) gain(ln_speed) = 0.0;
    return gain;
}

void WearFilter::take(const Sighting& seen, bool settled) {
    WearVector gain = held(stats::best_gain(belief_, seen), settled);
    double most = 0.0;
    for (int i = 0; i < wear_states; ++i)
        if (is_log(i)) most = std::max(most, std::abs(gain(i) * seen.innovation));
    if (most > longest_step) gain *= longest_step / most;
    stats::take_in(belief_, seen, gain);
    belief_.mean(pilot) = std::max(belief_.mean(pilot), 0.0);
    if (!settled) keep_from_healing();
}

// Wear does not heal, and at the end of run-in it is 1 by definition. What would pull it below that is a baseline that is still
// wrong, so the baseline moves: the mean is projected along its covariance onto ratio 1 (Simon 2010, from memory). Without
// it healthy pumps sank to 0.9 in their first two months, and stayed. Only so far: what reads still lower is no longer a first
// guess that was off but a meter or an oil, and stays to be seen.
void WearFilter::keep_from_healing() {
    const double below = belief_.mean(ln_wear);
    if (below >= 0.0 || lowered_ >= most_lowered) return;
    const double part = std::min(1.0, (most_lowered - lowered_) / -below);
    belief_.mean -= belief_.covariance.col(ln_wear) * (part * below / belief_.covariance(ln_wear, ln_wear));
    lowered_ -= part * below;
}

void WearFilter::remember(const Moments& m) {
    const double pressure = std::log(m.dp_bar);
    const double viscosity = std::log(m.viscosity_cst);
    const double swing = std::sqrt(std::max(m.dp_variance, 0.0)) / m.dp_bar;
    pressure_.widen(pressure + std::log1p(-std::min(swing, 0.9)), pressure + std::log1p(swing));
    viscosity_.widen(viscosity, viscosity);
    const double spread = std::sqrt(std::max(m.covariance[2], 0.0));
    const double scale = reference_.pressure_rise_bar / reference_.viscosity_pas;
    laminar_.widen(std::log(std::max(m.feature[0] - spread, 0.1 * m.feature[0]) * scale),
                   std::log((m.feature[0] + spread) * scale));
    speed_.widen(std::log(m.speed_rpm), std::log(m.speed_rpm));
}

void WearFilter::open_wear() {
    belief_.covariance(ln_wear, ln_wear) += jump_variance;
}

void WearFilter::open_for(const FactChange& change) {
    if (primed_) analytics::open_for(belief_, change, spec_, basis_);
}

bool WearFilter::heed_test(const TestedLeakage& tested) {
    if (!primed_) return false;
    const FlowMeter& meter = basis_ == Basis::delivery ? spec_.delivery_meter : spec_.drain_meter;
    Moments m;
    m.feature = {tested.features.laminar, tested.features.orifice, tested.features.speed};
    m.speed_rpm = tested.speed_rpm;
    const Expected expected = expect(belief_.mean, m, false);
    const double zero = belief_.mean(meter_zero);
    Sighting seen{expected.design, tested.leakage_lpm - (expected.leakage_lpm - zero),
                  square(tested.sd_lpm) + square(meter.gain_error * tested.flow_lpm) +
                      square(test_model_error * expected.worn_lpm)};
    seen.design(meter_zero) = 0.0;  // the bucket has none
    const double surprise = std::abs(seen.innovation) / std::sqrt(stats::innovation_variance(belief_, seen));
    if (surprise <= contradicting) {
        take(seen, false);
        return false;
    }
    const double others = expected.leakage_lpm - zero - expected.worn_lpm;
    const double worn = std::max(tested.leakage_lpm - others, least_worn * expected.worn_lpm);
    belief_.mean(ln_wear) += std::log(worn / expected.worn_lpm);
    const Expected now = expect(belief_.mean, m, false);
    seen.design.head<3>() = now.design.head<3>();
    seen.design(ln_wear) = seen.design(disturbance) = now.worn_lpm;
    seen.innovation = 0.0;
    WearVector gain = WearVector::Zero();
    gain(ln_wear) = 1.0 / now.worn_lpm;
    stats::take_in(belief_, seen, gain);
    FactChange instrument;
    instrument.instruments = static_cast<std::uint16_t>(1U << index_of(flow_quantity(basis_)));
    open_for(instrument);
    return true;
}

void WearFilter::heed_as_new() {
    if (!primed_) return;
    Sighting seen;
    seen.design(ln_wear) = 1.0;
    seen.innovation = -belief_.mean(ln_wear);
    seen.variance = square(as_new_sd);
    take(seen, false);
}

LogEstimate WearFilter::wear() const {
    if (!primed_) return {};
    return {belief_.mean(ln_wear), std::sqrt(belief_.covariance(ln_wear, ln_wear))};
}

OwnReading WearFilter::own_reading(const Summary& summary) const {
    OwnReading own;
    if (!primed_ || dominant(summary) == nullptr) return own;
    double points = 0.0;
    double noise = 0.0;
    double seen = 0.0;
    double healthy = 0.0;
    WearVector design = WearVector::Zero();
    for (std::size_t regime = 0; regime < judged_regimes; ++regime) {
        const Moments& m = summary.judged[regime];
        if (m.count == 0) continue;
        const Expected expected = expect(belief_.mean, m, regime == 1);
        const double weight = m.count;
        points += weight;
        seen += weight * (m.leakage_lpm - (expected.leakage_lpm - expected.worn_lpm));
        healthy += weight * features_of(m).dot(belief_.mean.head<3>().array().exp().matrix());
        noise += weight * noise_variance(m, expected.worn_lpm);
        design += weight * expected.design;
    }
    design(ln_wear) = design(disturbance) = 0.0;  // the summary speaks for itself
    own.leakage_lpm = seen / points;
    own.healthy_lpm = healthy / points;
    own.ratio = seen / healthy;
    design /= points;
    own.ratio_sd = std::sqrt(noise / points + design.dot(belief_.covariance * design)) / own.healthy_lpm;
    return own;
}

LeakageCoefficients WearFilter::coefficients() const {
    if (!primed_) return {unknown, unknown, unknown};
    return {std::exp(belief_.mean(ln_laminar)), std::exp(belief_.mean(ln_orifice)), std::exp(belief_.mean(ln_speed))};
}

LogEstimate WearFilter::leakage_at(const DutyPoint& at, bool worn) const {
    if (!primed_) return {};
    const Features f = features_at(leakage_state(at, spec_.fluid), reference_);
    WearVector design = WearVector::Zero();
    design.head<3>() = belief_.mean.head<3>().array().exp() * Eigen::Array3d(f.laminar, f.orifice, f.speed);
    const double healthy = design.sum();
    design /= healthy;
    if (worn) design(ln_wear) = 1.0;
    return {std::log(healthy) + (worn ? belief_.mean(ln_wear) : 0.0),
            std::sqrt(design.dot(belief_.covariance * design))};
}

LogEstimate WearFilter::healthy_leakage(const DutyPoint& at) const {
    return leakage_at(at, false);
}
LogEstimate WearFilter::worn_leakage(const DutyPoint& at) const {
    return leakage_at(at, true);
}

double WearFilter::distance_from_seen(const Moments& m) const {
    if (pressure_.low > pressure_.high) return 0.0;
    return std::hypot(pressure_.distance(std::log(m.dp_bar)), viscosity_.distance(std::log(m.viscosity_cst)));
}

double WearFilter::distance_from_seen(const DutyPoint& at) const {
    if (pressure_.low > pressure_.high) return unknown;
    return std::hypot(pressure_.distance(std::log(at.pressure_bar)),
                      viscosity_.distance(std::log(spec_.fluid.kinematic_cst(at.temperature_c))));
}

double WearFilter::laminar_span() const {
    return std::exp(laminar_.width());
}

}  // namespace slipledger::analytics
