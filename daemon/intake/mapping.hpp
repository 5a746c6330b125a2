// What the names of a feed mean: columns, keys and tags to quantities, pumps and sections to points of measurement, and what a
// value at a point can be. Worked out once from the plant file and the ledger's ids, so that a row costs a look-up.
#pragma once

#include <array>
#include <map>
#include <memory>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <unordered_map>
#include <vector>

#include "analytics/quantity.hpp"
#include "config/feed.hpp"
#include "config/pump.hpp"
#include "daemon/intake/refusal.hpp"
#include "daemon/ledger/directory.hpp"

namespace slipledger::intake {

// What a value can be: the quantity's own limits, narrowed to the instrument's range with 5 % of it to either side (a
// 4-20 mA transmitter shows a fault further out; NAMUR NE 43, from memory).
struct ValueRange {
    double low = 0.0;
    double high = 0.0;
};

using ValueRanges = std::array<ValueRange, analytics::quantity_count>;

struct Place {
    ledger::PointId point{};
    ValueRanges ranges{};
};

struct PumpPlaces {
    const Place* pump = nullptr;
    std::map<std::string, const Place*, std::less<>> sections;
};

// Quantities of the shaft and the oil: a row that names a section still means its pump by them.
bool is_of_pump(analytics::Quantity quantity);

// A column, key or tag that is a reading.
struct Measure {
    std::string name;  // as the feed writes it
    analytics::Quantity quantity{};
    double factor = 1.0;  // canonical = written * factor + offset
    double offset = 0.0;
    std::string unit;              // as the feed writes it
    const Place* place = nullptr;  // null: at the row's pump
    std::string section;           // then: at this section of it; empty: at the row's

    bool converts() const { return factor != 1.0 || offset != 0.0; }
};

// Threads: immutable once made, share freely.
class Mapping {
public:
    // std::runtime_error where the feed names a pump, section, unit ... that does not exist.
    Mapping(const config::Feed& feed, const ledger::Directory& directory, std::span<const config::Pump> pumps);

    const config::Feed& feed() const { return feed_; }
    ledger::FeedId feed_id() const { return feed_id_; }

    const Measure* column(std::string_view name) const;  // also a tag that has a column of its own; null: unknown
    const Measure* tag(std::string_view name) const;     // null: unknown
    const PumpPlaces* pump(std::string_view name) const;
    // The row's place where the row, or the feed for it, names a pump and perhaps a section.
    Checked<const Place*> place(const PumpPlaces& pump, std::string_view name, std::string_view section) const;
    const PumpPlaces* fixed_pump() const { return fixed_pump_; }  // null: rows name theirs

    Refusal unknown_pump(std::string_view name) const;
    Refusal unknown_tag(std::string_view name) const;
    Refusal unknown_column(std::string_view name) const;

private:
    struct Hash {
        using is_transparent = void;
        std::size_t operator()(std::string_view text) const { return std::hash<std::string_view>{}(text); }
    };
    template <class T>
    using ByName = std::unordered_map<std::string, T, Hash, std::equal_to<>>;

    const Place* place_of(ledger::PointId point, const ValueRanges& ranges);
    void add_pumps(const ledger::Directory& directory, std::span<const config::Pump> pumps);
    void add_quantities();
    Measure measure(const std::string& name, const config::Target& target, const ledger::Directory& directory);
    const Place* fixed_place(const config::Target& target, const ledger::Directory& directory);

    config::Feed feed_;
    ledger::FeedId feed_id_{};
    std::map<ledger::PointId, std::unique_ptr<Place>> places_;
    ByName<PumpPlaces> pumps_;
    ByName<Measure> columns_;
    ByName<Measure> tags_;
    ByName<Measure> quantities_;
    const PumpPlaces* fixed_pump_ = nullptr;
};

}  // namespace slipledger::intake
