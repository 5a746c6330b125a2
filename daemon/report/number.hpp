// Numbers in JSON: six significant digits, more than any of them deserves, and null where nothing is known. One place,
// so that command, API and page agree to the last digit.
#pragma once

#include <nlohmann/json_fwd.hpp>

#include "analytics/course.hpp"

namespace slipledger::report {

// `value` to six significant digits; null for NaN and infinities.
nlohmann::ordered_json number(double value);

// {"value":..,"low":..,"high":..}
nlohmann::ordered_json ranged(const analytics::Ranged& range);

}  // namespace slipledger::report
