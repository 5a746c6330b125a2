// One way readings come in, as intake needs it: where to listen or look, how a row is written, and what each name
// means.
#pragma once

#include <chrono>
#include <cstdint>
#include <map>
#include <optional>
#include <string>
#include <vector>

#include "analytics/quantity.hpp"

namespace slipledger::config {

// "127.0.0.1:7310", "[::1]:7310"; port 0 lets the system choose. Threads: a value, share freely.
struct Endpoint {
    std::string host;
    std::uint16_t port = 0;

    bool operator==(const Endpoint&) const = default;
};

// What a column or a tag of a feed stands for: canonical value = (text * scale + offset), then converted from `unit`.
// At most one of pump, reservoir and drain_group is set, none where the row itself (or Feed::pump) names the pump;
// `section` may stand beside any of these pumps. Threads: a value, share freely.
struct Target {
    std::string pump;
    std::string section;  // empty: the reading belongs to the pump
    std::string reservoir;
    std::string drain_group;
    analytics::Quantity quantity = analytics::Quantity::outlet_pressure;
    std::string unit;  // empty: the canonical unit
    double scale = 1.0;
    double offset = 0.0;

    bool operator==(const Target&) const = default;
};

enum class FeedKind { tcp, drop };
enum class FeedFormat { ndjson, csv };
enum class CsvLayout { wide, tall };  // tall: time, tag, value ("long" in the plant file)

// How a row says when. Threads: a value, share freely.
struct TimeFormat {
    std::string column = "time";  // also the key of an NDJSON row
    std::string
        pattern;  // empty: RFC 3339; "epoch-s", "epoch-ms"; else a pattern of the date library, "%d.%m.%Y %H:%M:%S"
    std::string zone;  // zone of times written without one; the plant's where not given

    bool operator==(const TimeFormat&) const = default;
};

// Threads: a value, share freely.
struct Feed {
    std::string id;
    FeedKind kind = FeedKind::tcp;
    Endpoint listen;     // tcp
    std::string folder;  // drop
    FeedFormat format = FeedFormat::ndjson;
    CsvLayout layout = CsvLayout::wide;
    char delimiter = ',';
    char decimal = '.';
    bool header = true;
    std::vector<std::string> header_names;  // the columns in their order, where the rows come without a header
    TimeFormat time;
    std::string pump_column = "pump";
    std::string section_column = "section";
    std::string tag_column = "tag";
    std::string value_column = "value";
    std::map<std::string, Target> columns;  // a name not listed here is read as the name of a quantity
    std::map<std::string, Target> tags;
    std::string pump;      // every row is of this pump, so rows name none
    std::string section;   // with `pump`: and of this section
    bool reply = false;    // one JSON line after each durable commit
    std::string corrects;  // id of the feed whose disputed readings this one settles
    std::chrono::seconds idle_timeout{1800};
    std::chrono::seconds max_ahead{900};               // a reading further in front of the receiving clock is refused
    std::optional<std::chrono::seconds> silent_after;  // wall clock; not given: silence is not watched
    std::chrono::seconds stable_for{2};                // drop: a file is taken once it has not changed for so long

    bool operator==(const Feed&) const = default;
};

}  // namespace slipledger::config
