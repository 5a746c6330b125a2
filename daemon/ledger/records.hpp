// What goes into the ledger and comes out of it, as plain values. Rooms above speak in these; SQL stays inside.
#pragma once

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "analytics/course.hpp"
#include "analytics/instant.hpp"
#include "analytics/quantity.hpp"
#include "analytics/usual.hpp"

namespace slipledger::ledger {

using analytics::Instant;

enum class PointId : std::int32_t {};  // a point of measurement
enum class FeedId : std::int32_t {};
enum class TrackId : std::int32_t {};  // one section judged on one basis
enum class PumpId : std::int32_t {};

// Readings of one point at one instant, canonical units, values already rounded to 7 significant digits.
struct Row {
    Instant time;
    PointId point{};
    FeedId feed{};
    std::uint32_t source = 0;   // which row of the feed's batch it came from (one may touch several points)
    std::uint16_t present = 0;  // bit index_of(quantity)
    std::array<double, analytics::quantity_count> value{};
};

struct RefusedRow {
    FeedId feed{};
    std::string place;    // "line 17", "mill-week-03.csv line 17"
    std::string code;     // stable: "bad-number", "unknown-pump", ...
    std::string message;  // what was found, what is wanted
    std::string text;     // the line, cut to 1 KiB
    Instant received;     // by the receiving clock
};

// A file (or a `load`) taken to its end. Kept by content, so that a file is taken once.
struct Receipt {
    FeedId feed{};
    std::string file;
    std::string sha256;
    std::uint64_t rows = 0;
    std::uint64_t stored = 0;    // in an IntakeBatch: of earlier batches; the committing batch's own are added by the ledger
    std::uint64_t repeated = 0;  // the same
    std::uint64_t refused = 0;
    Instant taken;
};

// What is committed together: one transaction, or a part of one.
struct IntakeBatch {
    std::vector<Row> rows;
    std::uint32_t sources = 0;  // number of feed rows in `rows` (sources are 0 .. sources-1)
    std::vector<RefusedRow> refused;
    std::optional<Receipt> receipt;
};

struct IntakeOutcome {
    std::vector<std::uint8_t> added;  // per source: 1 if it added any new value (stored), else 0 (repeated)
    std::uint64_t stored = 0;
    std::uint64_t repeated = 0;
    bool marked = false;              // the commit it was part of raised work marks
    bool failed = false;              // not committed (disk full ...): nothing of it is in the ledger
    std::string failure;
};

// One closed (or cut) summary with its judgement.
struct SummaryRecord {
    analytics::Summary summary;
    analytics::SummaryVerdict verdict;
    std::int32_t date = 0;  // of the plant's day in which it ends
};

struct DayRecord {
    analytics::DayVerdict verdict;
    bool finished = false;  // the day's last summary is closed
};

struct CheckpointRecord {
    std::int32_t date = 0;  // state at the end of this finished day
    std::vector<std::byte> state;
};

struct DayFactsRecord {
    std::string section;
    std::int32_t date = 0;
    analytics::DayFacts facts;
};

// What a life was told of its sisters when it began.
struct LifePriorRecord {
    TrackId track{};
    std::int32_t life = 1;
    std::int32_t date = 0;  // its first day
    Instant begins;
    std::string model;    // empty: none, so it has no sisters
    std::string sisters;  // JSON array: who, and their healthy leakage by the end of the day before
};

// Everything of one track from `from` on, replacing what was there.
struct TrackResult {
    TrackId track{};
    Instant from;                                        // summaries, alarm changes starting at or after are replaced
    std::int32_t from_date = 0;                          // day records and checkpoints at or after are replaced
    std::vector<SummaryRecord> summaries;
    std::vector<DayRecord> days;
    std::vector<CheckpointRecord> checkpoints;           // the ledger keeps the newest three and the first of each month
    std::vector<analytics::AlarmChange> alarm_changes;   // with at >= from
    std::vector<LifePriorRecord> life_priors;            // of lives that begin at or after from_date
};

// A pump to be judged anew from an instant on, because something it was told of another has changed.
struct ToldOtherwise {
    PumpId pump{};
    Instant from;
};

// Append-only; goes into the outbox for the alert log and each webhook in the transaction of its cause.
struct Notice {
    std::string id;        // hash of episode, edge, level and data time: the same whenever the same thing is told
    std::string pump;
    std::string section;
    std::string episode;
    std::string kind;      // "raised", "worsened", "eased", "returned", "corrected", "feed-silent", ...
    std::string level;
    Instant at;            // data time
    std::string body;      // one JSON object, without line breaks
};

struct Mark {
    PumpId pump{};
    Instant from;               // everything from here on is to be judged anew
    Instant to;                 // up to here readings changed
    std::int64_t generation = 0;
};

// One pump's judgement, committed in one transaction with its notices and the cleared mark.
struct AnalysisResult {
    PumpId pump{};
    std::int64_t generation = 0;
    std::vector<TrackResult> tracks;
    std::vector<DayFactsRecord> day_facts;
    std::vector<Notice> notices;
    std::vector<ToldOtherwise> told_otherwise;  // marks raised with it
    std::optional<Instant> mark_again_from;  // keep a mark from here (the pass was cut short), else the mark is cleared
};

// A dated fact or an operator's act.
struct Event {
    std::int64_t id = 0;        // given by the ledger
    std::string pump;
    std::string section;        // empty: the pump
    std::string kind;           // "replaced", "acknowledged", "shelved", "note", "plant-changed", "oil-changed", ...
    Instant at;                 // data time it holds from
    Instant entered;            // wall clock
    std::string by;             // who says so (`--by`)
    std::string user;           // who the operating system says it was
    std::string body;           // JSON object with the particulars
};

struct OutboxRow {
    std::int64_t id = 0;        // ascending in order of commit
    std::string target;         // "log" or the webhook's name
    Notice notice;
    std::int32_t attempts = 0;
    std::optional<Instant> next_try;  // wall clock
};

enum class DeliveryState : std::uint8_t { pending, delivered, failed };

struct DeliveryUpdate {
    std::int64_t id = 0;
    DeliveryState state = DeliveryState::pending;
    std::int32_t attempts = 0;
    std::optional<Instant> next_try;
    std::string last_error;
};

}  // namespace slipledger::ledger
