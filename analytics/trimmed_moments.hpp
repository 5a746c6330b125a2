// Means and second moments of leakage and features over an hour's points, with the wildest left out. Means, because the
// model is linear in the features and a mean then loses nothing; trimmed, because a few rows of a swinging valve must
// not move an hour.
#pragma once

#include <cstddef>
#include <cstdint>
#include <vector>

#include "analytics/regime.hpp"

namespace slipledger::analytics {

struct Moments;

// Collects the points of one judged regime and gives their moments. Keeps its memory between hours.
// Threads: one at a time.
class PointSample {
public:
    // Not computed: collects.
    void add(const JudgedPoint& point);
    // Not computed: forgets.
    void clear() { rows_.clear(); }
    // Not computed: a count.
    std::size_t size() const { return rows_.size(); }

    // Moments of the points added since `clear`:
    //
    //   r_i = y_i - (alpha + beta f1_i)          residual of the least-squares line of leakage on f1 over all points
    //   k   = floor(0.05 n), 0 under 20 points   trimmed at each end of r
    //   means and population covariances         over the n - 2 k points left
    //   se  = s_w / (1 - 2 k / n) sqrt((1 + phi) / (1 - phi) / n)
    //
    //   s_w   standard deviation of winsorised residuals, n - 2 degrees of freedom
    //   phi   their lag-1 autocorrelation in time order, held in 0 to 0.95
    //
    // Leakage in L/min, features pure. Empty sample: count 0. Under 3 points se is 0: not known.
    // Source: trimmed mean's error by winsorised variance, Tukey and McLaughlin (1963); effective number of a
    // first-order autoregressive series, Bayley and Hammersley (1946), large n (both from memory).
    Moments moments();

private:
    struct Row {
        double leakage_lpm;
        Features features;
        double pressure_rise_bar;
        double temperature_c;
        double viscosity_cst;
        double speed_rpm;
        double delivery_lpm;
        double theoretical_lpm;
    };
    struct Residual {
        double value;
        std::uint32_t row;
        // Equal residuals are told apart by time, so that what is trimmed never hangs on the sorting.
        friend auto operator<=>(const Residual&, const Residual&) = default;
    };

    void fit_line();
    void trim();
    double standard_error_lpm() const;
    void take_means(Moments& moments) const;
    void take_covariances(Moments& moments) const;

    std::vector<Row> rows_;
    std::vector<double> residuals_;  // by row; winsorised by trim()
    std::vector<Residual> ordered_;
    std::vector<char> kept_;
    std::size_t trimmed_ = 0;  // at each end
};

}  // namespace slipledger::analytics
