// What one life is told of its sisters before it begins: the healthy leakage of other lives of its model, and of those that
// are over how long they lasted and by which law they wore, each as its track stood at the end of the day before. What was told is kept with the life, so that a checkpoint can be taken up
// with it, and so that whoever judges a sister anew can see whom it told otherwise.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "analytics/life_prior.hpp"
#include "analytics/sisters.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::watch {

// Days of a track that are judged and not yet stored: they count instead of what is stored from `from_date` on.
// Threads: a value, share freely while the days live.
struct FreshDays {
    ledger::TrackId track{};
    std::int32_t from_date = 0;
    std::span<const ledger::DayRecord> days;
};

// Whom the life of a track is to be told of. Threads: a value, share freely.
struct AskingLife {
    const ledger::TrackEntry& track;
    std::int32_t life = 1;
    std::string model;
    std::int32_t date = 0;  // its first day
};

class Sisters;

// What a track's run needs to ask. Threads: a value, within one pass.
struct SistersAsked {
    const Sisters& sisters;
    std::span<const FreshDays> fresh;  // of the pass's tracks already judged
};

// Threads: one pass, then gone; the analysis thread, as the reader it asks.
class Sisters {
public:
    Sisters(const ledger::Reader& reader, const config::Plant& plant, const ledger::Directory& directory)
        : reader_(reader), plant_(plant), directory_(directory) {}

    // Canonical text of what they say; "[]" where none says anything, or the life has no model.
    std::string told_to(const AskingLife& life, std::span<const FreshDays> fresh) const;

    // The lives told otherwise once `fresh` is stored than they were: those of `priors`, and those stored that began
    // after days of `fresh`.
    std::vector<ledger::LifePriorRecord> told_otherwise(std::span<const ledger::LifePriorRecord> priors,
                                                        std::span<const FreshDays> fresh) const;

private:
    struct Life {
        std::string pump;
        std::string section;
        std::int32_t number = 1;
        std::string model;
        double displacement_cm3 = 0.0;
    };

    const std::vector<Life>& lives() const;
    void add_lives(const config::Pump& pump, const config::Section& section,
                   const std::vector<ledger::Event>& events) const;
    const ledger::TrackEntry& track(ledger::TrackId id) const;
    std::vector<std::string> models_of(std::span<const FreshDays> fresh) const;
    std::optional<ledger::DayRecord> day_before(ledger::TrackId track, std::int32_t life, std::int32_t date,
                                                std::span<const FreshDays> fresh) const;

    const ledger::Reader& reader_;
    const config::Plant& plant_;
    const ledger::Directory& directory_;
    mutable std::vector<Life> lives_;  // of the whole plant; read when first asked for
};

// What the text says of lives that were over by then. Threads: any.
std::vector<analytics::PastLife> past_lives_in(const std::string& told);

// What the text says of healthy leakage.
std::vector<analytics::Sister> sisters_in(const std::string& told);

}  // namespace slipledger::watch
