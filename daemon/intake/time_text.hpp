// Times as loggers write them, to UTC milliseconds: RFC 3339 by hand, because every row has one; seconds or milliseconds
// since 1970; or a pattern of the date library. A time without an offset is local in the feed's zone.
#pragma once

#include <optional>
#include <string>
#include <string_view>

#include <date/tz.h>

#include "analytics/instant.hpp"
#include "config/feed.hpp"
#include "daemon/intake/refusal.hpp"

namespace slipledger::intake {

// A time as it stands there, before a zone is applied.
struct WrittenTime {
    date::local_time<analytics::Milliseconds> local;
    std::optional<std::chrono::minutes> offset;  // east of UTC; "Z" is 0
};

// RFC 3339, the offset left out or not, 'T' or a space between, fractions cut to milliseconds; second 60 is the next
// minute's first. Remembers the last date, which the next row has too.
// Threads: one at a time.
class Rfc3339 {
public:
    std::optional<WrittenTime> read(std::string_view text);

private:
    std::optional<date::local_days> day(std::string_view text);

    char last_text_[10] = {};
    std::optional<date::local_days> last_day_;
};

// Local time of one zone to UTC. Remembers the last offset and how long it holds.
// Threads: one at a time.
class ZoneClock {
public:
    explicit ZoneClock(const date::time_zone* zone) : zone_(zone) {}

    Checked<analytics::Instant> to_utc(date::local_time<analytics::Milliseconds> local);

private:
    const date::time_zone* zone_;
    date::local_seconds safe_from_{};  // [safe_from_, safe_to_): no clock change within a day
    date::local_seconds safe_to_{};
    std::chrono::seconds offset_{0};
};

// Threads: one at a time.
class TimeReader {
public:
    // The format's zone has to be in the tz database (std::runtime_error).
    explicit TimeReader(const config::TimeFormat& format);

    Checked<analytics::Instant> read(std::string_view text);

private:
    Checked<analytics::Instant> read_rfc3339(std::string_view text);
    Checked<analytics::Instant> read_epoch(std::string_view text, double per_second);
    Checked<analytics::Instant> read_pattern(std::string_view text);
    Checked<analytics::Instant> in_utc(const WrittenTime& written, std::string_view text);

    config::TimeFormat format_;
    Rfc3339 rfc3339_;
    std::optional<ZoneClock> zone_;
};

}  // namespace slipledger::intake
