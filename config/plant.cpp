#include "config/plant.hpp"

#include <algorithm>

namespace slipledger::config {
namespace {

template <typename Items>
auto find_by_id(const Items& items, std::string_view id) -> decltype(items.data()) {
    const auto found = std::ranges::find(items, id, [](const auto& item) { return std::string_view(item.id); });
    return found == items.end() ? nullptr : &*found;
}

}  // namespace

const Pump* Plant::find_pump(std::string_view pump_id) const {
    return find_by_id(pumps, pump_id);
}

const Reservoir* Plant::find_reservoir(std::string_view reservoir_id) const {
    return find_by_id(reservoirs, reservoir_id);
}

const Section* Pump::find_section(std::string_view section_id) const {
    return find_by_id(sections, section_id);
}

}  // namespace slipledger::config
