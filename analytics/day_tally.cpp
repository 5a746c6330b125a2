#include "analytics/day_tally.hpp"

#include <cmath>

namespace slipledger::analytics {

void DayTally::count(const Summary& summary) {
    duty_.running_h += summary.running_h;
    duty_.judged_h += summary.judged_h;
}

void DayTally::add(const SummaryVerdict& verdict, double slip_coefficient, double judged_h) {
    if (!std::isfinite(verdict.leakage_lpm)) return;
    weight_ += judged_h;
    leakage_ += judged_h * verdict.leakage_lpm;
    excess_ += judged_h * verdict.excess_lpm;
    power_ += judged_h * verdict.leakage_kw;
    if (!std::isfinite(slip_coefficient)) return;
    slip_ += judged_h * slip_coefficient;
    slip_weight_ += judged_h;
}

void DayTally::fill(DayVerdict& verdict) const {
    verdict.step_ratio = step_ratio_;
    verdict.running_h = duty_.running_h;
    verdict.judged_h = duty_.judged_h;
    if (slip_weight_ > 0.0) verdict.slip_coefficient = slip_ / slip_weight_;
    if (!(weight_ > 0.0)) return;
    verdict.leakage_lpm = leakage_ / weight_;
    verdict.excess_lpm = excess_ / weight_;
    verdict.leakage_kw = power_ / weight_;
}

double DayTally::ln_ratio() const {
    const double healthy = leakage_ - excess_;
    return leakage_ > 0.0 && healthy > 0.0 ? std::log(leakage_ / healthy) : unknown;
}

}  // namespace slipledger::analytics
