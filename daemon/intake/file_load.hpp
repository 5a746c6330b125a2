// A whole file to the ledger, in the calling thread: used by `slipledger load`, by the daemon on behalf of one, and by the
// drop folder. A file is known by its content: what was taken once is not read again.
#pragma once

#include <atomic>
#include <cstdint>
#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "config/feed.hpp"
#include "daemon/clock.hpp"
#include "daemon/intake/batch_builder.hpp"
#include "daemon/intake/mapping.hpp"
#include "daemon/ledger/records.hpp"
#include "daemon/ledger/writer.hpp"

namespace slipledger::intake {

// Looks for the receipt of a content; any thread may call it.
using FindReceipt = std::function<std::optional<ledger::Receipt>(std::string_view sha256)>;

struct LoadProgress {
    std::uint64_t bytes = 0;
    std::uint64_t of_bytes = 0;
    std::uint64_t rows = 0;
};

enum class LoadEnd {
    taken,
    already_taken,  // the receipt is the first one
    stopped,        // by `stop`: no receipt; loading it again completes it
    failed,         // could not be read or stored: no receipt
};

struct LoadOutcome {
    LoadEnd end = LoadEnd::failed;
    ledger::Receipt receipt;
    std::vector<LineFault> faults;  // the first ones
    std::uint64_t more_faults = 0;
    ledger::Instant newest = ledger::Instant::min();  // time of the newest row read
    std::string failure;
};

// Everything a load needs; all of it outlives the load.
struct LoadWorld {
    const Mapping& mapping;
    ledger::Writer& writer;
    const Clock& clock;
    FindReceipt find_receipt;
    const std::atomic<bool>* stop = nullptr;
    std::function<void(const LoadProgress&)> progress;  // called a few times a second at most
    bool again = false;                                 // read it even if its content was taken before
};

// `file` is an open regular file, read from its beginning to the size it has now; `name` is what the receipt calls it.
LoadOutcome load_file(int file, const std::string& name, const LoadWorld& world);

// The same for a path; a file that cannot be opened is `failed`.
LoadOutcome load_path(const std::string& path, const LoadWorld& world);

// How `load` reads a file: as the feed of that id does, or, where none is named, as plain CSV or NDJSON by the ending of the
// name (.ndjson, .jsonl, .json), under the feed id "command". Nothing where there is no such feed.
std::optional<config::Feed> feed_for_load(const std::vector<config::Feed>& feeds, const std::string& feed_id,
                                          const std::string& file, const std::string& time_zone);

// The receipt as the drop folder writes it and `load` answers it: one JSON object.
std::string receipt_json(const LoadOutcome& outcome, const std::string& feed);

}  // namespace slipledger::intake
