// What a plant's people know of their plant, which is less than the drawing: labels on drums, name plates, data sheets.
// Written as the plant file that the real reader reads.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "tools/judging/pump_yard.hpp"

namespace slipledger::judging {

// What is told of an oil. Threads: a value, share freely.
struct OilPapers {
    plantsim::Oil oil{};
    int index = 100;       // on the drum
    bool sampled = false;  // two viscosities from a laboratory, instead of the label
};

// Threads: a value, share freely.
struct PumpPapers {
    YardPump pump{};
    bool ranges_given = true;  // of the instruments
    bool maker_test = false;
    double maker_test_error = 0.0;            // share by which its record is off
    std::optional<plantsim::Millis> since{};  // it was new then
};

// Threads: a value, share freely.
struct PlantPapers {
    const plantsim::PlantDrawing& plant;
    std::vector<PumpPapers> pumps{};
    OilPapers oil{};
};

std::string plant_file(const PlantPapers& papers);

}  // namespace slipledger::judging
