// How a healthy pump's leakage depends on pressure, speed and oil, and what of it grows with wear. Leakage is written
// in three features, each 1 at the section's reference point, so that its coefficients are L/min there and pumps
// compare.
#pragma once

#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// Where a pump works, in the terms that leakage knows.
struct LeakageState {
    double pressure_rise_bar = unknown;  // dp   bar
    double viscosity_pas = unknown;      // mu   Pa s, dynamic
    double density_kgm3 = unknown;       // rho  kg/m3
    double speed_rpm = unknown;          // n    rpm
};

struct Features {
    double laminar = 1.0;  // f1
    double orifice = 1.0;  // f2
    double speed = 1.0;    // f3
};

struct LeakageCoefficients {
    double laminar_lpm = 0.0;  // a
    double orifice_lpm = 0.0;  // b
    double speed_lpm = 0.0;    // c
};

// The section's reference point in the terms of leakage: its pressure as pressure rise, its oil at its temperature.
// Not computed: a look-up in the fluid.
LeakageState reference_state(const SectionSpec& spec);

// Features at a point, each over its value at the reference point:
//
//   f1 = dp / mu,   f2 = sqrt(dp / rho),   f3 = n
//
// A pressure rise below 0 counts as 0, a speed by its magnitude. NaN where either state has one, or the reference's
// pressure, viscosity, density or speed is not positive.
// Example: dp 210 over 157.5 bar, the same oil and speed -> 1.333, 1.155, 1.
// Source: terms of the loss models of Wilson (1946), Schlosser (1961), McCandlish and Dorey (1984), from memory.
Features features_at(const LeakageState& at, const LeakageState& reference);

// Leakage when healthy: q0 = a f1 + b f2 + c f3.
//
// Returns L/min. Example: a 2.0, b 0.3, c 0.12 at f = (1.2, 1.1, 1) -> 2.85.
// Source: as features_at.
double healthy_leakage_lpm(const LeakageCoefficients& coefficients, const Features& features);

// A part's leakage freed from the point and the oil it is quoted at, so that parts in other machines compare:
//
//   q0 = A dp / mu + B sqrt(dp / rho) + C n
struct LeakageLaw {
    double laminar = unknown;  // A   L/min Pa s / bar
    double orifice = unknown;  // B   L/min (kg/m3)^0.5 / bar^0.5
    double speed = unknown;    // C   L/min / rpm
};

// The law behind coefficients at a reference point: A = a mu / dp, B = b / sqrt(dp / rho), C = c / n.
//
// NaN where a coefficient is, or where the reference's pressure, viscosity, density or speed is not positive.
// Example: a 2, b 0.3, c 0.12 at 210 bar, 0.0274 Pa s, 853 kg/m3, 1480 rpm -> 2.610e-4, 0.6046, 8.108e-5.
// Source: definition.
LeakageLaw leakage_law(const LeakageCoefficients& coefficients, const LeakageState& reference);

// Leakage by a law: A dp / mu + B sqrt(dp / rho) + C n.
//
// Returns L/min; NaN where the law or the state has one. A pressure rise below 0 counts as 0.
// Example: the law above at 150 bar, 0.040 Pa s, 853 kg/m3, 1480 rpm -> 0.979 + 0.254 + 0.120 = 1.352.
// Source: definition.
double leakage_lpm(const LeakageLaw& law, const LeakageState& at);

struct SlipInputs {
    double leakage_lpm = unknown;
    double viscosity_pas = unknown;
    double displacement_cm3 = unknown;
    double pressure_rise_bar = unknown;
};

// Wilson's slip coefficient: leakage without size, oil or pressure in it, so that unlike pumps compare.
//
//   C_s = q mu / (V_rad dp),   V_rad = V / 2 pi
//
//   q   leakage_lpm         L/min    >= 0   internal leakage, pilot and flushing flow already taken off
//   mu  viscosity_pas       Pa s     > 0    dynamic: nu rho, at the pump inlet temperature
//   V   displacement_cm3    cm3/rev  > 0
//   dp  pressure_rise_bar   bar      > 0    outlet minus inlet
//
// Returns a pure number; NaN where an input is out of range. Holds for laminar slots only.
// Example: 3.0 L/min, 0.040 Pa s, 71 cm3/rev, 200 bar -> 8.85e-9.
// Source: W. E. Wilson, Rotary-pump theory, Trans. ASME 68 (1946) (reference from memory).
double slip_coefficient(const SlipInputs& in);

// Equivalent uniform growth of the gaps that gives a leakage ratio w at the reference point: the g, less one, that
// solves
//
//   (a g^3 + (b + c) g) / (a + b + c) = w
//
//   a, b, c   L/min  >= 0, not all 0
//   w         -      > 0   leakage ratio
//
// Returns a fraction: 0.26 is gaps grown by 26 %; NaN outside these ranges. Means nothing after a step, where one part
// broke and the others did not.
// Example: a alone, w = 2 -> 0.2599; 1 : 0.15 : 0.06, w = 2 -> 0.2905.
// Source: laminar flow through a slot goes with the cube of its height (any textbook); orifice and speed terms with the
// height itself.
double clearance_growth(const LeakageCoefficients& coefficients, double leakage_ratio);

}  // namespace slipledger::analytics
