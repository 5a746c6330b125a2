// Which value of a disputed cell is believed, if one is. First what a person said: an event `settled` names a span and the
// feed to believe in it, the newest word on a cell counting. Else a feed that the plant file marks `corrects: FEED` beats
// that feed's values; what is then left, if it is one value, holds. Decided while reading, so that a change of the plant
// file and an event entered late hold for what is stored already, and neither order nor repeats of readings can matter.
#pragma once

#include <cstdint>
#include <map>
#include <optional>
#include <span>
#include <vector>

#include "daemon/ledger/hour_cells.hpp"

namespace slipledger::ledger {

using Corrections = std::map<std::uint16_t, std::uint16_t>;  // feed -> the feed it corrects

// What a person settled of one point. Threads: a value, share freely.
struct Believed {
    std::int64_t from = 0;  // ms since 1970, both included
    std::int64_t to = 0;
    std::optional<std::size_t> quantity;  // none: all
    std::uint16_t feed = 0;
};

// Who is believed where values differ. Threads: a value, share freely.
struct Settlement {
    std::vector<Believed> believed;  // newest word first
    Corrections corrections;

    bool empty() const { return believed.empty() && corrections.empty(); }
};

// `values` are all of one cell. A feed that told two different values for it settles nothing.
std::optional<double> settled_value(std::span<const DisputedValue> values, const Settlement& settlement);

}  // namespace slipledger::ledger
