#include "analytics/stats/normal_mixture.hpp"

#include <cmath>
#include <limits>
#include <numbers>

namespace slipledger::analytics::stats {

namespace {

constexpr double farthest = 8.0;  // standard deviations: beyond it no share is left in doubles
constexpr double close_enough = 1e-6;
constexpr int most_steps = 100;

struct Bracket {
    double low = std::numeric_limits<double>::infinity();
    double high = -std::numeric_limits<double>::infinity();
};

Bracket around(std::span<const NormalPart> parts) {
    Bracket bracket;
    for (const NormalPart& part : parts) {
        if (!(part.weight > 0.0)) continue;
        bracket.low = std::fmin(bracket.low, part.mean - farthest * part.sd);
        bracket.high = std::fmax(bracket.high, part.mean + farthest * part.sd);
    }
    return bracket;
}

}  // namespace

double mixture_share(std::span<const NormalPart> parts, double value) {
    double below = 0.0;
    double all = 0.0;
    for (const NormalPart& part : parts) {
        below += part.weight * 0.5 * std::erfc((part.mean - value) / part.sd / std::numbers::sqrt2);
        all += part.weight;
    }
    return below / all;
}

double mixture_quantile(std::span<const NormalPart> parts, double share) {
    auto [low, high] = around(parts);
    if (!(share > 0.0 && share < 1.0) || !(low < high)) return std::numeric_limits<double>::quiet_NaN();
    double below = -share;
    double above = 1.0 - share;
    for (int step = 0; step < most_steps && high - low > close_enough; ++step) {
        // Every third step halves, so that a steep flank in a wide bracket cannot hold it up.
        const double at = step % 3 == 2 ? 0.5 * (low + high) : (low * above - high * below) / (above - below);
        const double off = mixture_share(parts, at) - share;
        if (off < 0.0) {
            low = at;
            below = off;
            above *= 0.5;
        } else {
            high = at;
            above = off;
            below *= 0.5;
        }
        if (off == 0.0) return at;
    }
    return 0.5 * (low + high);
}

}  // namespace slipledger::analytics::stats
