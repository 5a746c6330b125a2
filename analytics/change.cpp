#include "analytics/change.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

namespace slipledger::analytics {

namespace {

constexpr double looked_for = 3.0;     // standard deviations looked for
constexpr double most_surprise = 4.0;  // counted of one summary
constexpr double enough = 8.0;         // two net summaries at three standard deviations
constexpr double done_within_h = 8.0;  // running hours
const double least_step = std::log(1.3);
const double least_fall = std::log(1.3);
constexpr Milliseconds same_hour = std::chrono::hours(1);

double added(double evidence, double surprise) {
    return std::max(0.0, evidence + looked_for * surprise - looked_for * looked_for / 2.0);
}

}  // namespace

bool ChangeDetector::add(double surprise, Instant at, double running_h, LogEstimate wear_before) {
    if (!std::isfinite(surprise)) return false;
    const double counted = std::clamp(surprise, -most_surprise, most_surprise);
    if (up_ == 0.0 && down_ == 0.0) before_ = {.began = at, .running_h = running_h, .ln_wear = wear_before.ln};
    up_ = added(up_, counted);
    // Wear does not heal: down goes only what was worn and has been replaced, or a fault that has been mended.
    down_ = wear_before.ln > least_fall ? added(down_, -counted) : 0.0;
    if (up_ < enough && down_ < enough) return false;
    // What goes down is followed by the filter and is no step; what goes up further is one departure.
    if (down_ >= enough)
        following_ = false;
    else if (!std::exchange(following_, true))
        departure_ = before_;
    up_ = down_ = 0.0;
    return true;
}

void ChangeDetector::explain(Instant at) {
    explained_ = true;
    explained_at_ = at;
}

bool ChangeDetector::follow(LogEstimate wear, Instant at, double running_h, double lasting_h) {
    for (Step* step : {&step_, &waiting_})
        if (step->active && wear.ln - step->ln_before < least_step / 2.0) *step = Step{};
    look_for_step(wear, at, running_h);
    if (!waiting_.active || running_h - waiting_from_h_ < lasting_h) return false;
    step_ = std::exchange(waiting_, Step{});
    step_.ln_size = wear.ln - step_.ln_before;
    return true;
}

void ChangeDetector::look_for_step(LogEstimate wear, Instant at, double running_h) {
    if (!following_) return;
    const double size = wear.ln - departure_.ln_wear;
    const bool told = size >= least_step && size - 1.2816 * wear.sd >= least_step / 2.0;
    if (told || running_h - departure_.running_h > done_within_h) following_ = false;
    if (!told || waiting_.active) return;
    const bool attributed = explained_ && explained_at_ >= departure_.began - same_hour && explained_at_ <= at;
    // A second step on top of one in force is counted from where the first began.
    const double before = step_.active ? std::min(step_.ln_before, departure_.ln_wear) : departure_.ln_wear;
    waiting_ = {.active = true, .attributed = attributed, .began = departure_.began, .ln_before = before, .ln_size = size};
    waiting_from_h_ = departure_.running_h;
}

}  // namespace slipledger::analytics
