// A page of working as text for a terminal of 80 columns and as one JSON value; the same numbers to the last digit.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>

#include "config/plant.hpp"
#include "daemon/report/working.hpp"

namespace slipledger::report {

// `points`: with a line for each operating point of the summary.
std::string working_text(const Working& working, const config::Plant& plant, bool points);

// {pump, section, basis, at, summary{}, life, steps[]{chapter, name, symbol, value, sd, unit, formula, numbers,
// source}, remarks[], points[], ends_because, cautions[]}
nlohmann::ordered_json to_json(const Working& working);

}  // namespace slipledger::report
