// How leakage goes along with pressure within an hour: on a healthy pump as predicted, on a worn one by the leakage
// ratio more, with a meter that has only moved its zero no more than before, and where two loggers' clocks disagree not
// at all. Tells within hours what the slope over a hundred hours tells in days, and is free of zero and constants.
#pragma once

#include <optional>

#include "analytics/excess_slope.hpp"
#include "analytics/own_usual.hpp"
#include "analytics/summary.hpp"

namespace slipledger::analytics {

// Threads: one at a time.
class SwingPattern {
public:
    SwingPattern();

    // Takes the moments of one summary and the healthy coefficients known before it. Those of the tenth running hour
    // are kept: what is compared must be weighed alike. Nothing is taken from fewer than three points or where nothing
    // swings.
    // Not computed: sums.
    void add(const Moments& moments, const LeakageCoefficients& coefficients, double hours);

    // Slope of leakage on its healthy prediction within summaries, over the slope when learned, from the last 36
    // running hours or, `fresh`, the last 2:
    //
    //   s = (c C_y) / (c C c) / s_learned,   se = sqrt((S_yy - (c C_y)^2 / (c C c)) / (c C c) / n) / s_learned
    //
    //   c     healthy coefficients            C    covariance of the features, summed over hours
    //   C_y   their covariance with leakage   n    points
    //
    // Nothing before 50 running hours are learned, or where leakage did not follow pressure then (slope or correlation
    // under 0.5).
    // Example: leakage = 1.6 x healthy in every point, learned at 1.0 x -> 1.6; healthy + 1 -> 1.
    // Source: least squares, pooled within groups (any text on analysis of covariance).
    std::optional<Slope> slope(bool fresh) const;

    // Scatter of leakage about that line over when it was learned. Returns a pure number, NaN before 50 running hours.
    // Source: definition.
    double scatter_grown() const;

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.learned_, self.lately_, self.fresh_, self.settling_h_, self.learned_h_, self.ln_scatter_,
           self.coefficients_.laminar_lpm, self.coefficients_.orifice_lpm, self.coefficients_.speed_lpm);
    }

private:
    struct Sums {
        double predicted = 0.0;  // (L/min)^2 h
        double along = 0.0;
        double seen = 0.0;
        double points = 0.0;

        void add(const Sums& other, double keep, double hours);
        double slope() const { return along / predicted; }
        double correlation() const;
        double rest() const { return seen - along * along / predicted; }
        template <typename Self, typename Io>
        static void each_field(Self& self, Io& io) {
            io(self.predicted, self.along, self.seen, self.points);
        }
    };

    Sums learned_;
    Sums lately_;
    Sums fresh_;
    double settling_h_ = 0.0;  // running hours until the coefficients were kept
    double learned_h_ = 0.0;
    LeakageCoefficients coefficients_;
    OwnUsual ln_scatter_;
};

}  // namespace slipledger::analytics
