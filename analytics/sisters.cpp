#include "analytics/sisters.hpp"

#include <cmath>
#include <vector>

namespace slipledger::analytics {

namespace {

constexpr double usual_scatter = 0.15;  // ln leakage, one part of a model against the next (common practice, no source)
constexpr double worth_of_usual = 2.0;  // sisters

double square(double v) {
    return v * v;
}

}  // namespace

std::optional<SistersFigure> sisters_figure(std::span<const Sister> sisters, const SectionSpec& spec) {
    const LeakageState at = reference_state(spec);
    std::vector<double> logs;
    double own_variance = 0.0;
    double sum = 0.0;
    for (const Sister& sister : sisters) {
        const double log = std::log(leakage_lpm(sister.healthy, at) * spec.displacement_cm3 / sister.displacement_cm3);
        if (!std::isfinite(log) || !std::isfinite(sister.healthy_sd)) continue;
        logs.push_back(log);
        sum += log;
        own_variance += square(sister.healthy_sd);
    }
    if (logs.empty()) return std::nullopt;
    const double count = static_cast<double>(logs.size());
    const double mean = sum / count;
    double squares = worth_of_usual * square(usual_scatter);
    for (const double log : logs) squares += square(log - mean);
    const double scatter = squares / (worth_of_usual + count - 1.0);
    return SistersFigure{.leakage_lpm = std::exp(mean),
                         .sd = std::sqrt(scatter * (1.0 + 1.0 / count) + own_variance / count / count),
                         .count = static_cast<int>(logs.size())};
}

}  // namespace slipledger::analytics
