// Why a row or a cell was not taken: where it stood, what was found, what is wanted, and a code that stays the same
// from release to release, so that scripts and dashboards can count by it.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>
#include <type_traits>

#include <boost/system/result.hpp>

namespace slipledger::intake {

enum class Reason : std::uint8_t {
    bad_syntax,         // not JSON, not one object, nested
    bad_quote,          // CSV quotes that do not close or close too early
    duplicate_key,      // one key twice in a row
    line_too_long,      // over 64 KiB
    unfinished_line,    // the connection ended inside it
    wrong_field_count,  // more or fewer fields than the header
    bad_header,         // nothing below it can be read
    unknown_column,     // neither listed in the feed nor a quantity
    missing_time,
    bad_time,
    ambiguous_time,    // local time that the clock change gives twice, or never
    implausible_time,  // before 1990: a logger whose clock was never set
    future,            // further in front of the receiving clock than the feed's max_ahead
    missing_pump,
    unknown_pump,
    unknown_section,
    missing_tag,
    unknown_tag,
    bad_number,
    out_of_range,  // no pump, or not this instrument, can be there
    no_value,      // nothing in the row is a reading
};

std::string_view code_of(Reason reason);

// Threads: a value, share freely.
struct Refusal {
    Refusal() = default;
    explicit Refusal(Reason reason_, std::string where_ = {}, std::string found_ = {}, std::string wanted_ = {});

    // `outlet_pressure "18l.2" is not a number; wanted bar, e.g. 181.2 (bad-number)`
    std::string message() const;

    Reason reason = Reason::bad_syntax;
    std::string where;   // column, key or tag; empty: the row
    std::string found;   // what stands there, in words
    std::string wanted;  // may be empty
};

template <class T>
using Checked = boost::system::result<T, Refusal>;

// Found in the wild a line can be anything: at most `most` bytes of it, in quotes, with what would break a log line
// replaced by '?'.
std::string in_quotes(std::string_view text, std::size_t most = 40);

}  // namespace slipledger::intake
