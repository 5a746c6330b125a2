// How far each pump's readings reach, which of its hours are closed, and what of it must be judged anew. A mark is raised
// by readings that change a closed hour, by an hour that closes and by dated facts; its generation, never given twice, tells an
// analyst who comes back with a result whether the pump moved on meanwhile.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <chrono>
#include <cstdint>
#include <map>
#include <optional>
#include <vector>

#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// Times as ms since 1970. Threads: a value, share freely.
struct PumpState {
    std::optional<std::int64_t> newest;
    std::optional<std::int64_t> oldest;
    std::optional<std::int64_t> closed_until;  // summaries that end here or before are closed
    std::int64_t generation = 0;
    std::optional<std::int64_t> mark_from;
    std::int64_t mark_to = 0;
};

// Span of readings that came in. Threads: a value, share freely.
struct Touched {
    std::int64_t first = 0;
    std::int64_t last = 0;
};

// Threads: one at a time. Changes live in memory until save(), which belongs to the caller's transaction.
class WorkMarks {
public:
    WorkMarks(SQLite::Database& database, std::chrono::milliseconds summary, std::chrono::milliseconds lateness);

    void load();  // also after a rollback: what was not saved is forgotten

    const PumpState& state(PumpId pump) const { return pumps_.at(pump).state; }
    std::optional<std::int64_t> newest_of_plant() const;

    // Cells changed in this span; `own`: readings of the pump itself, which can close its hours.
    void touch(PumpId pump, Touched span, bool own);
    void raise(PumpId pump, std::int64_t from, std::int64_t to);
    void raise_all(std::int64_t from, std::int64_t to);

    // Clears the mark, or keeps it from `again`; false: the generation is another.
    bool settle(PumpId pump, std::int64_t generation, const std::optional<Instant>& again);

    // Closes hours, raises what was touched, writes what changed. True: some mark was raised.
    bool save();

private:
    struct Pump {
        PumpState state;
        std::vector<Touched> touched;
        bool changed = false;
    };

    void close_and_raise(Pump& pump);
    void raise(Pump& pump, std::int64_t from, std::int64_t to);

    SQLite::Statement write_;
    SQLite::Database& database_;
    std::int64_t summary_ms_;
    std::int64_t lateness_ms_;
    std::int64_t last_generation_ = 0;
    std::map<PumpId, Pump> pumps_;
    bool raised_ = false;
};

}  // namespace slipledger::ledger
