// Which basis speaks for a section: the one of the higher level where drain and delivery are both fitted, the drain where
// they agree, since it sees wear first on pumps with an outside drain.
#pragma once

#include <optional>
#include <string_view>

#include "daemon/ledger/reader.hpp"

namespace slipledger::report {

// Threads: a value, share freely.
struct SpeakingTrack {
    ledger::TrackEntry track;
    std::optional<ledger::DayRecord> newest_day;  // none before anything was judged
};

SpeakingTrack speaking_track(const ledger::Reader& reader, const ledger::Directory& directory, std::string_view pump,
                             std::string_view section);

}  // namespace slipledger::report
