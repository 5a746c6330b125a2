// Names for things that have none of their own: a short hash of what makes them what they are.
#pragma once

#include <string>
#include <string_view>

namespace slipledger::report {

// The first 128 bits of SHA-256 of `text`, as 32 hexadecimal digits.
std::string fingerprint(std::string_view text);

}  // namespace slipledger::report
