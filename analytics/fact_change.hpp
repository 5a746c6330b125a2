// What about a section changed at a dated fact. What of its estimate that leaves open is told in reopening.hpp.
#pragma once

#include <cstdint>

#include "analytics/quantity.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

struct FactChange {
    bool oil = false;               // of another viscosity, or of the same by a new sample
    bool oil_by_label = false;      // how thick it is is known by its grade only, or was so up to here
    bool setting = false;           // compensator, volume stop, relief valve
    std::uint16_t instruments = 0;  // bits index_of(quantity): changed, or set anew

    // Not computed: a bit.
    bool changes(Quantity quantity) const { return (instruments >> index_of(quantity) & 1U) != 0; }
    // Whether what was learned of the healthy pump must be learned again in part. Not computed: looks at the flags.
    bool opens_baseline(Basis basis) const;

    friend bool operator==(const FactChange&, const FactChange&) = default;
};

}  // namespace slipledger::analytics
