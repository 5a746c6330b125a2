// What somebody probably meant who wrote a name that does not exist.
#pragma once

#include <span>
#include <string_view>

namespace slipledger::config {

// The name that fewest single letters added, dropped, changed or swapped with their neighbour turn `written` into;
// empty where none is near (more than a third of the letters, at least two).
std::string_view nearest_name(std::string_view written, std::span<const std::string_view> names);

}  // namespace slipledger::config
