// Flows and powers of a pump by definition: what it should deliver, what share of that arrives, what it costs. Only
// textbook identities live here; how leakage depends on pressure, speed and oil is leakage.hpp.
#pragma once

namespace slipledger::analytics {

// What the displacement sweeps: q_th = V n s / 1000.
//
//   V   displacement_cm3   cm3/rev  > 0
//   n   speed_rpm          rpm      sign as the shaft turns
//   s   stroke_fraction    -        -1 to 1; 1 where there is no stroke to speak of
//
// Returns L/min; NaN for NaN. Example: 71 cm3/rev, 1480 rpm -> 105.08.
// Source: definition (ISO 4391).
double theoretical_flow_lpm(double displacement_cm3, double speed_rpm, double stroke_fraction = 1.0);

// Volumetric efficiency where delivery is measured: eta_v = q_delivered / q_th.
//
//   q_delivered   delivery_lpm      L/min   at inlet density, see to_inlet_density_lpm
//   q_th          theoretical_lpm   L/min   > 0
//
// Returns a fraction; NaN where theoretical flow is not positive. Above 1 the displacement or a meter is wrong.
// Example: 98.7 of 105.08 L/min -> 0.939.
// Source: ISO 4409 (definition, from memory).
double efficiency_by_delivery(double delivery_lpm, double theoretical_lpm);

// Volumetric efficiency where only the case drain is measured: 1 - q_drain / q_th. An upper bound: leakage that returns
// inside the pump is not seen.
//
//   q_drain   drain_lpm         L/min   flushing and pilot flow already taken off
//   q_th      theoretical_lpm   L/min   > 0
//
// Returns a fraction; NaN where theoretical flow is not positive. Example: 3.1 of 105.08 L/min -> 0.9705.
// Source: definition.
double efficiency_by_drain(double drain_lpm, double theoretical_lpm);

// Hydraulic power of a flow across a pressure: P = p q / 600.
//
//   p   pressure_bar   bar
//   q   flow_lpm       L/min
//
// Returns kW. Example: 200 bar, 60 L/min -> 20 kW. In US units hp = gpm psi / 1714 says the same.
// Source: definition (1 bar L/min = 1/600 kW exactly).
double hydraulic_power_kw(double pressure_bar, double flow_lpm);

// A flow metered at pressure, as it would be at the inlet's density: q0 = q / (1 - dp / K).
//
//   q    flow_lpm            L/min   at outlet pressure
//   dp   pressure_rise_bar   bar     >= 0, outlet minus inlet
//   K    bulk_modulus_gpa    GPa     > 0, secant, with the air the oil carries
//
// Returns L/min; NaN where K is not positive or dp >= K. Example: 100 L/min, 250 bar, 1.4 GPa -> 101.82.
// Source: definition of the secant bulk modulus (1.4 GPa: common practice, no source).
double to_inlet_density_lpm(double flow_lpm, double pressure_rise_bar, double bulk_modulus_gpa);

struct LeakedOil {
    double pressure_drop_bar;            // bar, >= 0
    double temperature_c;                // degC, before the gap
    double density_kgm3;                 // kg/m3, > 0
    double heat_capacity_jkgk = 1900.0;  // J/(kg K), mineral oil at 40 to 60 degC
    double expansion_per_k = 7.0e-4;     // 1/K, mineral oil
};

// How much hotter oil comes out of a gap than it went in, if it keeps its heat: dT = dp (1 - alpha T) / (rho c_p).
// Why a worn pump's case runs hot, and why the drain's temperature is evidence of leakage, not an input to it.
//
// Returns K; NaN where density or heat capacity is not positive. Valid for mineral oil throttled to case pressure.
// Example: 100 bar, 50 degC, 860 kg/m3 -> 4.74.
// Source: throttling at constant enthalpy, thermodynamics textbooks (from memory); oil values common practice.
double heating_of_leaked_oil_k(const LeakedOil& oil);

struct MotorLoad {
    double nominal_rpm;    // rpm, synchronous
    double slip_at_rated;  // fraction of it lost at rated pressure; 0: constant speed
    double pressure_bar;   // bar, now
    double rated_bar;      // bar, > 0
};

// Speed of an induction motor where none is measured: n = n0 (1 - s p / p_rated), slip growing with torque and torque
// of a pump at full stroke with pressure.
//
// Returns rpm; NaN where rated pressure is not positive and slip is not 0. Pressure below 0 counts as 0.
// Example: 1500 rpm, 1.5 %, 140 of 280 bar -> 1488.75.
// Source: linear part of an induction motor's torque curve (common practice, no source).
double motor_speed_rpm(const MotorLoad& load);

}  // namespace slipledger::analytics
