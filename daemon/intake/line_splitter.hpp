// Cuts a stream of bytes into lines, however the network or the file system cut it into pieces. A line that lies whole
// in the bytes given is handed out where it lies; only the rest of a piece is kept.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

namespace slipledger::intake {

inline constexpr std::size_t longest_line = 65536;  // bytes, without its line end

struct Line {
    std::string_view text;     // without line end; its first bytes where too_long
    std::uint64_t number = 0;  // from 1
    bool too_long = false;
};

// Keeps at most one line of at most `longest_line` bytes. LF and CRLF end a line; a byte order mark before the first one
// is passed over.
// Threads: one at a time.
class LineSplitter {
public:
    // The next whole line, taking what it used off the front of `bytes`; nothing: `bytes` is used up. The text is valid
    // until the next call.
    std::optional<Line> next(std::string_view& bytes);

    // What stands after the last line end, as a line, once the stream has ended.
    std::optional<Line> rest();

    std::uint64_t lines() const { return lines_; }

private:
    Line line(std::string_view text);
    void keep(std::string_view piece);

    std::string kept_;
    std::uint64_t lines_ = 0;
    bool used_ = false;      // kept_ was handed out
    bool overflown_ = false;  // the line being kept is already longer than allowed
};

}  // namespace slipledger::intake
