// Readings of an invented section, written down the way a logger tells them: rows at a steady interval, some of whose
// values stay for a while.
#pragma once

#include <initializer_list>
#include <utility>

#include "analytics/readings.hpp"

namespace slipledger::analytics {

inline constexpr Instant midnight{std::chrono::sys_days{std::chrono::year{2026} / 3 / 1}};

using Values = std::initializer_list<std::pair<Quantity, double>>;

// Threads: one at a time.
class ReadingsBuilder {
public:
    explicit ReadingsBuilder(Milliseconds interval, Instant start = midnight) : now_(start), interval_(interval) {}

    // Rows with these values.
    ReadingsBuilder& rows(int count, Values values) {
        for (int i = 0; i < count; ++i, now_ += interval_)
            for (const auto& [quantity, value] : values) put(quantity, value);
        return *this;
    }
    ReadingsBuilder& pause(Milliseconds pause) {
        now_ += pause;
        return *this;
    }
    ReadingsBuilder& sample_every(Milliseconds interval) {
        interval_ = interval;
        return *this;
    }
    void put(Quantity quantity, double value) {
        Series& series = readings_[index_of(quantity)];
        series.times.push_back(now_);
        series.values.push_back(value);
    }

    Instant now() const { return now_; }
    const SectionReadings& readings() const { return readings_; }

private:
    SectionReadings readings_;
    Instant now_;
    Milliseconds interval_;
};

}  // namespace slipledger::analytics
