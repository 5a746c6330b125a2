// The ways by which oil gets lost inside a pump, one by one: slots whose walls stand still or move, with the height
// that wear and pressure give them, and holes. The judging side knows only the sum of three smooth terms; here each gap
// has its own size and its own reason to open.
#pragma once

#include <string_view>

#include "tools/plantsim/oil.hpp"

namespace slipledger::plantsim {

// What a section feels at one moment. Threads: a value, share freely.
struct Strain {
    double pressure_bar = 0.0;
    double speed_rpm = 0.0;
    double temperature_c = 50.0;
    double oil_age_years = 0.0;
    double growth = 1.0;  // of the gap that wears fastest: its height now / when healthy
};

// All gaps of one family in a section. Threads: a value, share freely.
struct Gap {
    std::string_view name;
    double conductance_m3 = 0.0;       // healthy, centred, laminar: flow = conductance dp / viscosity
    double area_m2 = 1.0;              // across which it flows: speed and thus inertia
    double wears = 0.0;                // 1: takes the full growth of wear; 0: never opens
    double opens_with_pressure = 0.0;  // relative height gained from no to rated pressure; negative: plates close up
    double eccentricity = 0.0;         // of a piston in its bore at 75 % pressure, 0 centred to 1 touching
    double drag_cm3 = 0.0;             // carried along by the moving wall each turn; negative: against the leak
    bool to_drain = true;              // else it returns inside the pump, where no drain meter sees it
    double hole_m2 = 0.0;              // holes in parallel to the gaps: notches, balance bores
    double hole_wears = 0.0;           // the same for the area of the holes
};

// Conductances from drawings, all lengths in metres; areas beside them.
double annulus_conductance(double count, double diameter, double length, double clearance);
double ring_conductance(double count, double inner_radius, double outer_radius, double height);
double slot_conductance(double count, double width, double length, double height);

// The oil as it is in every gap of a section at one moment. Threads: a value, share freely.
struct GapOil {
    double viscosity_pas = 0.0;
    double density_kgm3 = 0.0;
};

GapOil gap_oil(const Oil& oil, const Strain& strain);

// Flow through one family in L/min, >= 0.
double gap_flow_lpm(const Gap& gap, const GapOil& oil, const Strain& strain, double rated_bar);
double gap_flow_lpm(const Gap& gap, const Oil& oil, const Strain& strain, double rated_bar);

}  // namespace slipledger::plantsim
