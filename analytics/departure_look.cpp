#include "analytics/departure_look.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

namespace {
constexpr Pace by_days{.learn = 50.0, .memory = 72.0};  // running hours
constexpr Pace first_day{.learn = 24.0, .memory = 24.0};
constexpr int most_on_a_side = 8;
}  // namespace

DepartureLook::DepartureLook()
    : usual_seen_(by_days), usual_expected_(by_days), after_seen_(first_day), after_expected_(first_day) {}

void DepartureLook::add(Instant start, const OwnReading& own, double hours) {
    if (!(own.leakage_lpm > 0.0) || !(own.healthy_lpm > 0.0)) return;
    const double seen = std::log(own.leakage_lpm);
    const double expected = std::log(own.healthy_lpm);
    starts_[next_] = start;
    seen_[next_] = seen;
    expected_[next_] = expected;
    next_ = static_cast<std::uint32_t>((next_ + 1) % kept);
    count_ = std::min<std::uint32_t>(count_ + 1, kept);
    usual_seen_.add(seen, hours);
    usual_expected_.add(expected, hours);
    after_seen_.add(seen, hours);
    after_expected_.add(expected, hours);
}

bool DepartureLook::begin(Instant began) {
    if (began == began_) return false;
    began_ = began;
    std::array<Side, 2> seen;
    std::array<Side, 2> expected;
    for (std::uint32_t back = 1; back <= count_; ++back) {
        const std::size_t at = (next_ + kept - back) % kept;
        const std::size_t side = starts_[at] >= began ? 1 : 0;
        if (seen[side].count == most_on_a_side) continue;
        seen[side].add(seen_[at]);
        expected[side].add(expected_[at]);
    }
    first_ = {.seen = seen[1].mean() - seen[0].mean(), .expected = expected[1].mean() - expected[0].mean()};
    before_seen_ = usual_seen_.recent();
    before_expected_ = usual_expected_.recent();
    after_seen_.forget();
    after_expected_.forget();
    return true;
}

DepartureChanges DepartureLook::changes() const {
    DepartureChanges changes = first_;
    if (after_seen_.known())
        changes = {.seen = after_seen_.learned() - before_seen_,
                   .expected = after_expected_.learned() - before_expected_};
    changes.expected_scatter = usual_expected_.learned_sd();
    return changes;
}

}  // namespace slipledger::analytics
