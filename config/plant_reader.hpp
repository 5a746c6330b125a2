// From the text of a plant file to a Plant, or to every fault in it at once. The only reader: the daemon, SIGHUP and
// `slipledger check-plant` all come through here. The keys, their units and defaults are listed in config/README.md.
#pragma once

#include <filesystem>
#include <optional>
#include <string_view>
#include <vector>

#include "config/fault.hpp"
#include "config/plant.hpp"

namespace slipledger::config {

// Either a plant, or at least one fault. A syntax error comes alone, with its line and column.
// Threads: a value, share freely.
struct PlantReading {
    std::optional<Plant> plant;
    std::vector<Fault> faults;

    explicit operator bool() const { return plant.has_value(); }
};

PlantReading read_plant(std::string_view text);

// A file that cannot be read is a fault too (code "unreadable"). Relative paths in it are taken from the file's
// own folder.
PlantReading read_plant_file(const std::filesystem::path& path);

}  // namespace slipledger::config
