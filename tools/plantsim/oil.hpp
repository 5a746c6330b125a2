// What the oil in a tank is like, temperature by temperature. Written here and not taken from analytics/, so that a
// mistake there cannot cancel out in the demonstration.
#pragma once

namespace slipledger::plantsim {

// As the laboratory would find it; the plant file may well say something rounder. Threads: a value, share freely.
struct Oil {
    double at_40_cst = 46.0;
    double at_100_cst = 6.8;
    double density_15_kgm3 = 872.0;
    double barus_per_gpa = 18.0;      // how fast pressure thickens it: viscosity grows by exp(barus p)
    double thinning_per_year = 0.03;  // fraction of its viscosity lost in a year of service
};

// Kinematic viscosity in mm2/s by Walther's line log10 log10 (nu + 0.7) = A - B log10 T through both points (T in K;
// the law behind ASTM D341, from memory), thinned by `age_years` of service.
double kinematic_cst(const Oil& oil, double temperature_c, double age_years);

// kg/m3; 0.65 kg/m3 less per kelvin, which is usual for mineral oil.
double density_kgm3(const Oil& oil, double temperature_c);

// Dynamic viscosity in Pa s half way through a gap across which `pressure_bar` falls: thickened by the pressure still
// in it, thinned by the heat it has already taken up (4.7 K per 100 bar, of which the walls take a fifth).
double gap_viscosity_pas(const Oil& oil, double temperature_c, double pressure_bar, double age_years);

// Fraction by which oil with a little air in it has shrunk at `pressure_bar`.
double compression(double temperature_c, double pressure_bar);

}  // namespace slipledger::plantsim
