#include "analytics/wear_laws.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

#include "analytics/wear_motion.hpp"
#include "analytics/wear_prior.hpp"

namespace slipledger::analytics {

namespace {

// Settled on simulated sections of six wear laws and onsets; healthy ones establish no drift with them.
constexpr double rate_sd = 0.01;                        // per running day: a life of 100 days is possible
constexpr std::array<double, 2> rate_walk{4e-5, 1e-3};  // steady and free, per running day^1.5
constexpr double sets_free = 1.0 / 1000.0;              // chance per running day that a rate changes
constexpr double settles = 1.0 / 20.0;                  // and that it has found its new one
constexpr double begins_free = 0.1;
constexpr double day_noise = 0.012;    // of a day's own ln ratio, beside the disturbance
constexpr double steepest = 3.0;       // in ln: how far a law may turn wear into speed, up or down
constexpr double huber_limit = 2.5;    // standard deviations: days beyond weigh less,
constexpr double most_surprise = 3.0;  // and speak no louder than this against a law
constexpr double least_weight = 1e-6;
constexpr double memory = 0.998;  // of a law's weight, per day: an old fault is forgiven in a year or two

double square(double v) {
    return v * v;
}

// w^(k-1): the speed of x at ratio w over that at ratio 1.
double speed_at(double ln_ratio, double power) {
    return std::exp(std::clamp((power - 1.0) * ln_ratio, -steepest, steepest));
}

template <typename Belief>
Belief mixture(double share, const Belief& one, const Belief& other) {
    Belief mixed;
    const auto apart = (one.mean - other.mean).eval();
    mixed.mean = share * one.mean + (1.0 - share) * other.mean;
    mixed.covariance =
        share * one.covariance + (1.0 - share) * other.covariance + share * (1.0 - share) * apart * apart.transpose();
    return mixed;
}

}  // namespace

void WearLaws::begin(const LogEstimate& wear, Basis basis) {
    Belief start;
    start.mean(0) = wear.ln;
    start.covariance.diagonal() << square(wear.sd), square(rate_sd), square(disturbance_spread(basis));
    for (Law& law : laws_) law = {.runs = {Run{start, 1.0 - begins_free}, Run{start, begins_free}}, .ln_weight = 0.0};
    begun_ = true;
}

// A rate may change or settle before the day begins: each run starts from what both said, by how likely it is to come
// from either.
void WearLaws::mix(Law& law, double running_days) {
    auto& [steady, free] = law.runs;
    const double loosened = 1.0 - std::exp(-sets_free * running_days);
    const double settled = 1.0 - std::exp(-settles * running_days);
    const double into_steady = (1.0 - loosened) * steady.weight + settled * free.weight;
    const double into_free = loosened * steady.weight + (1.0 - settled) * free.weight;
    const Belief before = steady.belief;
    steady.belief = mixture((1.0 - loosened) * steady.weight / into_steady, before, free.belief);
    free.belief = mixture(loosened * steady.weight / into_free, before, free.belief);
    steady.weight = into_steady;
    free.weight = into_free;
}

void WearLaws::move(Belief& belief, double power, std::size_t run, const Passed& passed) {
    const double d = std::max(passed.running_days, 0.0);
    const double speed = speed_at(belief.mean(0), power);
    const WearMotion wear = wear_motion(d, passed.calendar_days, passed.basis);
    stats::StateMatrix<states> motion = stats::StateMatrix<states>::Identity();
    motion(0, 0) += d * belief.mean(1) * (power - 1.0) * speed;
    motion(0, 1) = d * speed;
    motion(2, 2) = wear.motion(2, 2);
    stats::StateMatrix<states> noise = stats::StateMatrix<states>::Zero();
    noise.diagonal() << square(wear_jitter) * d, square(rate_walk[run]) * d, wear.noise(2, 2);
    const double next = belief.mean(0) + d * belief.mean(1) * speed;
    stats::carry(belief, motion, noise);
    belief.mean(0) = next;
}

// Takes the day into both runs and says how likely the law thought it, in ln.
double WearLaws::weigh(Law& law, double ln_ratio) {
    double all = 0.0;
    for (Run& run : law.runs) {
        stats::Sighting<states> seen;
        seen.design << 1.0, 0.0, 1.0;
        seen.innovation = ln_ratio - run.belief.mean(0) - run.belief.mean(2);
        seen.variance = square(day_noise);
        const double expected = stats::innovation_variance(run.belief, seen);
        const double surprise = std::abs(seen.innovation) / std::sqrt(expected);
        if (surprise > huber_limit) seen.variance += expected * (surprise / huber_limit - 1.0);
        stats::take_in(run.belief, seen, stats::best_gain(run.belief, seen));
        run.weight *= std::exp(-0.5 * square(std::min(surprise, most_surprise))) / std::sqrt(expected);
        all += run.weight;
    }
    const double steady = std::clamp(law.runs[0].weight / all, least_weight, 1.0 - least_weight);
    law.runs[0].weight = steady;
    law.runs[1].weight = 1.0 - steady;
    return std::log(all);
}

void WearLaws::take(double ln_ratio, double running_days, double calendar_days, Basis basis) {
    if (!begun_) return;
    double best = -std::numeric_limits<double>::infinity();
    for (std::size_t i = 0; i < wear_laws; ++i) {
        Law& law = laws_[i];
        mix(law, std::max(running_days, 0.0));
        for (std::size_t run = 0; run < both; ++run)
            move(law.runs[run].belief, wear_powers[i], run, {running_days, calendar_days, basis});
        if (std::isfinite(ln_ratio)) law.ln_weight = memory * law.ln_weight + weigh(law, ln_ratio);
        best = std::max(best, law.ln_weight);
    }
    for (Law& law : laws_) law.ln_weight -= best;
}

void WearLaws::let_go() {
    for (Law& law : laws_)
        for (Run& run : law.runs) run.belief.covariance(0, 0) += jump_variance;
}

WearLaws::Belief WearLaws::together(const Law& law) {
    return mixture(law.runs[0].weight, law.runs[0].belief, law.runs[1].belief);
}

std::array<LawBelief, wear_laws> WearLaws::laws(const LawWeights& beforehand) const {
    std::array<LawBelief, wear_laws> beliefs;
    if (!begun_) return beliefs;
    double all = 0.0;
    for (std::size_t i = 0; i < wear_laws; ++i) {
        const Belief belief = together(laws_[i]);
        beliefs[i] = {.power = wear_powers[i],
                      .weight = beforehand[i] * std::exp(laws_[i].ln_weight),
                      .ln_ratio = belief.mean(0),
                      .rate = belief.mean(1),
                      .ratio_variance = belief.covariance(0, 0),
                      .rate_variance = belief.covariance(1, 1),
                      .covariance = belief.covariance(0, 1)};
        all += beliefs[i].weight;
    }
    for (LawBelief& belief : beliefs) belief.weight /= all;
    return beliefs;
}

DriftEstimate WearLaws::drift(const LawWeights& beforehand) const {
    if (!begun_) return {};
    const std::array<LawBelief, wear_laws> beliefs = laws(beforehand);
    DriftEstimate drift{.mean = 0.0, .sd = 0.0, .positive = 0.0};
    double squares = 0.0;
    for (std::size_t i = 0; i < wear_laws; ++i) {
        const double speed = speed_at(beliefs[i].ln_ratio, beliefs[i].power);
        drift.mean += beliefs[i].weight * speed * beliefs[i].rate;
        squares += beliefs[i].weight * square(speed) * (square(beliefs[i].rate) + beliefs[i].rate_variance);
        for (const Run& run : laws_[i].runs)
            drift.positive += beliefs[i].weight * run.weight * 0.5 *
                              std::erfc(-run.belief.mean(1) / std::sqrt(2.0 * run.belief.covariance(1, 1)));
    }
    drift.sd = std::sqrt(std::max(squares - square(drift.mean), 0.0));
    return drift;
}

}  // namespace slipledger::analytics
