// Ranked causes as the text of one column, JSON, so that an SQL tool can read them too; schema/README.md tells its form.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "analytics/causes.hpp"

namespace slipledger::ledger {

// [{"cause":"wear","weight":0.62,"for":[["ratio-up",1,1.31,1.22,null,1.5], ...],"against":[...]}, ...]
std::string text_of(const std::vector<analytics::RankedCause>& causes);

// The same back. What is not understood, of a later version, is left out.
std::vector<analytics::RankedCause> causes_of(std::string_view text);

}  // namespace slipledger::ledger
