#include "daemon/report/number.hpp"

#include <fmt/format.h>

#include <charconv>
#include <cmath>
#include <nlohmann/json.hpp>

namespace slipledger::report {

nlohmann::ordered_json number(double value) {
    if (!std::isfinite(value)) return nullptr;
    const std::string digits = fmt::format("{:.6g}", value);
    double rounded = 0.0;
    std::from_chars(digits.data(), digits.data() + digits.size(), rounded);
    return rounded == 0.0 ? 0.0 : rounded;  // no "-0.0"
}

nlohmann::ordered_json ranged(const analytics::Ranged& range) {
    return {{"value", number(range.value)}, {"low", number(range.low)}, {"high", number(range.high)}};
}

}  // namespace slipledger::report
