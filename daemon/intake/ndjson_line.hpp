// One line of NDJSON to its keys and values: one flat object, no key twice. Read as a stream of tokens; no tree is built.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "daemon/intake/refusal.hpp"

namespace slipledger::intake {

// Threads: a value.
struct JsonField {
    enum class Kind { nothing, number, text, truth };

    std::string key;
    Kind kind = Kind::nothing;
    double number = 0.0;  // of a number; 0 or 1 of a truth
    std::string text;     // as it stands there
};

// Threads: one at a time.
class NdjsonLine {
public:
    static constexpr std::size_t most_keys = 256;

    // Valid until the next call.
    Checked<std::span<const JsonField>> read(std::string_view line);

private:
    std::vector<JsonField> fields_;  // only grows, so that a row costs no allocation
};

}  // namespace slipledger::intake
