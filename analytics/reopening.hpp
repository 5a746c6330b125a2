// What of an estimate a dated change leaves open: a new meter has a zero of its own, a new oil is only as thick as its
// label says. What is opened is learned anew from the readings after the change, so that they are not taken for wear.
#pragma once

#include "analytics/fact_change.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/wear_prior.hpp"

namespace slipledger::analytics {

// Opens a belief to what a change may have brought, the wear itself kept where it is:
//
//   oil by its label      var(ln a) + 0.058^2: a grade is a band of 10 % to either side, taken as equally likely
//   own flow meter        zero 0 +- its accuracy again, free of all else; by drain var(ln a, ln b, ln c in common) +
//   0.35^2,
//                         by delivery var(dV) + (0.03 V)^2: the old one may have been far off, and a gain that stays
//                         put looks like those
//   pressure gauge        var(ln a) + 0.1^2, var(ln b) + 0.05^2, as 10 % of pressure would move them
//   thermometer           var(ln a) + 0.1^2: 2 K
//   speed, by delivery    var(dV) + (0.01 V)^2
//
// Everything else leaves it as it is.
// Source: ISO 3448 (band; from memory); the sizes of what instruments are off by: common practice, no source.
void open_for(WearBelief& belief, const FactChange& change, const SectionSpec& spec, Basis basis);

}  // namespace slipledger::analytics
