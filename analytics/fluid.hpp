// The oil: how thick and how dense it is at a temperature. Leakage through a worn gap goes with one over viscosity, so
// a wrong viscosity reads as wear; everything that judges a pump takes its oil from here.
#pragma once

#include <optional>

namespace slipledger::analytics {

// Mid point of an ISO viscosity grade: kinematic viscosity at 40 degC of the oil the grade is named after.
//
//   grade   -   2 to 3200   number of the grade, as in "VG 46"
//
// Returns mm2/s; NaN where there is no such grade. An oil may lie 10 % to either side of it.
// Example: 46 -> 46; 7 -> 6.8; 50 -> NaN.
// Source: ISO 3448:1992, table 1 (from memory).
double grade_mid_point_cst(double grade);

struct ViscosityBand {
    double low_cst;
    double high_cst;
};

// What an oil of an ISO viscosity grade may measure at 40 degC: 10 % to either side of the mid point. Both NaN where
// there is no such grade.
// Example: 46 -> 41.4 to 50.6.
// Source: ISO 3448:1992 (from memory).
ViscosityBand grade_band(double grade);

// Viscosity index: how little an oil thins when it warms.
//
//   up to 100:  VI = 100 (L - U) / (L - H)
//   from 100:   VI = 100 + (10^N - 1) / 0.00715,   N = (ln H - ln U) / ln Y
//
//   U   viscosity_40_cst    mm2/s  > 0    kinematic, at 40 degC
//   Y   viscosity_100_cst   mm2/s  >= 2   kinematic, at 100 degC
//   L, H   mm2/s at 40 degC of the oils of index 0 and 100 that measure Y at 100 degC
//
// Returns a pure number; NaN where Y < 2 or U <= Y. L and H by the standard's quadratics, which meet its table within
// 0.2 %. Example: 73.30 and 8.86 -> 92; 22.83 and 5.05 -> 156.
// Source: ASTM D2270-10, procedures A and B (examples as the standard prints them; quadratics from memory).
double viscosity_index(double viscosity_40_cst, double viscosity_100_cst);

// The inverse of viscosity_index: what an oil of known grade and index measures at 100 degC.
//
//   viscosity_40_cst   mm2/s   > 2        kinematic, at 40 degC
//   index              -       0 to 400   viscosity index
//
// Returns mm2/s; NaN outside these ranges or where the result would be under 2 mm2/s, where no index is defined.
// Example: 46 and 100 -> 6.76.
// Source: ASTM D2270-10, inverted by bisection.
double viscosity_at_100_cst(double viscosity_40_cst, double index);

struct ViscosityAt {
    double temperature_c;
    double viscosity_cst;

    friend bool operator==(const ViscosityAt&, const ViscosityAt&) = default;
};

// An oil's viscosity line in the standard's own form, and the two points it was drawn through.
struct ViscosityLine {
    ViscosityAt one;
    ViscosityAt other;
    double a;
    double b;
};

// What an oil is besides its viscosity line.
struct FluidTraits {
    double density_15_kgm3 = 875.0;
    double minimum_cst = 10.0;      // thinner: the maker's gaps are not meant for it (regime thin)
    double maximum_cst = 400.0;     // thicker: the pump is not yet warm (regime cold)
    double bulk_modulus_gpa = 1.4;  // secant, 0 to about 300 bar, with the air a plant's oil carries

    friend bool operator==(const FluidTraits&, const FluidTraits&) = default;
};

// Threads: an immutable value, share freely. A default-constructed one is an ISO VG 46 oil of index 100.
class Fluid {
public:
    Fluid();

    // Through two measured viscosities. nullopt where a viscosity is under 2 mm2/s, a temperature is not above absolute
    // zero, the temperatures are equal, the warmer point is not the thinner, or a trait is not positive.
    // Source: ASTM D341.
    static std::optional<Fluid> from_points(ViscosityAt one, ViscosityAt other, const FluidTraits& traits = {});

    // From what the drum says: grade and viscosity index. nullopt where there is no such grade or the index is outside
    // 0 to 400. Taking index 100 for an oil of 150 makes it 11 % too thick at 25 degC and 5 % too thin at 50.
    // Source: ISO 3448 and ASTM D2270 inverted.
    static std::optional<Fluid> from_grade(double iso_vg, double viscosity_index, const FluidTraits& traits = {});

    // Kinematic viscosity at atmospheric pressure.
    //
    //   log10 log10 (nu + 0.7) = A - B log10 T
    //
    //   T   temperature_c + 273.15   K
    //
    // Returns mm2/s; NaN at or below absolute zero or for NaN. Valid from 2 mm2/s up and above the pour point.
    // Example: default oil, 60 degC -> 20.6.
    // Source: ASTM D341, the form for 2 mm2/s and more (from memory).
    double kinematic_cst(double temperature_c) const;

    // The line behind kinematic_cst, so that a viscosity can be checked with a pocket calculator.
    //
    //   W = log10 log10 (nu + 0.7),   B = (W1 - W2) / (log10 T2 - log10 T1),   A = W1 + B log10 T1
    //
    // Returns pure numbers. Example: default oil -> A 9.4559, B 3.6996.
    // Source: ASTM D341 (from memory).
    ViscosityLine line() const;

    // Density at atmospheric pressure.
    //
    //   rho = rho15 exp(-a t (1 + 0.8 a t)),   a = 0.6278 / rho15,   t = temperature_c - 15
    //
    // Returns kg/m3; NaN for NaN. Valid for mineral lubricating oils, -20 to 120 degC.
    // Example: 875 kg/m3, 50 degC -> 852.9.
    // Source: ASTM D1250 / API MPMS 11.1, generalised lubricating oils (from memory).
    double density_kgm3(double temperature_c) const;

    // Dynamic viscosity: mu = nu rho.
    // Returns Pa s; NaN where either is. Example: default oil, 40 degC -> 0.0395.
    // Source: definition.
    double dynamic_pas(double temperature_c) const;

    // Not computed: what the maker or the plant file says. Source: plant file. Returns mm2/s.
    double minimum_cst() const { return traits_.minimum_cst; }
    // Not computed: as above. Source: plant file. Returns mm2/s.
    double maximum_cst() const { return traits_.maximum_cst; }
    // Not computed: as above. Source: plant file. Returns GPa.
    double bulk_modulus_gpa() const { return traits_.bulk_modulus_gpa; }
    // Not computed: as above. Source: plant file. Returns kg/m3.
    double density_15_kgm3() const { return traits_.density_15_kgm3; }

    friend bool operator==(const Fluid&, const Fluid&) = default;

private:
    Fluid(ViscosityAt one, ViscosityAt other, const FluidTraits& traits);

    ViscosityAt one_;
    ViscosityAt other_;
    double intercept_;  // of ln ln (nu + 0.7) over ln T
    double slope_;
    FluidTraits traits_;
};

}  // namespace slipledger::analytics
