#include "config/keys.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

namespace slipledger::config {
namespace {

using enum KeyKind;

constexpr double none = std::numeric_limits<double>::infinity();

// A number above 0, up to high.
constexpr Key above_zero(std::string_view object, std::string_view name, std::string_view unit, double high,
                         std::string_view fallback, std::string_view meaning) {
    return {object, name, number, unit, fallback, meaning, 0.0, high, false};
}

// A number from low to high, both allowed.
constexpr Key within(std::string_view object, std::string_view name, std::string_view unit, double low, double high,
                     std::string_view fallback, std::string_view meaning) {
    return {object, name, number, unit, fallback, meaning, low, high, true};
}

constexpr std::array plant_rows{
    Key{"plant", "plant", text, "", "required", "name of the plant"},
    Key{"plant", "time_zone", text, "", "UTC", "its time zone, as in the tz database: days are calendar days there"},
    Key{"plant", "display_units", choice, "metric|us", "metric", "units of reports; us: psi, gpm, degF"},
    Key{"plant", "summary_minutes", whole, "min", "60", "length of a summary; divides 60", 1, 60},
    Key{"plant", "lateness", duration, "", "10 min", "how long after its end a summary waits for late rows"},
    Key{"plant", "stop_grace", duration, "", "10 s", "how long a stopping daemon lets loggers finish"},
    Key{"plant", "store", object, "store", "", "where the ledger lies"},
    Key{"plant", "fluids", map, "fluid", "", "oils by name, beside the built-in ones"},
    Key{"plant", "reservoirs", list, "reservoir", "required", "the oil reservoirs"},
    Key{"plant", "planned_stops", list, "planned_stop", "", "shutdowns already in the calendar"},
    within("plant", "duty_h_per_week", "h", 0, 168, "", "planned running hours a week; else the usual duty counts"),
    Key{"plant", "pumps", list, "pump", "required", "the pumps"},
    Key{"plant", "feeds", list, "feed", "", "the ways readings come in"},
    Key{"plant", "alerts", object, "alerts", "", "where notices go, and the plant's own limits"},
    Key{"plant", "http", object, "http", "", "pages and API"},
    Key{"plant", "economics", object, "economics", "", "what energy costs; else no money is shown"},

    Key{"store", "path", text, "", "/var/lib/slipledger/ledger.db", "the ledger's file; its folder must be writable"},
    Key{"store", "raw_days", whole, "d", "400", "how long raw readings stay; summaries stay for ever", 1, 36500},
    above_zero("store", "max_gb", "GB", 100000, "",
               "raw readings are pruned earlier where the ledger would outgrow this"),
    Key{"store", "commit_interval", duration, "", "200 ms",
        "the longest a row waits for others before it is committed"},

    Key{"fluid", "iso_vg", number, "mm2/s", "", "ISO viscosity grade, with viscosity_index", 2, 3200},
    Key{"fluid", "viscosity_index", number, "", "", "ASTM D2270 viscosity index", 0, 400},
    Key{"fluid", "points", list, "viscosity_point", "", "two measured viscosities, instead of grade and index"},
    within("fluid", "density_15_kgm3", "kg/m3", 600, 1500, "875", "density at 15 degC"),
    above_zero("fluid", "minimum_cst", "mm2/s", 1000, "10", "thinner oil: not judged (thin)"),
    above_zero("fluid", "maximum_cst", "mm2/s", 100000, "400", "thicker oil: not judged (cold)"),
    within("fluid", "bulk_modulus_gpa", "GPa", 0.3, 4, "1.4", "secant bulk modulus"),

    Key{"fluid", "source", text, "", "", "where these figures come from"},

    within("viscosity_point", "temperature_c", "degC", -60, 200, "required", "where it was measured"),
    within("viscosity_point", "viscosity_cst", "mm2/s", 2, 100000, "required", "kinematic viscosity there"),

    Key{"reservoir", "id", text, "", "required", "short name, unique among reservoirs"},
    Key{"reservoir", "name", text, "", "the id", "name on screen"},
    Key{"reservoir", "fluid", text, "", "required", "name of a fluid: of this file or built in"},
    above_zero("reservoir", "volume_l", "L", 1000000, "", "how much oil it holds"),

    Key{"planned_stop", "from", time, "", "required", "begin of the stop"},
    Key{"planned_stop", "to", time, "", "required", "its end"},
    Key{"planned_stop", "areas", texts, "", "all", "areas of pumps that stop"},

    Key{"pump", "id", text, "", "required", "short name, unique among pumps; feeds and commands use it"},
    Key{"pump", "name", text, "", "the id", "name on screen"},
    Key{"pump", "machine", text, "", "", "machine it drives"},
    Key{"pump", "area", text, "", "", "area of the plant"},
    Key{"pump", "criticality", choice, "low|medium|high", "medium", "breaks ties between equally urgent pumps"},
    Key{"pump", "reservoir", text, "", "required", "id of the reservoir it draws from"},
    Key{"pump", "type", choice, "axial-piston|radial-piston|vane|external-gear|internal-gear", "required",
        "kind of pump"},
    Key{"pump", "control", choice, "fixed|pressure-compensated|load-sensing|stroke-measured", "fixed",
        "how its stroke is set"},
    within("pump", "minimum_speed_rpm", "rpm", 0, 10000, "600 (vane), 0", "below it nothing is judged"),
    Key{"pump", "motor", object, "motor", "", "how the shaft turns where no speed is measured"},
    Key{"pump", "settling", duration, "", "10 s", "how long after a change of regime nothing is judged"},
    Key{"pump", "steady", object, "steady", "", "how fast things may move before a reading is transient"},
    Key{"pump", "drain", choice, "external|internal", "internal (gear), external", "where its case leakage goes"},
    Key{"pump", "makes_up_by", choice, "stroke|time|nothing", "nothing (fixed), stroke",
        "how lost flow is made up for; time: the machine runs longer"},
    Key{"pump", "sections", list, "section", "one, A", "sections; each may override what the pump says of them"},
    Key{"pump", "since", time, "", "newest reading", "since when the facts written here hold"},

    Key{"section", "id", text, "", "required", "short name, unique in the pump: A, B"},

    above_zero("motor", "nominal_rpm", "rpm", 10000, "1500", "synchronous speed"),
    within("motor", "slip_at_rated", "fraction", 0, 0.2, "0.015",
           "part of it lost at rated pressure; 0: constant speed"),

    above_zero("steady", "pressure_bar_per_s", "bar/s", 1000, "5", "pressure"),
    above_zero("steady", "speed_rpm_per_s", "rpm/s", 10000, "20", "shaft speed"),
    above_zero("steady", "temperature_c_per_min", "K/min", 100, "2", "fluid temperature"),

    above_zero("duty", "pressure_bar", "bar", 1000, "required (rated)", "outlet pressure"),
    above_zero("duty", "speed_rpm", "rpm", 10000, "required (rated)", "shaft speed"),
    within("duty", "fluid_temperature_c", "degC", -40, 150, "required (rated)", "fluid temperature at the inlet"),

    within("baseline", "run_in_h", "h", 0, 10000, "50", "running hours of a life shown but not learned from"),
    within("baseline", "min_h", "h", 0, 10000, "100", "judged running hours before the section is judged"),
    above_zero("baseline", "max_h", "h", 100000, "", "judged running hours after which learning ends"),

    Key{"maker_test", "points", list, "maker_test_point", "required", "lines of the maker's test record"},
    above_zero("maker_test_point", "pressure_bar", "bar", 1000, "required", "outlet pressure"),
    above_zero("maker_test_point", "speed_rpm", "rpm", 10000, "required", "shaft speed"),
    above_zero("maker_test_point", "viscosity_cst", "mm2/s", 100000, "required", "kinematic viscosity of the test oil"),
    within("maker_test_point", "case_drain_lpm", "L/min", 0, 2000, "", "case drain flow; this or delivery_lpm"),
    above_zero("maker_test_point", "delivery_lpm", "L/min", 5000, "", "delivered flow"),

    Key{"sensor", "range", pair, "", "", "lowest and highest it can show, in the quantity's unit"},
    above_zero("sensor", "accuracy", "", none, "", "fixed error, one standard deviation, in the quantity's unit"),
    above_zero("sensor", "accuracy_percent", "%", 50, "", "error that grows with the reading, one standard deviation"),
    within("sensor", "least", "", 0, none, "", "least flow it shows: below it is \"less than\", not zero"),
    Key{"sensor", "measured_at", choice, "pressure-side|return-side", "pressure-side", "where a delivery meter sits"},
    Key{"sensor", "hold", duration, "", "1.5 usual intervals", "how long a reading stands"},

    Key{"limits", "leakage_ratio", object, "ladder", "1.17, 2, 3", "leakage ratio, 1 = as new"},
    Key{"limits", "efficiency_points", object, "ladder", "4, 7, 10", "points of volumetric efficiency lost"},
    Key{"limits", "drain_share_percent", object, "ladder", "by type", "raw case drain over theoretical flow, percent"},
    Key{"limits", "over_temperature_c", object, "ladder", "70, -, 80", "fluid temperature, degC"},
    Key{"limits", "case_pressure_bar", object, "ladder", "1.5, -, 3", "case pressure, bar"},
    Key{"limits", "inlet_vacuum_bar", object, "ladder", "0.2, -, 0.3", "bar the inlet is below 0 bar gauge"},
    within("limits", "step_lasting_h", "h", 0, 1000, "12", "running hours a sudden change lasts before it is told"),
    above_zero("ladder", "watch", "", none, "", "limit of the level watch"),
    above_zero("ladder", "plan", "", none, "", "limit of the level plan"),
    above_zero("ladder", "act", "", none, "", "limit of the level act"),
    Key{"ladder", "on_delay", duration, "", "by rule", "how long beyond the limit before the level is raised"},
    Key{"ladder", "off_delay", duration, "", "by rule", "how long inside before it is cleared"},
    within("ladder", "deadband", "", 0, none, "by rule", "how far inside, in the rule's unit"),

    Key{"spare", "part_number", text, "", "", "of the cartridge, rotating group or gear set"},
    Key{"spare", "in_stock", whole, "", "0", "how many lie in the store", 0, 1000},
    within("spare", "lead_days", "d", 0, 2000, "0", "days from order to delivery"),

    within("replacement", "part_cost", "currency", 0, 1e7, "0", "of the new cartridge, rotating group or gear set"),
    within("replacement", "work_cost", "currency", 0, 1e7, "0", "of fitting it"),
    within("replacement", "downtime_h", "h", 0, 10000, "0", "hours the machine stands still for it"),

    Key{"feed", "id", text, "", "required", "short name, unique among feeds"},
    Key{"feed", "kind", choice, "tcp|drop", "required", "listener or drop folder"},
    Key{"feed", "listen", text, "", "required (tcp)", "address and port: 127.0.0.1:7310; port 0: any free one"},
    Key{"feed", "folder", text, "", "required (drop)", "folder in which files appear"},
    Key{"feed", "format", choice, "ndjson|csv", "ndjson (tcp), csv (drop)", "how a row is written"},
    Key{"feed", "layout", choice, "wide|long", "wide", "csv: a column per quantity or tag; or time, tag, value"},
    Key{"feed", "delimiter", text, "", ",", "csv: one character between cells; \"tab\" for a tabulator"},
    Key{"feed", "decimal", text, "", ".", "csv: decimal sign, . or ,"},
    Key{"feed", "header", truth, "", "true", "csv: the first line names the columns"},
    Key{"feed", "header_names", texts, "", "", "csv without a header: the columns in their order"},
    Key{"feed", "time", object, "time", "", "how a row says when"},
    Key{"feed", "pump_column", text, "", "pump", "column that names the pump"},
    Key{"feed", "section_column", text, "", "section", "column that names the section"},
    Key{"feed", "tag_column", text, "", "tag", "column that names the tag"},
    Key{"feed", "value_column", text, "", "value", "column with a tag's value"},
    Key{"feed", "columns", map, "target", "", "what columns (or NDJSON keys) mean that are not named as quantities"},
    Key{"feed", "tags", map, "target", "", "what tags mean"},
    Key{"feed", "pump", text, "", "", "id of the pump all rows are of"},
    Key{"feed", "section", text, "", "", "id of the section all rows are of; with pump"},
    Key{"feed", "reply", truth, "", "false", "one JSON line back after each durable commit"},
    Key{"feed", "corrects", text, "", "", "id of the feed whose disputed readings this one settles"},
    Key{"feed", "idle_timeout", duration, "", "30 min", "a connection silent for so long is closed"},
    Key{"feed", "max_ahead", duration, "", "15 min", "readings further ahead of the clock are refused"},
    Key{"feed", "silent_after", duration, "", "", "no row for so long raises feed-silent"},
    Key{"feed", "stable_for", duration, "", "2 s", "drop: a file is taken once unchanged for so long"},

    Key{"time", "column", text, "", "time", "column or key of the time"},
    Key{"time", "pattern", text, "", "RFC 3339", "epoch-s, epoch-ms or a strftime-like pattern: %d.%m.%Y %H:%M:%S"},
    Key{"time", "zone", text, "", "the plant's", "zone of times written without one"},

    Key{"target", "pump", text, "", "", "id of the pump it is measured at"},
    Key{"target", "section", text, "", "", "id of the section, of this pump, the feed's or the row's"},
    Key{"target", "reservoir", text, "", "", "id of the reservoir it is measured at"},
    Key{"target", "drain_group", text, "", "", "the drain group it is measured for"},
    Key{"target", "quantity", text, "", "required", "what is measured: outlet_pressure, shaft_speed, ..."},
    Key{"target", "unit", text, "", "canonical", "unit of the values: bar, psi, kW, W, ..."},
    within("target", "scale", "", -1e9, 1e9, "1", "value = written * scale + offset, in unit"),
    within("target", "offset", "", -1e9, 1e9, "0", "see scale"),

    Key{"alerts", "log", text, "", "", "file of the alert log, one JSON object a line"},
    Key{"alerts", "webhooks", list, "webhook", "", "where notices are posted"},
    Key{"alerts", "limits", object, "limits", "", "the plant's own limits, over the built-in ones"},
    Key{"webhook", "name", text, "", "required", "short name, unique among webhooks"},
    Key{"webhook", "url", text, "", "required", "http:// or https:// address"},
    Key{"webhook", "timeout", duration, "", "10 s", "how long one attempt may take"},
    Key{"webhook", "retry_for", duration, "", "3 d", "how long delivery is tried"},

    Key{"http", "listen", text, "", "", "address and port: 127.0.0.1:7380; not given: no pages"},

    within("economics", "energy_price_per_kwh", "per kWh", 0, 1000, "required", "price of electric energy"),
    Key{"economics", "currency", text, "", "required", "its currency, as printed"},
    within("economics", "motor_efficiency", "fraction", 0.3, 1, "0.93", "of the pump's motor"),
    within("economics", "downtime_cost_per_h", "per h", 0, 1e7, "0", "what an hour of standstill costs"),
};

// What a pump says of all its sections and a section may say of itself: keys of both objects.
constexpr std::array section_rows{
    Key{"section", "model", text, "", "", "maker's model or type code"},
    above_zero("section", "displacement_cm3", "cm3/rev", 10000, "required (pump or section)",
               "name plate displacement"),
    above_zero("section", "displacement_accuracy_percent", "%", 20, "1.2", "standard deviation of the name plate"),
    Key{"section", "rated", object, "duty", "required (pump or section)", "maker's rated point"},
    Key{"section", "reference", object, "duty", "75 % rated", "where the leakage ratio is quoted"},
    above_zero("section", "compensator_bar", "bar", 1000, "", "setting; required if pressure-compensated"),
    above_zero("section", "plateau_percent", "%", 20, "3", "half width of the band counted as compensating"),
    above_zero("section", "relief_bar", "bar", 1000, "",
               "relief valve setting; from 90 % of it a fixed pump is relieving"),
    above_zero("section", "max_stroke_fraction", "fraction", 1, "1", "volume stop"),
    Key{"section", "full_stroke", truth, "", "false", "it always runs at its largest stroke"},
    Key{"section", "drain_group", text, "", "", "name shared by sections whose drains share one meter"},
    within("section", "case_flushing_lpm", "L/min", 0, 500, "0", "constant flushing flow in the drain"),
    Key{"section", "maker_test", object, "maker_test", "", "maker's test figures"},
    Key{"section", "baseline", object, "baseline", "", "hours of a life by what they are used for"},
    Key{"section", "sensors", map, "sensor", "", "instruments, by quantity"},
    Key{"section", "limits", object, "limits", "", "its own limits"},
    Key{"section", "spare", object, "spare", "", "spare part"},
    Key{"section", "replacement", object, "replacement", "", "what a replacement costs, with economics"},
};

constexpr auto all_keys() {
    std::array<Key, plant_rows.size() + 2 * section_rows.size()> keys;
    auto next = std::ranges::copy(plant_rows, keys.begin()).out;
    next = std::ranges::copy(section_rows, next).out;
    std::ranges::transform(section_rows, next, [](Key key) {
        key.object = "pump";
        return key;
    });
    return keys;
}

constexpr auto table = all_keys();

std::string number_wanted(const Key& key) {
    std::string result = key.kind == KeyKind::whole ? "a whole number" : "a number";
    if (!key.of.empty()) result += fmt::format(" in {}", key.of);
    const bool bounded = std::isfinite(key.high);
    if (!key.low_allowed) {
        result += fmt::format(" above {}", key.low);
        if (bounded) result += fmt::format(", up to {}", key.high);
    } else if (std::isfinite(key.low)) {
        result += bounded ? fmt::format(" from {} to {}", key.low, key.high) : fmt::format(", {} or more", key.low);
    }
    return result;
}

std::string kind_wanted(const Key& key) {
    switch (key.kind) {
        case text:
            return "text";
        case texts:
            return "a list of text";
        case number:
        case whole:
            return number_wanted(key);
        case pair:
            return "two numbers, [low, high]";
        case truth:
            return "true or false";
        case choice:
            return fmt::format("one of {}", fmt::join(words_of(key), ", "));
        case duration:
            return "a duration such as \"10 min\" (ms, s, min, h, d)";
        case time:
            return "a time such as \"2026-03-01T06:00:00Z\", or a date";
        case object:
            return fmt::format("an object with keys such as {}", fmt::join(key_names(key.of), ", "));
        case list:
            return "a list of objects";
        case map:
            return "an object of named objects";
    }
    return "";
}

}  // namespace

std::span<const Key> plant_keys() {
    return table;
}

const Key* find_key(std::string_view object, std::string_view name) {
    const auto found =
        std::ranges::find_if(table, [&](const Key& key) { return key.object == object && key.name == name; });
    return found == table.end() ? nullptr : &*found;
}

std::vector<std::string_view> key_names(std::string_view object) {
    std::vector<std::string_view> names;
    for (const Key& key : table)
        if (key.object == object) names.push_back(key.name);
    return names;
}

std::vector<std::string_view> words_of(const Key& key) {
    std::vector<std::string_view> words;
    std::string_view rest = key.of;
    while (!rest.empty()) {
        const std::size_t bar = std::min(rest.find('|'), rest.size());
        words.push_back(rest.substr(0, bar));
        rest.remove_prefix(std::min(bar + 1, rest.size()));
    }
    return words;
}

std::string wanted_for(const Key& key) {
    return fmt::format("{}: {}", kind_wanted(key), key.meaning);
}

}  // namespace slipledger::config
