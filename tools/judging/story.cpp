#include "tools/judging/story.hpp"

#include <algorithm>

namespace slipledger::judging {

std::optional<Fleet> fleet_named(std::string_view name) {
    const auto found = std::ranges::find(fleet_names, name);
    if (found == fleet_names.end()) return std::nullopt;
    return static_cast<Fleet>(found - fleet_names.begin());
}

std::string Story::name() const {
    return std::string(name_of(fleet)) + " " + std::to_string(number);
}

}  // namespace slipledger::judging
