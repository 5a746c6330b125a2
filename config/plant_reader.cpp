#include "config/plant_reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <fstream>
#include <iterator>

#include "config/feed_reading.hpp"
#include "config/fluid_reading.hpp"
#include "config/names.hpp"
#include "config/object_reader.hpp"
#include "config/pump_reading.hpp"
#include "config/section_reading.hpp"

namespace slipledger::config {
namespace {

void read_calendar(const ObjectReader& reader, Plant& plant) {
    reader.require("plant");
    reader.read("plant", plant.name);
    std::string zone = plant.time_zone;
    reader.read("time_zone", zone);
    if (is_known_zone(zone)) {
        plant.time_zone = zone;
    } else {
        reader.complain("time_zone", "a zone of the tz database, such as \"Europe/Berlin\" or \"UTC\"", "bad-zone");
    }
    reader.read("display_units", plant.display_units);
    reader.read("summary_minutes", plant.summary_minutes);
    if (60 % plant.summary_minutes != 0)
        reader.complain("summary_minutes", "minutes that divide an hour: 1, 2, 3, 4, 5, 6, 10, 12, 15, 20, 30 or 60",
                        "out-of-range");
    reader.read("lateness", plant.lateness);
    reader.read("stop_grace", plant.stop_grace);
    reader.read("duty_h_per_week", plant.duty_h_per_week);
}

void read_store(const ObjectReader& reader, Store& store) {
    reader.read("path", store.path);
    reader.read("raw_days", store.raw_days);
    reader.read("max_gb", store.max_gb);
    reader.read("commit_interval", store.commit_interval);
}

void read_reservoirs(const ObjectReader& reader, Plant& plant) {
    FluidTable fluids = built_in_fluids();
    reader.each_named("fluids", [&](const std::string& name, const ObjectReader& fluid) {
        fluids.insert_or_assign(name, read_fluid(name, fluid));
    });
    Names known;
    for (const auto& [name, fluid] : fluids) known.insert(name);
    Names taken;
    reader.require("reservoirs");
    reader.each("reservoirs", [&](const ObjectReader& item) {
        Reservoir& reservoir = plant.reservoirs.emplace_back();
        read_name(item, "id", reservoir.id, taken);
        reservoir.name = reservoir.id;
        item.read("name", reservoir.name);
        item.require("fluid");
        std::string fluid;
        read_reference(item, "fluid", "fluid (built in, or under \"fluids\")", fluid, known);
        if (const auto found = fluids.find(fluid); found != fluids.end()) reservoir.fluid = found->second;
        item.read("volume_l", reservoir.volume_l);
    });
    plant.fluids.insert(fluids.begin(), fluids.end());
}

void read_planned_stops(const ObjectReader& reader, Plant& plant) {
    Names areas;
    for (const Pump& pump : plant.pumps)
        if (!pump.area.empty()) areas.insert(pump.area);
    reader.each("planned_stops", [&](const ObjectReader& item) {
        std::optional<analytics::Instant> from;
        std::optional<analytics::Instant> to;
        item.require({"from", "to"});
        item.read_time("from", plant.time_zone, from);
        item.read_time("to", plant.time_zone, to);
        PlannedStop stop;
        item.read("areas", stop.areas);
        for (const std::string& area : stop.areas)
            if (!areas.contains(area))
                item.complain("areas", fmt::format("areas of pumps; no pump's \"area\" is \"{}\"", area),
                              "unknown-reference");
        if (!from || !to) return;
        if (*from >= *to) item.complain("to", "a time after \"from\"", "implausible");
        stop.from = *from;
        stop.to = *to;
        plant.planned_stops.push_back(stop);
    });
    std::ranges::sort(plant.planned_stops, {}, &PlannedStop::from);
}

// A group of one is a slip of the pen in a name.
void check_drain_groups(const ObjectReader& reader, const Plant& plant) {
    std::map<std::string, std::vector<std::string>> members;
    for (const Pump& pump : plant.pumps)
        for (const Section& section : pump.sections)
            if (!section.drain_group.empty()) members[section.drain_group].push_back(pump.id);
    for (const auto& [group, pumps] : members)
        if (pumps.size() == 1)
            reader.complain(
                "pumps",
                fmt::format("a second section with drain_group \"{}\" besides that of pump {}", group, pumps.front()),
                "unknown-reference");
}

void read_pumps(const ObjectReader& reader, const Node* limits, Plant& plant) {
    PumpSurroundings surroundings{.plant = plant, .limits = limits, .reservoirs = {}, .taken = {}};
    for (const Reservoir& reservoir : plant.reservoirs) surroundings.reservoirs.insert(reservoir.id);
    reader.require("pumps");
    reader.each("pumps", [&](const ObjectReader& pump) { plant.pumps.push_back(read_pump(pump, surroundings)); });
    if (reader.has("pumps") && plant.pumps.empty()) reader.complain("pumps", "at least one pump", "empty");
    check_drain_groups(reader, plant);
}

void read_feeds(const ObjectReader& reader, Plant& plant) {
    FeedSurroundings surroundings(plant);
    reader.each("feeds", [&](const ObjectReader& feed) { plant.feeds.push_back(read_feed(feed, surroundings)); });
    std::size_t index = 0;
    reader.each("feeds", [&](const ObjectReader& feed) {
        std::string corrects;
        Names others = surroundings.taken;
        others.erase(plant.feeds[index++].id);
        read_reference(feed, "corrects", "feed", corrects, others);
    });
}

void read_alerts(const ObjectReader& reader, Alerts& alerts) {
    reader.read("log", alerts.log);
    Names taken;
    reader.each("webhooks", [&](const ObjectReader& item) {
        Webhook& webhook = alerts.webhooks.emplace_back();
        read_name(item, "name", webhook.name, taken);
        item.require("url");
        item.read("url", webhook.url);
        if (!webhook.url.empty() && !webhook.url.starts_with("http://") && !webhook.url.starts_with("https://"))
            item.complain("url", "an address that begins with http:// or https://", "bad-address");
        item.read("timeout", webhook.timeout);
        item.read("retry_for", webhook.retry_for);
    });
    Limits checked = default_limits(analytics::PumpType::axial_piston);
    reader.object("limits", [&](const ObjectReader& limits) { read_limits(limits, checked); });
}

void read_http(const ObjectReader& reader, Http& http) {
    std::string address;
    reader.read("listen", address);
    if (address.empty()) return;
    http.listen = parse_endpoint(address);
    if (!http.listen) reader.complain("listen", wanted_for(*find_key("http", "listen")), "bad-address");
}

void read_economics(const ObjectReader& reader, std::optional<Economics>& economics) {
    economics.emplace();
    reader.require({"energy_price_per_kwh", "currency"});
    reader.read("energy_price_per_kwh", economics->energy_price_per_kwh);
    reader.read("currency", economics->currency);
    reader.read("motor_efficiency", economics->motor_efficiency);
    reader.read("downtime_cost_per_h", economics->downtime_cost_per_h);
}

const Node* plant_limits(const Node& root) {
    const Node* alerts = root.find("alerts");
    return alerts == nullptr ? nullptr : alerts->find("limits");
}

void read_whole(const ObjectReader& reader, const Node& root, Plant& plant) {
    read_calendar(reader, plant);
    reader.object("store", [&](const ObjectReader& store) { read_store(store, plant.store); });
    read_reservoirs(reader, plant);
    read_pumps(reader, plant_limits(root), plant);
    read_planned_stops(reader, plant);
    read_feeds(reader, plant);
    reader.object("alerts", [&](const ObjectReader& alerts) { read_alerts(alerts, plant.alerts); });
    reader.object("http", [&](const ObjectReader& http) { read_http(http, plant.http); });
    reader.object("economics", [&](const ObjectReader& money) { read_economics(money, plant.economics); });
}

// In the file's order, and each once: what a pump says wrongly of all its sections is one fault.
void tidy(std::vector<Fault>& faults) {
    std::vector<Fault> once;
    for (Fault& fault : faults)
        if (std::ranges::find(once, fault) == once.end()) once.push_back(std::move(fault));
    std::ranges::stable_sort(once, {}, &Fault::line);
    faults = std::move(once);
}

}  // namespace

PlantReading read_plant(std::string_view text) {
    JsonReading json = read_json(text);
    if (!json.complete) return {.plant = std::nullopt, .faults = std::move(json.faults)};
    PlantReading reading{.plant = Plant{}, .faults = std::move(json.faults)};
    read_whole(ObjectReader(json.root, "", "plant", reading.faults), json.root, *reading.plant);
    tidy(reading.faults);
    if (!reading.faults.empty()) reading.plant.reset();
    return reading;
}

namespace {

// Relative paths mean the same for the daemon and for every command, wherever each was started.
void take_paths_from(const std::filesystem::path& folder, Plant& plant) {
    const auto beside = [&folder](std::string& path) {
        if (!path.empty()) path = (folder / path).string();
    };
    beside(plant.store.path);
    beside(plant.alerts.log);
    for (Feed& feed : plant.feeds) beside(feed.folder);
}

}  // namespace

PlantReading read_plant_file(const std::filesystem::path& path) {
    std::error_code ignored;
    std::ifstream file;
    if (!std::filesystem::is_directory(path, ignored))
        file.open(path, std::ios::binary);  // a folder opens, then throws
    const std::string text{std::istreambuf_iterator<char>(file), {}};
    if (!file.is_open() || file.bad()) {
        Fault fault{.pointer = "",
                    .line = 0,
                    .column = 0,
                    .found = fmt::format("{} cannot be read", path.string()),
                    .wanted = "a readable file",
                    .code = "unreadable"};
        return {.plant = std::nullopt, .faults = {std::move(fault)}};
    }
    PlantReading reading = read_plant(text);
    if (reading.plant) take_paths_from(std::filesystem::absolute(path, ignored).parent_path(), *reading.plant);
    return reading;
}

}  // namespace slipledger::config
