#include "analytics/life_prior.hpp"

#include <cmath>

namespace slipledger::analytics {

namespace {

constexpr double scatter_of_model = 0.5;  // in ln hours, one life to the next: common practice, no source
constexpr double lives_worth = 2.0;       // that the default of the laws counts as

bool known(const PastLife& life) {
    return life.life_h > 0.0 && std::isfinite(life.life_h) && life.ln_sd >= 0.0;
}

}  // namespace

LifePrior life_prior(std::span<const PastLife> lives) {
    LifePrior prior;
    const double within = scatter_of_model * scatter_of_model;
    double precision = 1.0 / (prior.ln_sd * prior.ln_sd - within);
    double sum = precision * std::log(prior.median_h);
    double count = lives_worth;
    LawWeights laws = prior.laws;
    for (double& weight : laws) weight *= lives_worth;
    for (const PastLife& life : lives) {
        if (!known(life)) continue;
        const double worth = 1.0 / (within + life.ln_sd * life.ln_sd);
        precision += worth;
        sum += worth * std::log(life.life_h);
        count += 1.0;
        for (std::size_t law = 0; law < wear_laws; ++law) laws[law] += life.laws[law];
    }
    if (count == lives_worth) return prior;
    prior.median_h = std::exp(sum / precision);
    prior.ln_sd = std::sqrt(1.0 / precision + within);
    for (std::size_t law = 0; law < wear_laws; ++law) prior.laws[law] = laws[law] / count;
    return prior;
}

}  // namespace slipledger::analytics
