// One thing that is wrong in a plant file, told so that whoever maintains the file can mend it without the source at
// hand.
#pragma once

#include <string>

namespace slipledger::config {

// Threads: a value, share freely.
struct Fault {
    std::string pointer;  // JSON Pointer (RFC 6901), "/pumps/2/rated/pressure_bar"; "" is the whole file
    int line = 0;       // in the text, from 1: of the value, or of the object in which it is missing; 0: no text at all
    int column = 0;     // from 1, of a syntax error; else 0
    std::string found;  // what stands there
    std::string wanted;  // what is wanted
    std::string code;  // stable: "unknown-key", "duplicate-key", "syntax", "missing", "wrong-type", "out-of-range", ...

    bool operator==(const Fault&) const = default;
};

// One line: place, what stands there, what is wanted, code.
//   /pumps/0/drain (line 31): "internal"; wanted "external": a pressure-compensated pump ... (implausible)
std::string format_fault(const Fault& fault);

}  // namespace slipledger::config
