#include "daemon/ledger/directory.hpp"

#include <algorithm>
#include <cassert>

namespace slipledger::ledger {

std::optional<PointId> Directory::point(std::string_view pump, std::string_view section) const {
    const auto found = points.find({std::string(pump), std::string(section)});
    return found == points.end() ? std::nullopt : std::optional(found->second);
}

const TrackEntry& Directory::track(std::string_view pump, std::string_view section, analytics::Basis basis) const {
    const auto found = std::ranges::find_if(tracks, [&](const TrackEntry& entry) {
        return entry.pump_name == pump && entry.section == section && entry.basis == basis;
    });
    assert(found != tracks.end());
    return *found;
}

}  // namespace slipledger::ledger
