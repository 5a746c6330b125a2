// From the plant file's pump and section, and the life in service, to what analysis must know: the one place where the two
// vocabularies meet.
#pragma once

#include <array>
#include <optional>

#include "analytics/reference_test.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/usual.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/lives.hpp"

namespace slipledger::watch {

// What readings, not the plant file, tell. Threads: a value, share freely.
struct SeenSensors {
    bool speed = true;
    bool temperature = true;

    bool operator==(const SeenSensors&) const = default;
};

// `pump` and `section` hold the facts of the time judged; `day` is the day's beginning, from which planned stops lie ahead.
analytics::SectionSpec section_spec_of(const config::Plant& plant, const config::Pump& pump,
                                       const config::Section& section, const ledger::Life& life, bool watched_from_new,
                                       const SeenSensors& seen, analytics::Instant day);

// A reference test of the part as new stands for its maker's test where it is the surer of the two.
void heed_as_new(analytics::SectionSpec& spec, const analytics::ReferenceTest& test);

// The oil in analysis' terms; nullopt where it can be none.
std::optional<analytics::Fluid> oil_of(const config::Fluid& fluid);

// The second shutdown from `at` on that stops machines of this area.
std::optional<analytics::Instant> second_next_stop(const config::Plant& plant, const std::string& area,
                                                   analytics::Instant at);

// The plant file's holds, 0 where none is given.
std::array<analytics::Milliseconds, analytics::quantity_count> given_holds(const config::Section& section);

// Whether several sections of the plant drain through this section's meter.
bool drains_with_others(const config::Plant& plant, const config::Section& section);

}  // namespace slipledger::watch
