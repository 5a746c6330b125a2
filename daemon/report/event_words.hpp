// What an event says, in a line: the particulars of its body as people read them.
#pragma once

#include <string>

#include "daemon/ledger/records.hpp"

namespace slipledger::report {

// "VG 32, VI 150, in press-tank", "240 bar", "3.3 L/min of drain at 210 bar, 1480 rpm, 50 degC". Empty where there is
// nothing to add to its kind. May hold foreign text: it goes through printable() before it is shown.
std::string event_words(const ledger::Event& event);

}  // namespace slipledger::report
