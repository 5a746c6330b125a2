// Whether a verdict was right, seen from the day the part was taken out and looked at: what past lives are compared by.
#pragma once

#include <cstdint>
#include <optional>
#include <string_view>

#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// What a part looked like when it came out. `not_told`: nobody said, or said something else.
enum class Found : std::uint8_t { not_told, worn, damaged, good };

// The word of `slipledger replaced --found`. Not computed: a look-up.
Found found_named(std::string_view word);

// `late`: wear was seen, but not as urgent as it was.
enum class Hindsight : std::uint8_t { not_known, right, late, wrong };

std::string_view name_of(Hindsight hindsight);

// The last verdict of a life beside what was found: worn or damaged parts want `plan` or `act` (`watch` was late,
// `sound` wrong), good ones want less than `plan`. Not known where nobody said what was found or the section was
// unjudged. Source: definition.
Hindsight in_hindsight(Level at_end, Found found);

}  // namespace slipledger::analytics
