#include "analytics/stats/single_change.hpp"

#include <cmath>
#include <limits>
#include <numbers>
#include <numeric>

namespace slipledger::analytics::stats {

namespace {

double bic(double squares, double n, double parameters) {
    return n * (std::log(2.0 * std::numbers::pi * squares / n) + 1.0) + parameters * std::log(n);
}

// Sums over the values from one place on; all y are taken less their mean, which keeps digits.
struct Tail {
    double count = 0.0;
    double x = 0.0;
    double xx = 0.0;
    double y = 0.0;
    double xy = 0.0;

    void add(double at, double value) {
        count += 1.0;
        x += at;
        xx += at * at;
        y += value;
        xy += at * value;
    }
};

// What a step before this tail takes from the sum of squares about the mean, which is that of two means less one.
double step_gain(const Tail& tail, double n) {
    return tail.y * tail.y * n / (tail.count * (n - tail.count));
}

struct Bend {
    double gain = 0.0;
    double slope = 0.0;
};

// The same of a bend at `at`: regression on r = max(0, x - at) and a constant.
Bend bend_of(const Tail& tail, double at, double n) {
    const double r = tail.x - tail.count * at;
    const double rr = tail.xx - 2.0 * at * tail.x + tail.count * at * at;
    const double ry = tail.xy - at * tail.y;
    const double spread = rr - r * r / n;
    return spread > 0.0 ? Bend{ry * ry / spread, ry / spread} : Bend{};
}

}  // namespace

std::string_view name_of(Shape shape) {
    return shape == Shape::level ? "level" : shape == Shape::step ? "step" : "ramp";
}

SingleChange single_change(std::span<const double> xs, std::span<const double> ys, std::size_t fewest) {
    constexpr double nan = std::numeric_limits<double>::quiet_NaN();
    const std::size_t count = ys.size();
    if (xs.size() != count || count < 2 * fewest + 1 || fewest == 0)
        return {.step = nan, .slope = nan, .bic_level = nan, .bic_step = nan, .bic_ramp = nan};
    const double n = static_cast<double>(count);
    const double mean = std::accumulate(ys.begin(), ys.end(), 0.0) / n;
    double squares = 0.0;
    for (const double y : ys) squares += (y - mean) * (y - mean);
    SingleChange found;
    double best_step = -1.0;
    double best_bend = -1.0;
    Tail tail;
    for (std::size_t i = count - 1; i >= fewest; --i) {
        tail.add(xs[i] - xs[0], ys[i] - mean);
        if (count - i < fewest) continue;
        if (const double gain = step_gain(tail, n); gain > best_step) {
            best_step = gain;
            found.before_step = i;
            found.step = tail.y / tail.count + tail.y / (n - tail.count);
        }
        if (const Bend bend = bend_of(tail, xs[i - 1] - xs[0], n); bend.gain > best_bend) {
            best_bend = bend.gain;
            found.before_ramp = i;
            found.slope = bend.slope;
        }
    }
    found.bic_level = bic(squares, n, 2.0);
    found.bic_step = bic(std::fmax(squares - best_step, 0.0), n, 4.0);
    found.bic_ramp = bic(std::fmax(squares - best_bend, 0.0), n, 4.0);
    const bool steps = found.bic_step <= found.bic_ramp;
    const double changed = steps ? found.bic_step : found.bic_ramp;
    if (changed < found.bic_level) found.shape = steps ? Shape::step : Shape::ramp;
    return found;
}

}  // namespace slipledger::analytics::stats
