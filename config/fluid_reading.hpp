// Oils by name: the generic ones of config/fluids.json, and over them those of the plant file.
#pragma once

#include <map>
#include <string>

#include "config/fluid.hpp"
#include "config/object_reader.hpp"

namespace slipledger::config {

using FluidTable = std::map<std::string, Fluid, std::less<>>;

const FluidTable& built_in_fluids();

// One entry of `fluids`. An oil needs either grade and index, or two measured points.
Fluid read_fluid(const std::string& name, const ObjectReader& reader);

}  // namespace slipledger::config
