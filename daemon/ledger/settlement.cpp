#include "daemon/ledger/settlement.hpp"

#include <algorithm>

namespace slipledger::ledger {
namespace {

template <typename Wanted>
std::optional<double> only_value(std::span<const DisputedValue> values, Wanted wanted) {
    std::optional<double> found;
    for (const DisputedValue& value : values) {
        if (!wanted(value)) continue;
        if (found) return std::nullopt;
        found = value.value;
    }
    return found;
}

std::optional<double> believed_value(std::span<const DisputedValue> values, std::span<const Believed> believed) {
    const DisputedValue& cell = values.front();
    for (const Believed& word : believed) {
        const bool meant = word.from <= cell.time && cell.time <= word.to && word.quantity.value_or(cell.quantity) == cell.quantity;
        if (!meant) continue;
        const auto value = only_value(values, [&](const DisputedValue& told) { return told.feed == word.feed; });
        if (value) return value;
    }
    return std::nullopt;
}

}  // namespace

std::optional<double> settled_value(std::span<const DisputedValue> values, const Settlement& settlement) {
    if (values.empty()) return std::nullopt;
    if (const auto value = believed_value(values, settlement.believed)) return value;
    const Corrections& corrections = settlement.corrections;
    const auto beaten = [&](const DisputedValue& value) {
        return std::ranges::any_of(values, [&](const DisputedValue& other) {
            const auto corrects = corrections.find(other.feed);
            return corrects != corrections.end() && corrects->second == value.feed && other.feed != value.feed;
        });
    };
    return only_value(values, [&](const DisputedValue& value) { return !beaten(value); });
}

}  // namespace slipledger::ledger
