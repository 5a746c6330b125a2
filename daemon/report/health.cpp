#include "daemon/report/health.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "daemon/report/when.hpp"

namespace slipledger::report {

const SectionHealth& PumpHealth::most_urgent() const {
    return *std::max_element(sections.begin(), sections.end(),
                             [](const SectionHealth& a, const SectionHealth& b) { return a.level < b.level; });
}

analytics::LikelyReplacement likely_replacement(const SectionHealth& health) {
    return health.verdict ? health.verdict->replacement : analytics::LikelyReplacement{};
}

std::string replaced_command(const SectionHealth& health, Instant at) {
    return fmt::format("slipledger replaced {} --section {} --at {} --by NAME", health.pump, health.section, rfc3339(at));
}

const std::vector<std::string>& cautions() {
    static const std::vector<std::string> all{
        "Decision support, not a safety function. Readings can be wrong, and so can this report.",
        "Hydraulic systems hold pressure and hot oil after they stop: lock out, bleed down and let cool before opening "
        "anything.",
        "Follow the maker's manual, site rules and local codes first. Work by qualified people only.",
    };
    return all;
}

}  // namespace slipledger::report
