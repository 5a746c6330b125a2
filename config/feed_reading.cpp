#include "config/feed_reading.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "analytics/units.hpp"
#include "config/nearest.hpp"

namespace slipledger::config {
namespace {

// A section of the pump that is named here or, failing that, by the feed. Where only the rows name their pump, some
// pump must have such a section; where the pump is unknown, that has been told already.
void read_section_of(const ObjectReader& reader, const FeedSurroundings& surroundings, const std::string& pump_id,
                     std::string& section) {
    Names sections;
    for (const Pump& pump : surroundings.plant.pumps) {
        if (!pump_id.empty() && pump.id != pump_id) continue;
        for (const Section& known : pump.sections) sections.insert(known.id);
    }
    if (sections.empty()) return;
    read_reference(reader, "section", pump_id.empty() ? "section" : "section of pump " + pump_id, section, sections);
}

void read_quantity(const ObjectReader& reader, analytics::Quantity& quantity) {
    reader.require("quantity");
    std::string name;
    reader.read("quantity", name);
    if (name.empty()) return;
    if (const auto known = analytics::quantity_named(name)) {
        quantity = *known;
        return;
    }
    std::vector<std::string_view> names;
    for (const auto& facts : analytics::quantity_table) names.push_back(facts.name);
    const std::string_view nearest = nearest_name(name, names);
    reader.complain("quantity",
                    nearest.empty() ? fmt::format("one of {}", fmt::join(names, ", "))
                                    : fmt::format("a quantity; perhaps \"{}\"", nearest),
                    "unknown-quantity");
}

void read_unit(const ObjectReader& reader, analytics::Quantity quantity, std::string& unit) {
    reader.read("unit", unit);
    if (analytics::unit_named(quantity, unit)) return;
    std::vector<std::string_view> names;
    for (const analytics::Unit& known : analytics::units_of(quantity)) names.push_back(known.name);
    reader.complain("unit", fmt::format("a unit of {}: {}", analytics::name_of(quantity), fmt::join(names, ", ")),
                    "unknown-unit");
}

Target read_target(const ObjectReader& reader, const FeedSurroundings& surroundings, const Feed& feed) {
    Target target;
    read_reference(reader, "pump", "pump", target.pump, surroundings.pumps);
    read_section_of(reader, surroundings, target.pump.empty() ? feed.pump : target.pump, target.section);
    read_reference(reader, "reservoir", "reservoir", target.reservoir, surroundings.reservoirs);
    read_reference(reader, "drain_group", "drain group", target.drain_group, surroundings.drain_groups);
    read_quantity(reader, target.quantity);
    read_unit(reader, target.quantity, target.unit);
    reader.read("scale", target.scale);
    reader.read("offset", target.offset);
    const int places =
        (reader.has("pump") ? 1 : 0) + (reader.has("reservoir") ? 1 : 0) + (reader.has("drain_group") ? 1 : 0);
    if (places > 1) reader.complain("only one of \"pump\", \"reservoir\" and \"drain_group\"", "implausible");
    if (target.scale == 0.0) reader.complain("scale", "a factor other than 0", "out-of-range");
    return target;
}

// One character, or "tab".
void read_character(const ObjectReader& reader, std::string_view key, std::string_view allowed, char& character) {
    std::string written;
    reader.read(key, written);
    if (written.empty()) return;
    if (written == "tab") written = "\t";
    if (written.size() == 1 && allowed.find(written[0]) != std::string_view::npos) {
        character = written[0];
    } else {
        reader.complain(key, wanted_for(*find_key("feed", key)), "not-a-choice");
    }
}

void read_csv(const ObjectReader& reader, Feed& feed) {
    if (feed.format == FeedFormat::ndjson) {
        for (const std::string_view key : {"layout", "delimiter", "decimal", "header", "header_names"})
            if (reader.has(key)) reader.complain(key, "nothing, or \"format\": \"csv\"", "misplaced");
        return;
    }
    reader.read("layout", feed.layout);
    read_character(reader, "delimiter", ",;|\t ", feed.delimiter);
    read_character(reader, "decimal", ".,", feed.decimal);
    reader.read("header", feed.header);
    reader.read("header_names", feed.header_names);
    if (feed.delimiter == feed.decimal)
        reader.complain(reader.has("delimiter") ? "delimiter" : "decimal",
                        "a delimiter that is not also the decimal sign", "implausible");
    if (!feed.header && feed.header_names.empty())
        reader.complain("header_names", "the columns in their order, since the rows come without a header", "missing");
}

void read_time_format(const ObjectReader& reader, TimeFormat& time) {
    reader.read("column", time.column);
    reader.read("pattern", time.pattern);
    reader.read("zone", time.zone);
    const bool named = time.pattern.empty() || time.pattern == "epoch-s" || time.pattern == "epoch-ms";
    if (!named && time.pattern.find('%') == std::string::npos)
        reader.complain("pattern", wanted_for(*find_key("time", "pattern")), "not-a-choice");
    if (reader.has("zone") && !is_known_zone(time.zone))
        reader.complain("zone", "a zone of the tz database, such as \"Europe/Berlin\" or \"UTC\"", "bad-zone");
}

void read_listener(const ObjectReader& reader, Feed& feed, FeedSurroundings& surroundings) {
    reader.require("listen");
    for (const std::string_view key : {"folder", "stable_for"})
        if (reader.has(key)) reader.complain(key, "nothing, or \"kind\": \"drop\"", "misplaced");
    std::string address;
    reader.read("listen", address);
    if (address.empty()) return;
    const auto endpoint = parse_endpoint(address);
    if (!endpoint) {
        reader.complain("listen", wanted_for(*find_key("feed", "listen")), "bad-address");
        return;
    }
    feed.listen = *endpoint;
    if (endpoint->port != 0 && !surroundings.addresses.insert(address).second)
        reader.complain("listen", "an address no other feed listens on", "duplicate-name");
}

void read_folder(const ObjectReader& reader, Feed& feed, FeedSurroundings& surroundings) {
    reader.require("folder");
    for (const std::string_view key : {"listen", "reply", "idle_timeout"})
        if (reader.has(key)) reader.complain(key, "nothing, or \"kind\": \"tcp\"", "misplaced");
    reader.read("folder", feed.folder);
    reader.read("stable_for", feed.stable_for);
    if (!feed.folder.empty() && !surroundings.addresses.insert(feed.folder).second)
        reader.complain("folder", "a folder no other feed watches", "duplicate-name");
}

void read_way_in(const ObjectReader& reader, Feed& feed, FeedSurroundings& surroundings) {
    reader.require("kind");
    reader.read("kind", feed.kind);
    if (!reader.has("kind")) return;
    if (feed.kind == FeedKind::tcp) {
        read_listener(reader, feed, surroundings);
    } else {
        read_folder(reader, feed, surroundings);
    }
    feed.format = feed.kind == FeedKind::tcp ? FeedFormat::ndjson : FeedFormat::csv;
    reader.read("format", feed.format);
    reader.read("reply", feed.reply);
    reader.read("idle_timeout", feed.idle_timeout);
}

void read_mapping(const ObjectReader& reader, Feed& feed, const FeedSurroundings& surroundings) {
    read_reference(reader, "pump", "pump", feed.pump, surroundings.pumps);
    if (reader.has("section") && !reader.has("pump"))
        reader.complain("section", "also \"pump\": without it every pump's rows would be of that section", "missing");
    read_section_of(reader, surroundings, feed.pump, feed.section);
    feed.time.zone = surroundings.plant.time_zone;
    reader.object("time", [&](const ObjectReader& time) { read_time_format(time, feed.time); });
    reader.read("pump_column", feed.pump_column);
    reader.read("section_column", feed.section_column);
    reader.read("tag_column", feed.tag_column);
    reader.read("value_column", feed.value_column);
    reader.each_named("columns", [&](const std::string& name, const ObjectReader& target) {
        feed.columns.emplace(name, read_target(target, surroundings, feed));
    });
    reader.each_named("tags", [&](const std::string& name, const ObjectReader& target) {
        feed.tags.emplace(name, read_target(target, surroundings, feed));
        const bool placed = target.has("pump") || target.has("reservoir") || target.has("drain_group");
        if (!placed && !reader.has("pump"))
            target.complain("a \"pump\", \"reservoir\" or \"drain_group\": a tag says where by itself", "missing");
    });
}

}  // namespace

FeedSurroundings::FeedSurroundings(const Plant& read_so_far) : plant(read_so_far) {
    for (const Reservoir& reservoir : plant.reservoirs) reservoirs.insert(reservoir.id);
    for (const Pump& pump : plant.pumps) {
        pumps.insert(pump.id);
        for (const Section& section : pump.sections)
            if (!section.drain_group.empty()) drain_groups.insert(section.drain_group);
    }
}

Feed read_feed(const ObjectReader& reader, FeedSurroundings& surroundings) {
    Feed feed;
    read_name(reader, "id", feed.id, surroundings.taken);
    read_way_in(reader, feed, surroundings);
    read_csv(reader, feed);
    read_mapping(reader, feed, surroundings);
    reader.read("max_ahead", feed.max_ahead);
    reader.read("silent_after", feed.silent_after);
    reader.read("corrects", feed.corrects);
    return feed;
}

}  // namespace slipledger::config
