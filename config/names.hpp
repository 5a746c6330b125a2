// Short names and references between the parts of a plant file.
#pragma once

#include <set>
#include <string>
#include <string_view>

#include "config/object_reader.hpp"

namespace slipledger::config {

using Names = std::set<std::string, std::less<>>;

// Reads the required short name at `key` and adds it to those taken; a fault where it is taken already, or is not made
// of letters, digits, dot, dash and underscore (it stands in addresses and file names).
void read_name(const ObjectReader& reader, std::string_view key, std::string& name, Names& taken);

// Reads a name that must be one of `known`; `what` says of what: "reservoir". A fault proposes the nearest.
void read_reference(const ObjectReader& reader, std::string_view key, std::string_view what, std::string& name,
                    const Names& known);

}  // namespace slipledger::config
