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

// The same where viscosity itself may have been measured: it outranks the fluid's. What is not told of the point is the
// reference point's.
//
//   mu = nu rho
//
// Example: 32 mm2/s, temperature not known, reference 50 degC of the default oil -> 32e-6 x 852.9 = 0.0273 Pa s.
// Source: definition.
LeakageState leakage_state(const DutyPoint& at, double viscosity_cst, const SectionSpec& spec);

// What a life's healthy leakage rests on: a test of the part when new (made here, else by its maker), else that it was
// watched from new, else its sisters, else itself since watching began. Not computed: an order of preference.
BaselineKind baseline_kind(const SectionSpec& spec);

// How far a flow meter's zero may be off before anything was seen of it: its accuracy, else 0.2 % of theoretical flow.
//
// Returns L/min, one standard deviation.
// Example: 71 cm3 at 1480 rpm, no accuracy given -> 0.210.
// Source: method.md, 5; 0.2 % is common practice, no source.
double zero_spread(const SectionSpec& spec, Basis basis);

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
// all; a test of the part when new narrows the level to its accuracy (the maker's to +-0.15), else sisters of the model
// to their spread. Wear 0 exactly, unless the life began before it was watched and one of these says what new was: then
// 0 +- 0.35.
// Source: method.md, 5 (its trial on simulated fleets).
WearBelief prior_belief(const SectionSpec& spec, Basis basis, double first_leakage_lpm, const Features& features);

}  // namespace slipledger::analytics
