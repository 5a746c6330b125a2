// Reports as pages: plain HTML without scripts, complete as they arrive. Foreign text is escaped here, in one place.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "config/plant.hpp"
#include "daemon/report/health.hpp"

namespace slipledger::report {

// `text` with the five characters that mean something to HTML replaced.
std::string escaped(std::string_view text);

// Links are relative to the server's root: "/pumps/ID"; the style sheet is "/web/page.css".
std::string fleet_page(const std::vector<SectionHealth>& fleet, const config::Plant& plant);
std::string health_page(const PumpHealth& health, const config::Plant& plant);

}  // namespace slipledger::report
