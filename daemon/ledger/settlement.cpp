#include "daemon/ledger/settlement.hpp"

#include <algorithm>

namespace slipledger::ledger {

std::optional<double> settled_value(std::span<const DisputedValue> values, const Corrections& corrections) {
    const auto beaten = [&](const DisputedValue& value) {
        return std::ranges::any_of(values, [&](const DisputedValue& other) {
            const auto corrects = corrections.find(other.feed);
            return corrects != corrections.end() && corrects->second == value.feed && other.feed != value.feed;
        });
    };
    std::optional<double> left;
    for (const DisputedValue& value : values) {
        if (beaten(value)) continue;
        if (left) return std::nullopt;
        left = value.value;
    }
    return left;
}

}  // namespace slipledger::ledger
