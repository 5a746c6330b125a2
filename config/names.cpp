#include "config/names.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "config/nearest.hpp"

namespace slipledger::config {
namespace {

bool is_name(std::string_view text) {
    constexpr std::size_t longest = 64;
    constexpr std::string_view allowed = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789._-";
    return text.size() <= longest && text.find_first_not_of(allowed) == std::string_view::npos &&
           text.find_first_not_of('.') != std::string_view::npos;
}

}  // namespace

void read_name(const ObjectReader& reader, std::string_view key, std::string& name, Names& taken) {
    reader.require(key);
    reader.read(key, name);
    if (name.empty()) return;
    if (!is_name(name)) {
        reader.complain(key, "up to 64 letters, digits, dots, dashes and underscores", "bad-name");
    } else if (!taken.insert(name).second) {
        reader.complain(key, "a name that no other entry of this list has", "duplicate-name");
    }
}

void read_reference(const ObjectReader& reader, std::string_view key, std::string_view what, std::string& name,
                    const Names& known) {
    reader.read(key, name);
    if (name.empty() || known.contains(name)) return;
    const std::vector<std::string_view> names(known.begin(), known.end());
    const std::string_view nearest = nearest_name(name, names);
    constexpr std::size_t few = 8;
    std::string wanted = fmt::format("the name of a {} of this file", what);
    if (!nearest.empty()) {
        wanted += fmt::format("; perhaps \"{}\"", nearest);
    } else if (!names.empty() && names.size() <= few) {
        wanted += fmt::format(": {}", fmt::join(names, ", "));
    }
    reader.complain(key, wanted, "unknown-reference");
}

}  // namespace slipledger::config
