// Gathers from the ledger what a page of working is made from. It lives in this room because the readings are joined
// and the estimate is led again by the code that judged them; report::working_of makes the page.
#pragma once

#include <optional>

#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/report/working_facts.hpp"

namespace slipledger::watch {

// Threads: a value, share freely.
struct WorkingQuestion {
    std::optional<analytics::Instant> at;   // none: the last summary with something judged, else the last one
    std::optional<analytics::Basis> basis;  // none: the one that speaks for the section today
};

// `plant`, `pump` and `section` must outlive what is returned.
report::WorkingFacts query_working(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump,
                                   const config::Section& section, const WorkingQuestion& question);

}  // namespace slipledger::watch
