// What is believed of a section before anything was seen of it: the name plate, how far pumps of a make differ, and the
// maker's own test where there is one. Every number is a default with its reason; the wear filter starts from here.
#pragma once

#include "analytics/leakage.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/stats/kalman.hpp"

namespace slipledger::analytics {

// The states of the wear filter, in its order (method.md, 5).
enum WearState : int {
    ln_laminar,    // ln a     ln L/min   healthy coefficients at the reference point
    ln_orifice,    // ln b
    ln_speed,      // ln c
    displacement,  // dV       cm3/rev    name plate less true displacement
    meter_zero,    // zero     L/min      as it adds to the leakage seen
    pilot,         // k        L/min      constant while compensating
    ln_wear,       // x        -          ln of the leakage ratio
    drift,         // v        1/running day
    disturbance,   // u        -          slow plant disturbance, not part of the ratio
};
inline constexpr int wear_states = 9;
using WearBelief = stats::Belief<wear_states>;
using WearVector = stats::StateVector<wear_states>;

// A duty point in the terms of leakage: case or inlet at 0 bar gauge, the section's oil at its temperature.
// Not computed: a look-up in the fluid.
LeakageState leakage_state(const DutyPoint& at, const Fluid& fluid);

// How far the slow plant disturbance u wanders, in ln leakage: production, ageing oil, the thermometer. By delivery
// also the slow part of the meter's gain error, a fraction of a per cent of flow that is as much as several per cent of
// slip.
//
// Returns a pure number, one standard deviation: 0.03 by drain, 0.05 by delivery.
// Source: method.md, 5; the figure by delivery from simulated sections (false alerts with a disturbance of 4 %).
double disturbance_spread(Basis basis);

// The belief at the start of a life, around a first look at its leakage.
//
//   leakage   first_leakage_lpm   L/min   seen at `features`; held between 0.5 and 15 % of theoretical flow
//
// Returns in effect ln a, b, c at shares 1 : 0.15 : 0.06 of the level, each +-0.6 to 0.7 with the level +-0.6 common to
// all; a maker's test narrows the level to +-0.15. Wear 0 exactly, unless the life began before it was watched and the
// maker's figures say what new was.
// Source: method.md, 5 (its trial on simulated fleets).
WearBelief prior_belief(const SectionSpec& spec, Basis basis, double first_leakage_lpm, const Features& features);

}  // namespace slipledger::analytics
