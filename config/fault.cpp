#include "config/fault.hpp"

#include <fmt/format.h>

namespace slipledger::config {

std::string format_fault(const Fault& fault) {
    std::string place = fault.pointer.empty() ? "plant file" : fault.pointer;
    if (fault.column > 0) {
        place += fmt::format(" (line {}, column {})", fault.line, fault.column);
    } else if (fault.line > 0) {
        place += fmt::format(" (line {})", fault.line);
    }
    return fmt::format("{}: {}; wanted {} ({})", place, fault.found, fault.wanted, fault.code);
}

}  // namespace slipledger::config
