#include "daemon/intake/mapping.hpp"

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "analytics/units.hpp"
#include "config/nearest.hpp"

namespace slipledger::intake {
namespace {

ValueRange widened(const analytics::QuantityFacts& facts, const config::Sensor& sensor) {
    const double low = sensor.range_low.value_or(facts.lowest);
    const double high = sensor.range_high.value_or(facts.highest);
    const double span = sensor.range_low && sensor.range_high ? high - low : std::fabs(sensor.range_high ? high : low);
    ValueRange range{facts.lowest, facts.highest};
    if (sensor.range_low) range.low = std::max(range.low, low - 0.05 * span);
    if (sensor.range_high) range.high = std::min(range.high, high + 0.05 * span);
    return range;
}

ValueRange range_at(const analytics::QuantityFacts& facts, const config::Section& section) {
    const auto sensor = section.sensors.find(facts.quantity);
    if (sensor == section.sensors.end()) return ValueRange{facts.lowest, facts.highest};
    return widened(facts, sensor->second);
}

// Of a section's instruments; of a pump without a section named: what any of its sections allows.
ValueRanges ranges_at(const config::Pump* pump, std::string_view section) {
    ValueRanges ranges;
    for (const auto& facts : analytics::quantity_table) {
        std::optional<ValueRange> widest;
        if (pump != nullptr) {
            for (const config::Section& one : pump->sections) {
                if (!section.empty() && one.id != section) continue;
                const ValueRange range = range_at(facts, one);
                if (!widest) widest = range;
                widest = ValueRange{std::min(widest->low, range.low), std::max(widest->high, range.high)};
            }
        }
        ranges[analytics::index_of(facts.quantity)] = widest.value_or(ValueRange{facts.lowest, facts.highest});
    }
    return ranges;
}

template <class Names>
std::string did_you_mean(std::string_view written, const Names& names) {
    std::vector<std::string_view> known;
    for (const auto& [name, value] : names) known.emplace_back(name);
    std::sort(known.begin(), known.end());
    const std::string_view nearest = config::nearest_name(written.substr(0, 80), known);
    return nearest.empty() ? std::string() : std::string(nearest);
}

std::string perhaps(const std::string& nearest, std::string otherwise) {
    return nearest.empty() ? std::move(otherwise) : "perhaps \"" + nearest + "\"";
}

}  // namespace

bool is_of_pump(analytics::Quantity quantity) {
    using analytics::Quantity;
    switch (quantity) {
        case Quantity::shaft_speed:
        case Quantity::shaft_power:
        case Quantity::running:
        case Quantity::hour_meter:
        case Quantity::fluid_temperature:
        case Quantity::inlet_pressure:
        case Quantity::particle_count: return true;
        default: return false;
    }
}

Mapping::Mapping(const config::Feed& feed, const ledger::Directory& directory, std::span<const config::Pump> pumps)
    : feed_(feed) {
    const auto id = directory.feeds.find(feed.id);
    if (id == directory.feeds.end()) throw std::runtime_error("feed " + feed.id + " is not known to the ledger");
    feed_id_ = id->second;
    add_pumps(directory, pumps);
    add_quantities();
    for (const auto& [name, target] : feed.columns) columns_.emplace(name, measure(name, target, directory));
    for (const auto& [name, target] : feed.tags) tags_.emplace(name, measure(name, target, directory));
    if (feed.pump.empty()) return;
    fixed_pump_ = pump(feed.pump);
    if (fixed_pump_ == nullptr || !place(*fixed_pump_, feed.pump, feed.section))
        throw std::runtime_error("feed " + feed.id + ": no such pump or section: " + feed.pump + " " + feed.section);
}

const Place* Mapping::place_of(ledger::PointId point, const ValueRanges& ranges) {
    const auto [entry, is_new] = places_.try_emplace(point);
    if (is_new) entry->second = std::make_unique<Place>(Place{point, ranges});
    return entry->second.get();
}

void Mapping::add_pumps(const ledger::Directory& directory, std::span<const config::Pump> pumps) {
    for (const auto& [names, point] : directory.points) {
        const auto& [pump_name, section] = names;
        const auto pump = std::find_if(pumps.begin(), pumps.end(), [&wanted = names.first](const auto& one) { return one.id == wanted; });
        const Place* place = place_of(point, ranges_at(pump == pumps.end() ? nullptr : &*pump, section));
        PumpPlaces& places = pumps_[pump_name];
        if (section.empty()) places.pump = place;
        else places.sections.emplace(section, place);
    }
}

void Mapping::add_quantities() {
    for (const auto& facts : analytics::quantity_table) {
        Measure measure;
        measure.name = facts.name;
        measure.quantity = facts.quantity;
        measure.unit = facts.unit;
        quantities_.emplace(measure.name, std::move(measure));
    }
}

Measure Mapping::measure(const std::string& name, const config::Target& target, const ledger::Directory& directory) {
    const auto unit = analytics::unit_named(target.quantity, target.unit);
    if (!unit)
        throw std::runtime_error("feed " + feed_.id + ", " + name + ": " + target.unit + " is no unit of " +
                                 std::string(analytics::name_of(target.quantity)));
    Measure measure;
    measure.name = name;
    measure.quantity = target.quantity;
    measure.factor = target.scale * unit->factor;
    measure.offset = (target.offset + unit->offset) * unit->factor;
    measure.unit = unit->name;
    measure.place = fixed_place(target, directory);
    if (measure.place == nullptr) measure.section = target.section;
    return measure;
}

const Place* Mapping::fixed_place(const config::Target& target, const ledger::Directory& directory) {
    const auto point_of = [&](const auto& ids, const std::string& name) {
        const auto found = ids.find(name);
        if (found == ids.end()) throw std::runtime_error("feed " + feed_.id + ": no such point: " + name);
        return place_of(found->second, ranges_at(nullptr, {}));
    };
    if (!target.reservoir.empty()) return point_of(directory.reservoirs, target.reservoir);
    if (!target.drain_group.empty()) return point_of(directory.drain_groups, target.drain_group);
    if (target.pump.empty()) return nullptr;
    const PumpPlaces* places = pump(target.pump);
    if (places == nullptr) throw std::runtime_error("feed " + feed_.id + ": no such pump: " + target.pump);
    const auto found = place(*places, target.pump, target.section);
    if (!found) throw std::runtime_error("feed " + feed_.id + ": " + found.error().message());
    return is_of_pump(target.quantity) ? places->pump : *found;
}

const Measure* Mapping::column(std::string_view name) const {
    if (const auto listed = columns_.find(name); listed != columns_.end()) return &listed->second;
    return tag(name);
}

const Measure* Mapping::tag(std::string_view name) const {
    if (const auto listed = tags_.find(name); listed != tags_.end()) return &listed->second;
    const auto quantity = quantities_.find(name);
    return quantity == quantities_.end() ? nullptr : &quantity->second;
}

const PumpPlaces* Mapping::pump(std::string_view name) const {
    const auto found = pumps_.find(name);
    return found == pumps_.end() ? nullptr : &found->second;
}

Checked<const Place*> Mapping::place(const PumpPlaces& pump, std::string_view name, std::string_view section) const {
    if (section.empty()) return pump.pump;
    if (const auto found = pump.sections.find(section); found != pump.sections.end()) return found->second;
    std::string known;
    for (const auto& [id, place] : pump.sections) known += (known.empty() ? "" : ", ") + id;
    return Refusal(Reason::unknown_section, feed_.section_column, in_quotes(section) + " is no section of " + in_quotes(name), known);
}

Refusal Mapping::unknown_pump(std::string_view name) const {
    return Refusal(Reason::unknown_pump, feed_.pump_column, in_quotes(name) + " is not in the plant file",
                   perhaps(did_you_mean(name, pumps_), "a pump of the plant file"));
}

Refusal Mapping::unknown_tag(std::string_view name) const {
    return Refusal(Reason::unknown_tag, feed_.tag_column, in_quotes(name) + " is not listed in the feed",
                   perhaps(did_you_mean(name, tags_), "a tag of the feed's entry"));
}

Refusal Mapping::unknown_column(std::string_view name) const {
    std::string nearest = did_you_mean(name, columns_);
    if (nearest.empty()) nearest = did_you_mean(name, tags_);
    if (nearest.empty()) nearest = did_you_mean(name, quantities_);
    return Refusal(Reason::unknown_column, in_quotes(name), "is neither listed in the feed nor a quantity; it is not read",
                   perhaps(nearest, "an entry in the feed's columns"));
}

}  // namespace slipledger::intake
