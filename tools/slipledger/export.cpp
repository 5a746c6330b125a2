// `slipledger export`: raw readings as CSV (or JSON), slice by slice, so that years of them neither fill memory nor hold
// the ledger. What comes out can be loaded again.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <optional>

#include "daemon/report/when.hpp"
#include "tools/slipledger/command.hpp"
#include "tools/slipledger/given_time.hpp"

namespace slipledger::command {

namespace {

using analytics::Instant;
using analytics::quantity_table;

constexpr std::chrono::hours slice{24};

// Threads: one.
struct Options {
    std::vector<std::string> pumps;
    std::string from;
    std::string to;
};

// One point of measurement with the names a row of it carries.
struct NamedPoint {
    ledger::PointId id{};
    std::string pump;
    std::string section;
    std::string reservoir;
    std::string drain_group;
};

std::vector<NamedPoint> points_of(const config::Plant& plant, const ledger::Directory& directory,
                                  const std::vector<std::string>& pumps) {
    std::vector<NamedPoint> points;
    for (const config::Pump& pump : plant.pumps) {
        if (!pumps.empty() && std::find(pumps.begin(), pumps.end(), pump.id) == pumps.end()) continue;
        if (pump.sections.size() > 1) points.push_back({*directory.point(pump.id, ""), pump.id, "", "", ""});
        for (const config::Section& section : pump.sections)
            points.push_back({*directory.point(pump.id, section.id), pump.id, section.id, "", ""});
    }
    if (!pumps.empty()) return points;
    for (const auto& [name, id] : directory.reservoirs) points.push_back({id, "", "", name, ""});
    for (const auto& [name, id] : directory.drain_groups) points.push_back({id, "", "", "", name});
    return points;
}

// Writes rows as they come. Threads: one.
class Sheet {
public:
    explicit Sheet(bool json) : json_(json) {
        if (json_) {
            fmt::print("[");
            return;
        }
        fmt::print("time,pump,section,reservoir,drain_group");
        for (const auto& facts : quantity_table) fmt::print(",{}", facts.name);
        fmt::print("\n");
    }
    Sheet(const Sheet&) = delete;
    Sheet& operator=(const Sheet&) = delete;
    ~Sheet() {
        if (json_) fmt::print("\n]\n");
    }

    void write(const NamedPoint& point, const ledger::PointRows& rows) {
        const std::string names = json_ ? json_names(point) : csv_names(point);
        std::string out;
        for (std::size_t i = 0; i < rows.times.size(); ++i) append(out, names, rows, i);
        fmt::print("{}", out);
    }

private:
    // Ids hold letters, digits and a few signs only (the plant file's reader sees to that), so nothing needs quoting.
    static std::string csv_names(const NamedPoint& p) {
        return fmt::format("{},{},{},{}", p.pump, p.section, p.reservoir, p.drain_group);
    }

    static std::string json_names(const NamedPoint& p) {
        std::string out;
        const auto add = [&out](std::string_view key, const std::string& value) {
            if (!value.empty()) out += fmt::format(",\"{}\":\"{}\"", key, value);
        };
        add("pump", p.pump);
        add("section", p.section);
        add("reservoir", p.reservoir);
        add("drain_group", p.drain_group);
        return out;
    }

    void append(std::string& out, const std::string& names, const ledger::PointRows& rows, std::size_t i) {
        std::string cells;
        bool any = false;
        for (const auto& facts : quantity_table) {
            const std::vector<double>& column = rows.columns[index_of(facts.quantity)];
            const bool known = !column.empty() && !std::isnan(column[i]);
            any = any || known;
            if (json_ && known) cells += fmt::format(",\"{}\":{:.7g}", facts.name, column[i]);
            if (!json_) cells += known ? fmt::format(",{:.7g}", column[i]) : std::string(",");
        }
        if (!any) return;  // every cell of it is disputed
        const std::string time = report::rfc3339(rows.times[i]);
        out += json_ ? fmt::format("{}\n{{\"time\":\"{}\"{}{}}}", first_ ? "" : ",", time, names, cells)
                     : fmt::format("{},{}{}\n", time, names, cells);
        first_ = false;
    }

    bool json_;
    bool first_ = true;
};

std::optional<Instant> oldest_of(const ledger::Reader& reader, const ledger::Directory& directory) {
    std::optional<Instant> oldest;
    for (const auto& [name, id] : directory.pumps)
        if (const std::optional<Instant> first = reader.oldest(id); first && (!oldest || *first < *oldest)) oldest = first;
    return oldest;
}

int run(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    for (const std::string& pump : options.pumps) static_cast<void>(pump_named(plant, pump));
    const ledger::Reader reader(plant.store.path);
    const ledger::Directory directory = reader.directory();
    const std::optional<Instant> oldest = oldest_of(reader, directory);
    const std::optional<Instant> newest = reader.newest_of_plant();
    const Instant to_the_end = newest.value_or(Instant{}) + std::chrono::milliseconds(1);
    const Instant from = options.from.empty() ? oldest.value_or(to_the_end) : given_time(options.from, plant);
    const Instant to = options.to.empty() ? to_the_end : given_time(options.to, plant);
    Sheet sheet(shared.json);
    if (!newest) return fine;
    for (const NamedPoint& point : points_of(plant, directory, options.pumps))
        for (Instant at = from; at < to; at += slice) sheet.write(point, reader.rows(point.id, at, std::min(at + slice, to)));
    return fine;
}

}  // namespace

void add_export(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "export", "raw readings as CSV, as they were stored", true,
                                    [&shared, options] { return run(shared, *options); });
    command->add_option("pumps", options->pumps, "ids of pumps; none: all")->type_name("PUMP");
    command->add_option("--from", options->from, "first time; default: the oldest reading")->type_name("TIME");
    command->add_option("--to", options->to, "first time no longer exported")->type_name("TIME");
}

}  // namespace slipledger::command
