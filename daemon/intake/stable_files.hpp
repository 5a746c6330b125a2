// Which files of a drop folder are finished: those that have not changed for a while. A network share tells nobody when a
// file is closed, so only looking again helps.
#pragma once

#include <chrono>
#include <cstdint>
#include <map>
#include <string>
#include <string_view>
#include <vector>

#include "analytics/instant.hpp"

namespace slipledger::intake {

struct SeenFile {
    std::uint64_t size = 0;
    std::int64_t changed_ns = 0;  // modification time
    std::uint64_t inode = 0;

    bool operator==(const SeenFile&) const = default;
};

using FolderListing = std::map<std::string, SeenFile>;  // by name

// Not ".hidden", "x.part", "x.tmp" or a receipt.
bool is_candidate(std::string_view name);

// Threads: one at a time.
class StableFiles {
public:
    explicit StableFiles(std::chrono::milliseconds stable_for) : stable_for_(stable_for) {}

    // Names, in order, of what is in `listing` as it was at least `stable_for` before `now`.
    std::vector<std::string> finished(const FolderListing& listing, analytics::Instant now);
    // Some file was seen that is not finished yet.
    bool waiting() const { return waiting_; }

private:
    struct Watched {
        SeenFile file;
        analytics::Instant since;
    };

    std::chrono::milliseconds stable_for_;
    std::map<std::string, Watched> watched_;
    bool waiting_ = false;
};

}  // namespace slipledger::intake
