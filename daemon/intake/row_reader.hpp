// From bytes of one feed to batches: the whole way of a line through intake, with nothing of sockets or files in it. A
// session and a file both are: read, and take a batch whenever it is full or no more bytes are there.
#pragma once

#include <memory>
#include <optional>
#include <set>
#include <string>
#include <string_view>
#include <vector>

#include "daemon/intake/batch_builder.hpp"
#include "daemon/intake/csv_line.hpp"
#include "daemon/intake/line_splitter.hpp"
#include "daemon/intake/mapping.hpp"
#include "daemon/intake/ndjson_line.hpp"
#include "daemon/intake/number_text.hpp"
#include "daemon/intake/time_text.hpp"

namespace slipledger::intake {

struct ReadOptions {
    std::string place = {};         // before "line 17" in what is refused: "mill-week-03.csv "
    std::size_t most_rows = 4096;   // of a batch
    bool unfinished_counts = true;  // a last line without line end is a line (files); else it is refused (connections)
};

// Threads: one at a time. The mapping has to outlive it.
class RowReader {
public:
    RowReader(const Mapping& mapping, ReadOptions options);

    // Reads lines off the front of `bytes` until they are used up, the batch is full or the header is bad.
    void read(std::string_view& bytes, ledger::Instant now);
    // The stream has ended.
    void finish(ledger::Instant now);

    bool full() const { return batch_.full(); }
    // The header was refused: nothing below it can be read.
    bool hopeless() const { return hopeless_; }
    ReadBatch take() { return batch_.take(); }

private:
    struct Columns {
        std::optional<std::size_t> time, pump, section, tag, value;
        std::vector<std::pair<std::size_t, const Measure*>> measures;
        std::size_t count = 0;
    };
    struct Names {  // what a row says of where it was measured
        std::string_view pump;
        std::string_view section;
    };

    void read_line(const Line& line, ledger::Instant now);
    void read_csv(std::string_view line);
    void read_header(std::span<const std::string_view> names);
    void read_header_name(std::string_view name, std::size_t position);
    void give_up(Refusal refusal);
    std::optional<Refusal> fault_of_columns() const;
    void read_wide(std::span<const std::string_view> fields);
    void read_tall(std::span<const std::string_view> fields);
    void read_json(std::string_view line);
    void read_json_wide(std::span<const JsonField> fields);
    void read_json_tagged(const JsonField& tag, const JsonField* value);

    // Checks time and names and opens a row; false: the row is refused.
    bool open(std::string_view time, const Names& names);
    bool resolve(const Names& names);
    void add_text(const Measure& measure, std::string_view text);
    void add_json(const Measure& measure, const JsonField& field);
    void add(const Measure& measure, const WrittenNumber& number, std::string_view text);

    const Mapping& mapping_;
    const config::Feed& feed_;
    ReadOptions options_;
    LineSplitter lines_;
    TimeReader times_;
    CsvLine csv_;
    NdjsonLine ndjson_;
    BatchBuilder batch_;
    std::optional<Columns> columns_;  // of CSV, once known
    std::string header_text_;
    std::set<std::string, std::less<>> told_;  // unknown keys of NDJSON rows, each told once
    bool hopeless_ = false;
    ledger::Instant now_{};

    // Of the row being read.
    const PumpPlaces* pump_ = nullptr;
    const Place* place_ = nullptr;  // null: the row names no pump
    std::string pump_name_;         // the pump looked up last: most rows are of the pump of the row before
    std::string section_name_;
    bool row_lost_ = false;         // refused as a whole while its cells were read
};

}  // namespace slipledger::intake
