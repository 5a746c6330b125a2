#include "daemon/ledger/work_marks.hpp"

#include <algorithm>

#include "daemon/ledger/hour_cells.hpp"
#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

std::optional<std::int64_t> ms(const std::optional<Instant>& instant) {
    return instant ? std::optional(ms_of(*instant)) : std::nullopt;
}

std::optional<Instant> instant(const std::optional<std::int64_t>& value) {
    return value ? std::optional(instant_of(*value)) : std::nullopt;
}

}  // namespace

WorkMarks::WorkMarks(SQLite::Database& database, std::chrono::milliseconds summary, std::chrono::milliseconds lateness)
    : write_(database,
             "UPDATE pump_state SET newest = ?, oldest = ?, closed_until = ?, generation = ?, mark_from = ?, mark_to = ? "
             "WHERE pump = ?"),
      database_(database),
      summary_ms_(summary.count()),
      lateness_ms_(lateness.count()) {
    load();
}

void WorkMarks::load() {
    pumps_.clear();
    raised_ = false;
    last_generation_ = 0;
    SQLite::Statement rows(database_,
                           "SELECT pump, newest, oldest, closed_until, generation, mark_from, coalesce(mark_to, 0) "
                           "FROM pump_state");
    while (rows.executeStep()) {
        PumpId id{};
        std::optional<Instant> newest;
        std::optional<Instant> oldest;
        std::optional<Instant> closed;
        std::optional<Instant> from;
        PumpState state;
        ColumnReader(rows) >> id >> newest >> oldest >> closed >> state.generation >> from >> state.mark_to;
        state.newest = ms(newest);
        state.oldest = ms(oldest);
        state.closed_until = ms(closed);
        state.mark_from = ms(from);
        last_generation_ = std::max(last_generation_, state.generation);
        pumps_[id].state = state;
    }
}

std::optional<std::int64_t> WorkMarks::newest_of_plant() const {
    std::optional<std::int64_t> newest;
    for (const auto& [id, pump] : pumps_) newest = std::max(newest, pump.state.newest);
    return newest;
}

void WorkMarks::touch(PumpId id, Touched span, bool own) {
    Pump& pump = pumps_.at(id);
    if (own) {
        pump.state.newest = std::max(pump.state.newest.value_or(span.last), span.last);
        pump.state.oldest = std::min(pump.state.oldest.value_or(span.first), span.first);
        pump.changed = true;
    }
    const bool same_hour = !pump.touched.empty() && floor_to(pump.touched.back().first, summary_ms_) ==
                                                        floor_to(span.last, summary_ms_);
    if (same_hour && span.first >= pump.touched.back().first)
        pump.touched.back().last = std::max(pump.touched.back().last, span.last);
    else
        pump.touched.push_back(span);
}

void WorkMarks::raise(PumpId id, std::int64_t from, std::int64_t to) { raise(pumps_.at(id), from, to); }

void WorkMarks::raise_all(std::int64_t from, std::int64_t to) {
    for (auto& [id, pump] : pumps_)
        if (pump.state.newest) raise(pump, from, to);
}

void WorkMarks::raise(Pump& pump, std::int64_t from, std::int64_t to) {
    PumpState& state = pump.state;
    from = floor_to(from, summary_ms_);
    state.mark_to = state.mark_from ? std::max(state.mark_to, to) : to;
    state.mark_from = std::min(state.mark_from.value_or(from), from);
    state.generation = ++last_generation_;
    pump.changed = true;
    raised_ = true;
}

bool WorkMarks::settle(PumpId id, std::int64_t generation, const std::optional<Instant>& again) {
    PumpState& state = pumps_.at(id).state;
    if (state.generation != generation) return false;
    state.mark_from.reset();
    pumps_.at(id).changed = true;
    // A pass that was cut short replaced all that was stored after it: the next has to make everything up to now again.
    if (again) raise(id, ms_of(*again), std::max(state.newest.value_or(ms_of(*again)), ms_of(*again)));
    return true;
}

void WorkMarks::close_and_raise(Pump& pump) {
    if (pump.touched.empty()) return;
    PumpState& state = pump.state;
    const std::optional<std::int64_t> before = state.closed_until;
    if (state.newest) {
        const std::int64_t reached = floor_to(*state.newest - lateness_ms_, summary_ms_);
        if (reached > *state.oldest || before) state.closed_until = std::max(before.value_or(reached), reached);
    }
    const std::int64_t closed = state.closed_until.value_or(std::numeric_limits<std::int64_t>::min());
    for (const Touched& span : pump.touched)
        if (span.first < closed) raise(pump, span.first, std::min(span.last, closed - 1));
    if (state.closed_until != before) raise(pump, before.value_or(*state.oldest), closed);
    pump.touched.clear();
}

bool WorkMarks::save() {
    for (auto& [id, pump] : pumps_) {
        close_and_raise(pump);
        if (!pump.changed) continue;
        const PumpState& state = pump.state;
        Binder(write_) << instant(state.newest) << instant(state.oldest) << instant(state.closed_until)
                       << state.generation << instant(state.mark_from) << state.mark_to << id;
        run(write_);
        pump.changed = false;
    }
    return std::exchange(raised_, false);
}

}  // namespace slipledger::ledger
