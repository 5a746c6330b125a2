// The oil of a reservoir, resolved: whether the plant file named an entry of config/fluids.json, named a fluid of its
// own or wrote one in place, rooms see only these values.
#pragma once

#include <optional>
#include <string>
#include <vector>

namespace slipledger::config {

// One measured viscosity. Threads: a value, share freely.
struct ViscosityPoint {
    double temperature_c = 0.0;
    double viscosity_cst = 0.0;

    bool operator==(const ViscosityPoint&) const = default;
};

// Either `points` holds two measured viscosities, or `iso_vg` and `viscosity_index` are both set; the reader sees to
// it. Threads: a value, share freely.
struct Fluid {
    std::string name;
    std::optional<double> iso_vg;
    std::optional<double> viscosity_index;
    std::vector<ViscosityPoint> points;  // empty, or exactly two at different temperatures, the colder first
    double density_15_kgm3 = 875.0;
    double minimum_cst = 10.0;   // thinner: the operating point is set aside as `thin`
    double maximum_cst = 400.0;  // thicker: set aside as `cold`
    double bulk_modulus_gpa = 1.4;

    bool operator==(const Fluid&) const = default;
};

}  // namespace slipledger::config
