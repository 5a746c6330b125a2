#include <algorithm>
#include <array>
#include <string_view>

#include "tools/judging/tally.hpp"

namespace slipledger::judging {
namespace {

// Names of causes as the product tells them, beside what was true. Silence is right where nothing needs doing.
struct RightCause {
    std::string_view truth;
    std::array<std::string_view, 4> told;
};

constexpr std::array<RightCause, 22> right_causes_table{{
    {"nothing", {"nothing"}},
    {"wear", {"wear"}},
    {"sudden damage", {"sudden-damage"}},
    {"internal return", {"internal-return", "bypass"}},
    {"hot oil", {"nothing", "thin-oil", "oil-or-operation"}},
    {"other oil", {"nothing", "thin-oil", "oil-or-operation"}},
    {"ageing oil", {"nothing", "thin-oil", "oil-or-operation"}},
    {"shifted work", {"nothing", "oil-or-operation"}},
    {"compensator", {"nothing", "compensator", "oil-or-operation"}},
    {"starved inlet", {"inlet-starvation"}},
    {"blocked drain", {"blocked-drain"}},
    {"air in oil", {"air-in-oil"}},
    {"vanes", {"vanes"}},
    {"bypass", {"bypass", "internal-return"}},
    {"silent sensor", {"feed-silent", "nothing"}},
    {"stuck sensor", {"sensor-stuck", "instrument", "wear-or-instrument"}},
    {"drifting sensor", {"sensor-drifting", "instrument", "wear-or-instrument", "nothing"}},
    {"out of range", {"sensor-off-scale", "feed-silent", "instrument"}},
    {"wrong unit", {"sensor-unit", "sensor-off-scale", "instrument"}},
    {"clock off", {"clock-off", "instrument", "nothing"}},
    {"zero drift", {"sensor-drifting", "instrument", "wear-or-instrument", "nothing"}},
    {"pilot flow", {"wear-or-instrument", "sensor-drifting", "compensator", "nothing"}},
}};

}  // namespace

bool is_right_cause(const std::string& true_cause, const std::string& told_cause) {
    const auto row = std::ranges::find(right_causes_table, true_cause, &RightCause::truth);
    return row != right_causes_table.end() && std::ranges::find(row->told, told_cause) != row->told.end();
}

}  // namespace slipledger::judging
