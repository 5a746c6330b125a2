#include "tools/plantsim/gap_sets.hpp"

#include <numbers>

namespace slipledger::plantsim {
namespace {

constexpr double pi = std::numbers::pi;
constexpr double micron = 1e-6;

}  // namespace

std::vector<Gap> axial_piston_gaps(double size) {
    return {
        {.name = "pistons in their bores",
         .conductance_m3 = size * annulus_conductance(4.5, 0.024, 0.035, 27 * micron),
         .area_m2 = 4.5 * pi * 0.024 * 27 * micron,
         .wears = 1.0,
         .eccentricity = 0.7},
        {.name = "slippers",
         .conductance_m3 = size * ring_conductance(4.5, 0.006, 0.0105, 17 * micron),
         .area_m2 = 4.5 * pi / 4.0 * 0.0009 * 0.0009,
         .opens_with_pressure = -0.12,
         .drag_cm3 = 0.05},
        {.name = "port plate",
         .conductance_m3 = size * slot_conductance(1, 0.345, 0.006, 19 * micron),
         .area_m2 = 0.345 * 19 * micron,
         .wears = 0.6,
         .opens_with_pressure = 0.2,
         .hole_m2 = 4.0e-8 * size,
         .hole_wears = 0.5},
    };
}

std::vector<Gap> radial_piston_gaps() {
    return {
        {.name = "pistons in their bores",
         .conductance_m3 = annulus_conductance(3.5, 0.026, 0.030, 27 * micron),
         .area_m2 = 3.5 * pi * 0.026 * 27 * micron,
         .wears = 1.0,
         .eccentricity = 0.6},
        {.name = "pintle",
         .conductance_m3 = slot_conductance(2, 0.12, 0.014, 33 * micron),
         .area_m2 = 2 * 0.12 * 33 * micron,
         .wears = 0.3,
         .opens_with_pressure = 0.2,
         .hole_m2 = 2.2e-8},
    };
}

std::vector<Gap> vane_gaps(double width) {
    return {
        {.name = "rotor sides",
         .conductance_m3 = slot_conductance(2, 0.157, 0.012, 33 * micron),
         .area_m2 = 2 * 0.157 * 33 * micron,
         .wears = 1.0,
         .opens_with_pressure = 0.18,
         .drag_cm3 = 0.25},
        {.name = "under the vanes",
         .conductance_m3 = slot_conductance(12, 0.030 * width, 0.018, 16 * micron),
         .area_m2 = 12 * 0.030 * width * 16 * micron,
         .wears = 0.7,
         .hole_m2 = 3.0e-8,
         .hole_wears = 0.3},
        {.name = "vane tips",
         .conductance_m3 = slot_conductance(4, 0.040 * width, 0.0016, 11 * micron),
         .area_m2 = 4 * 0.040 * width * 11 * micron,
         .wears = 0.8,
         .to_drain = false},
    };
}

std::vector<Gap> external_gear_gaps() {
    return {
        {.name = "bearing blocks",
         .conductance_m3 = slot_conductance(4, 0.060, 0.014, 35 * micron),
         .area_m2 = 4 * 0.060 * 35 * micron,
         .wears = 0.6,
         .opens_with_pressure = -0.25,
         .to_drain = false},
        {.name = "tooth tips",
         .conductance_m3 = slot_conductance(2, 0.032, 0.0036, 30 * micron),
         .area_m2 = 2 * 0.032 * 30 * micron,
         .wears = 1.0,
         .opens_with_pressure = 0.3,
         .drag_cm3 = 0.4,
         .to_drain = false,
         .hole_m2 = 6.0e-8},
    };
}

std::vector<Gap> internal_gear_gaps() {
    return {
        {.name = "filler piece",
         .conductance_m3 = slot_conductance(2, 0.038, 0.009, 32 * micron),
         .area_m2 = 2 * 0.038 * 32 * micron,
         .wears = 1.0,
         .opens_with_pressure = -0.2,
         .to_drain = false},
        {.name = "axial plates",
         .conductance_m3 = slot_conductance(4, 0.070, 0.018, 30 * micron),
         .area_m2 = 4 * 0.070 * 30 * micron,
         .wears = 0.7,
         .opens_with_pressure = -0.25,
         .drag_cm3 = 0.3,
         .to_drain = false,
         .hole_m2 = 5.0e-8},
    };
}

}  // namespace slipledger::plantsim
