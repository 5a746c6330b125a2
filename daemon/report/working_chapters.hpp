// The chapters of a page of working, in their order; working.cpp calls one after the other until one says why it cannot
// go on. Inside the room only: from outside call working_of.
#pragma once

#include <optional>
#include <string>

#include "daemon/report/work_sheet.hpp"
#include "daemon/report/working_facts.hpp"

namespace slipledger::report {

// Why the page ends here; nullopt: it goes on.
using Stop = std::optional<std::string>;

// Raw reading to leakage and features at one instant (working_point.cpp). The last two want write_reference before
// them.
void write_readings(const WorkingFacts& facts, WorkSheet& sheet);
void write_regime(const WorkingFacts& facts, WorkSheet& sheet);
void write_leakage_seen(const WorkingFacts& facts, WorkSheet& sheet);
void write_features(const WorkingFacts& facts, WorkSheet& sheet);

// The oil's viscosity line; then its state at a temperature that stands on the page as "t" and `tag`, worked out in
// symbols with the same tag (working_oil.cpp).
void write_oil_line(const WorkingFacts& facts, WorkSheet& sheet);
void write_oil_at(const WorkingFacts& facts, WorkSheet& sheet, double temperature_c, const std::string& tag);
void write_reference(const WorkingFacts& facts, WorkSheet& sheet);

// From the summary's means to the leakage ratio (working_ratio.cpp).
Stop write_summary(const WorkingFacts& facts, WorkSheet& sheet);
Stop write_estimate(const WorkingFacts& facts, WorkSheet& sheet);
void write_ratio(const WorkingFacts& facts, WorkSheet& sheet);

// What follows from the ratio (working_figures.cpp).
void write_efficiency(const WorkingFacts& facts, WorkSheet& sheet);
void write_losses(const WorkingFacts& facts, WorkSheet& sheet);
void write_hours_in_hand(const WorkingFacts& facts, WorkSheet& sheet);

// How the level followed, and what the leak costs (working_level.cpp).
void write_level(const WorkingFacts& facts, WorkSheet& sheet);
void write_cost(const WorkingFacts& facts, WorkSheet& sheet);

}  // namespace slipledger::report
