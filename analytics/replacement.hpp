// A replacement that nobody told: leakage that was well above new falls back to about new within hours, and nothing
// else that changed then explains it. It is offered to people, never assumed: a thicker oil or another meter does the
// same.
#pragma once

#include <cstdint>

#include "analytics/course.hpp"
#include "analytics/instant.hpp"
#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

// Threads: one at a time.
class ReplacementWatch {
public:
    // Facts changed: a fall that begins within an hour of it is theirs. Not computed: bookkeeping.
    void explain(Instant at);

    // Before each feed: remembers where a run of summaries 2 standard deviations below what is expected begins, and
    // what the ratio was then. A low summary from which nothing came begins none. NaN changes nothing. Not computed:
    // bookkeeping.
    void note(double surprise, Instant at, double running_h, LogEstimate wear_before);

    // After each feed. Within 8 running hours from where such a run began, ln ratio x looks like a replacement when
    //
    //   x_before >= ln 1.3,   x_before - x >= ln 1.25,   -0.35 <= x <= max(ln 1.1, x_before / 4),   sd <= 0.1
    //
    // that is: worn before, about as new after (another part of the model, so give or take what parts differ by). It is
    // over when x has risen back more than half way. True when it has just been found.
    // Example: 1.9 +- 0.03, then 1.05 +- 0.04 three hours later -> found; 1.9, then 1.4 -> not; 1.2, then 1.0 -> not.
    // Source: definition; the limits follow the step's (method.md, 5).
    bool follow(LogEstimate wear, double running_h);

    // What was found and still holds. Not computed: reads the state.
    LikelyReplacement likely() const;

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.low_, self.began_, self.began_running_h_, self.ln_before_, self.explained_, self.explained_at_,
           self.found_, self.found_at_, self.found_ln_before_, self.found_ln_after_);
    }

private:
    bool looks_like_one(LogEstimate wear) const;

    bool low_ = false;  // a run of low summaries is being followed
    Instant began_;
    double began_running_h_ = 0.0;
    double ln_before_ = 0.0;
    bool explained_ = false;
    Instant explained_at_;
    bool found_ = false;
    Instant found_at_;
    double found_ln_before_ = 0.0;
    double found_ln_after_ = 0.0;
};

}  // namespace slipledger::analytics
