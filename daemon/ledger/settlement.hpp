// Which value of a disputed cell is believed, if one is: a feed that the plant file marks `corrects: FEED` beats that feed's
// values; what is then left, if it is one value, holds. Decided while reading, so that a change of the plant file holds for
// what is stored already.
#pragma once

#include <cstdint>
#include <map>
#include <optional>
#include <span>

#include "daemon/ledger/hour_cells.hpp"

namespace slipledger::ledger {

using Corrections = std::map<std::uint16_t, std::uint16_t>;  // feed -> the feed it corrects

std::optional<double> settled_value(std::span<const DisputedValue> values, const Corrections& corrections);

}  // namespace slipledger::ledger
