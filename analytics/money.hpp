// What the leakage above healthy costs, and when a replacement has paid for itself. Only leakage above the life's own
// baseline counts: what a healthy pump leaks is the price of having one. Where the stroke makes up for lost flow,
// leakage takes power; on a fixed pump it takes flow, and money only where the machine then runs longer.
#pragma once

#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

struct LeakLoss {
    double healthy_kw = unknown;
    double leakage_ratio = unknown;
    double motor_efficiency = unknown;
};

// Electric power that goes into leakage above healthy, on a pump whose stroke makes up for it:
//
//   P = dp q_excess / 600 / eta_m = P0 (w - 1) / eta_m,   P0 = dp q0 / 600
//
//   P0     healthy_kw         kW   hydraulic power of what the pump leaks when healthy, mean of its usual duty
//   w      leakage_ratio      -    q_excess = q0 (w - 1)
//   eta_m  motor_efficiency   -    above 0, at most 1: of the electric motor
//
// Returns kW, below 0 for a ratio below 1; NaN where the motor's efficiency is not above 0. Losses in the pump's own
// friction are not in it.
// Example: 200 bar, 3 L/min when healthy: 1 kW; ratio 2, 0.93 -> 1.0753.
// Source: method.md, 8 (definition of hydraulic power).
double leak_power_kw(const LeakLoss& loss);

// Share of its healthy flow that a pump of fixed stroke no longer delivers:
//
//   l = (w - 1) (1 - eta0) / eta0
//
//   w      leakage_ratio        -   >= 0
//   eta0   healthy_efficiency   -   0 to 1, above 0: volumetric, at the point where it is quoted
//
// Returns a fraction of the flow it gave when healthy, below 0 for a ratio below 1; NaN where eta0 is not above 0.
// Example: ratio 2 at 0.96 -> 0.04167, said as "4.2 % less flow".
// Source: from eta = 1 - w (1 - eta0), rated_efficiency.hpp.
double flow_lost_share(double leakage_ratio, double healthy_efficiency);

struct StretchedDuty {
    double full_flow_kw = unknown;
    double flow_lost_share = unknown;
    double motor_efficiency = unknown;
};

// Electric power, spread over all running hours, of the hours by which a fixed pump runs longer to do the same work. Of
// H hours run, H l would not have been run by a healthy one, each at the shaft power of full flow:
//
//   P = l P_full / eta_m,   P_full = p q_th / 600
//
//   l       flow_lost_share    -    see there
//   P_full  full_flow_kw       kW   mean while it runs: a displacement pump takes it whatever it leaks
//   eta_m   motor_efficiency   -    above 0, at most 1
//
// Returns kW; NaN where the motor's efficiency is not above 0. A lower bound: friction in the pump is left out.
// Example: 100 bar, 120 L/min: 20 kW; 4 % less flow, 0.93 -> 0.8602.
// Source: method.md, 8; shaft power of a displacement pump (textbook, from memory).
double stretched_power_kw(const StretchedDuty& duty);

// Money a year: P H c.
//
//   P   power_kw               kW
//   H   running_h_per_year     h
//   c   energy_price_per_kwh   currency per kWh
//
// Returns currency per year. Example: 1.0753 kW, 4000 h, 0.11 -> 473.1.
// Source: definition.
double cost_per_year(double power_kw, double running_h_per_year, double energy_price_per_kwh);

struct Payback {
    double replacement_cost = unknown;         // currency: part, work, standstill
    double cost_per_year_and_ratio = unknown;  // currency a year for each 1 of ratio above 1
    double leakage_ratio = unknown;            // now
    double ratio_growth_per_year = 0.0;        // 0 where no wear trend is established
};

// Years until the leak that a replacement today would end had cost as much as the replacement: the T that solves
//
//   r ((w - 1) T + g T^2 / 2) = C
//
//   C   replacement_cost          currency            >= 0
//   r   cost_per_year_and_ratio   currency per year   > 0
//   w   leakage_ratio             -
//   g   ratio_growth_per_year     1/year              below 0 counts as 0
//
// Returns years; infinity where it never pays; NaN where something is not known.
// Example: 2000, 1000 a year, ratio 2, no growth -> 2; with growth 1 a year -> 1.236.
// Source: method.md, 8; ratio taken to grow in a straight line.
double payback_years(const Payback& payback);

}  // namespace slipledger::analytics
