// Reports as text for a terminal: 80 columns, readable in black and white.
#pragma once

#include <string>
#include <vector>

#include "config/plant.hpp"
#include "daemon/report/episodes.hpp"
#include "daemon/report/health.hpp"
#include "daemon/report/history.hpp"
#include "daemon/report/paragraph.hpp"

namespace slipledger::report {

std::string health_text(const SectionHealth& health, const config::Plant& plant, const Paper& paper);
std::string health_text(const PumpHealth& health, const config::Plant& plant, const Paper& paper);  // and the cautions
std::string fleet_text(const std::vector<SectionHealth>& fleet, const config::Plant& plant, const Paper& paper);
std::string history_text(const std::vector<HistoryRow>& history, const config::Plant& plant, const Paper& paper);
std::string alerts_text(const std::vector<Episode>& episodes, const config::Plant& plant, const Paper& paper);

}  // namespace slipledger::report
