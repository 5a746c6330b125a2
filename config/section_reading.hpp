// What the plant file says of a section, at its pump for all sections or at the section itself.
#pragma once

#include <optional>
#include <set>
#include <string_view>

#include "config/object_reader.hpp"
#include "config/pump.hpp"

namespace slipledger::config {

// A section while its facts are being laid over each other: the pump's first, then its own.
// Threads: one thread; lives within read_plant.
struct SectionDraft {
    Section section;
    std::set<std::string_view> written;  // "displacement_cm3", "rated.speed_rpm", ...: said somewhere, rightly or not
    std::optional<double> reference_pressure_bar;
    std::optional<double> reference_speed_rpm;
    std::optional<double> reference_temperature_c;
};

// Lays what stands in this object (a "pump" or a "section") over the draft.
void read_section_facts(const ObjectReader& reader, SectionDraft& draft);

// Refuses what is still missing, and resolves the reference point: 75 % of rated pressure, rated speed and temperature
// where nothing else is said.
Section finish_section(const ObjectReader& reader, SectionDraft draft);

// Lays limits over those already there: the built-in ones, the plant's, the pump's.
void read_limits(const ObjectReader& reader, Limits& limits);

}  // namespace slipledger::config
