// Gathers what the rows of a feed say into one batch for the ledger, and keeps account of lines, so that a reply or a
// receipt can say what became of each.
#pragma once

#include <cstdint>
#include <string>
#include <vector>

#include "daemon/intake/mapping.hpp"
#include "daemon/intake/refusal.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::intake {

struct LineFault {
    std::uint64_t line = 0;
    std::string reason;
};

// What a batch's lines came to, before the ledger says which rows it knew already.
struct LineAccount {
    std::uint64_t through = 0;  // the last line read, counted from 1 over the whole connection or file
    std::uint64_t refused = 0;  // rows, not cells
    std::vector<LineFault> faults;
    std::uint64_t more_faults = 0;  // beyond those listed
    ledger::Instant newest = ledger::Instant::min();  // time of the newest row
};

struct ReadBatch {
    ledger::IntakeBatch batch;
    LineAccount account;

    bool empty() const { return batch.sources == 0 && batch.refused.empty() && account.refused == 0; }
};

// Threads: one at a time.
class BatchBuilder {
public:
    static constexpr std::size_t most_faults = 20;             // listed in a reply
    static constexpr std::size_t most_refused_cells = 16;      // kept of one row
    static constexpr std::size_t most_refused_of_batch = 1024;

    // `place` goes before "line 17": "mill-week-03.csv "; empty for a connection.
    BatchBuilder(ledger::FeedId feed, std::string place, std::size_t most_rows);

    // A line begins; `text` has to outlive it.
    void line(std::uint64_t number, std::string_view text, ledger::Instant now);

    void open_row(ledger::Instant time);
    void add(ledger::PointId point, analytics::Quantity quantity, double value);
    void refuse_cell(const Refusal& refusal);
    void close_row();  // refuses the row if nothing was added

    void refuse_row(const Refusal& refusal);  // with what was added of it
    // The line was cut off by the end of the connection and will come again: refused, and not counted in `through`.
    void refuse_unfinished(const Refusal& refusal);
    // About the line, but no row of it: a column in the header that is not read.
    void remark(const Refusal& refusal);

    bool full() const;
    ReadBatch take();

private:
    void keep(const Refusal& refusal, bool with_text);

    ledger::FeedId feed_;
    std::string place_;
    std::size_t most_rows_;
    ReadBatch batch_;
    std::uint64_t line_ = 0;
    std::string_view text_;
    ledger::Instant now_{};
    ledger::Instant time_{};
    std::size_t first_of_row_ = 0;
    std::size_t refused_cells_ = 0;
};

}  // namespace slipledger::intake
