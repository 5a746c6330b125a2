// Where the fleets' pumps come from: drawings of every type and size, no two alike, and the oil they work in. Nothing
// happens to them yet; stories.hpp lets it.
#pragma once

#include <optional>
#include <string>

#include "tools/judging/dice.hpp"
#include "tools/plantsim/drawing.hpp"

namespace slipledger::judging {

enum class PumpKind : std::uint8_t { axial_piston, radial_piston, vane, external_gear, internal_gear };
std::string_view name_of(PumpKind kind);  // as in a plant file

// A pump as built, and what its papers say of it. Threads: a value, share freely.
struct YardPump {
    plantsim::PumpDrawing drawing{};
    PumpKind kind = PumpKind::axial_piston;
    std::string model{};
    double relief_bar = 0.0;
};

// What such a pump should be, where it is not left to chance. Threads: a value, share freely.
struct Wanted {
    std::optional<PumpKind> kind{};
    std::optional<bool> drain{};        // metered in the drain; in a gear pump it cannot be
    std::optional<bool> delivery{};     // metered at the outlet
    std::optional<bool> compensated{};  // by pressure
    std::size_t sections = 1;           // 2: a double vane pump
};

YardPump pump_from_yard(Dice& dice, const Wanted& wanted);

// The same model again, from the same drawings: its gaps, displacement, duty and instruments are its own.
YardPump sister_of(const YardPump& pump, Dice& dice);

// A tank for pumps like this one.
plantsim::ReservoirDrawing tank_for(const plantsim::PumpDrawing& pump, std::size_t pumps, Dice& dice);

// An oil of this grade as a laboratory would find it; index 100 or 150.
plantsim::Oil oil_of(int grade, int index, Dice& dice);
int grade_of(const plantsim::Oil& oil);  // the nearest of 32, 46, 68, 100

}  // namespace slipledger::judging
