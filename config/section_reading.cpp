#include "config/section_reading.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "config/nearest.hpp"

namespace slipledger::config {
namespace {

void read_rated(const ObjectReader& reader, SectionDraft& draft) {
    Duty& rated = draft.section.rated;
    reader.read("pressure_bar", rated.pressure_bar);
    reader.read("speed_rpm", rated.speed_rpm);
    reader.read("fluid_temperature_c", rated.fluid_temperature_c);
    if (reader.has("pressure_bar")) draft.written.insert("rated.pressure_bar");
    if (reader.has("speed_rpm")) draft.written.insert("rated.speed_rpm");
    if (reader.has("fluid_temperature_c")) draft.written.insert("rated.fluid_temperature_c");
}

void read_reference_point(const ObjectReader& reader, SectionDraft& draft) {
    reader.read("pressure_bar", draft.reference_pressure_bar);
    reader.read("speed_rpm", draft.reference_speed_rpm);
    reader.read("fluid_temperature_c", draft.reference_temperature_c);
}

void read_maker_test(const ObjectReader& reader, std::vector<MakerTestPoint>& points) {
    points.clear();
    reader.require("points");
    reader.each("points", [&](const ObjectReader& line) {
        MakerTestPoint& point = points.emplace_back();
        line.require({"pressure_bar", "speed_rpm", "viscosity_cst"});
        line.read("pressure_bar", point.pressure_bar);
        line.read("speed_rpm", point.speed_rpm);
        line.read("viscosity_cst", point.viscosity_cst);
        line.read("case_drain_lpm", point.case_drain_lpm);
        line.read("delivery_lpm", point.delivery_lpm);
        if (!line.has("case_drain_lpm") && !line.has("delivery_lpm")) line.require("case_drain_lpm");
    });
}

void read_baseline(const ObjectReader& reader, Baseline& baseline) {
    reader.read("run_in_h", baseline.run_in_h);
    reader.read("min_h", baseline.min_h);
    reader.read("max_h", baseline.max_h);
    if (baseline.max_h && *baseline.max_h <= baseline.min_h)
        reader.complain(reader.has("max_h") ? "max_h" : "min_h",
                        "max_h above min_h, else learning ends before the section may be judged", "implausible");
}

void read_sensor(const std::string& name, const ObjectReader& reader, Sensors& sensors) {
    const auto quantity = analytics::quantity_named(name);
    if (!quantity) {
        std::vector<std::string_view> names;
        for (const auto& facts : analytics::quantity_table) names.push_back(facts.name);
        const std::string_view nearest = nearest_name(name, names);
        reader.complain(nearest.empty() ? fmt::format("a quantity as name: {}", fmt::join(names, ", "))
                                        : fmt::format("a quantity as name; perhaps \"{}\"", nearest),
                        "unknown-quantity");
        return;
    }
    Sensor& sensor = sensors[*quantity];
    reader.read("range", sensor.range_low, sensor.range_high);
    reader.read("accuracy", sensor.accuracy);
    reader.read("accuracy_percent", sensor.accuracy_percent);
    reader.read("least", sensor.least);
    reader.read("measured_at", sensor.measured_at);
    reader.read("hold", sensor.hold);
    if (reader.has("measured_at") && *quantity != analytics::Quantity::delivery_flow)
        reader.complain("measured_at", "nothing: only delivery_flow is measured at one side or the other",
                        "implausible");
}

void read_spare(const ObjectReader& reader, std::optional<Spare>& spare) {
    if (!spare) spare.emplace();
    reader.read("part_number", spare->part_number);
    reader.read("in_stock", spare->in_stock);
    reader.read("lead_days", spare->lead_days);
}

void read_replacement(const ObjectReader& reader, std::optional<Replacement>& replacement) {
    if (!replacement) replacement.emplace();
    reader.read("part_cost", replacement->part_cost);
    reader.read("work_cost", replacement->work_cost);
    reader.read("downtime_h", replacement->downtime_h);
}

void read_ladder(const ObjectReader& reader, Ladder& ladder) {
    reader.read("watch", ladder.watch);
    reader.read("plan", ladder.plan);
    reader.read("act", ladder.act);
    reader.read("on_delay", ladder.on_delay);
    reader.read("off_delay", ladder.off_delay);
    reader.read("deadband", ladder.deadband);
    double before = 0.0;
    for (const auto& limit : {ladder.watch, ladder.plan, ladder.act}) {
        if (limit && *limit <= before) {
            reader.complain("watch below plan below act (a level not given keeps its default)", "implausible");
            return;
        }
        before = limit.value_or(before);
    }
}

}  // namespace

void read_limits(const ObjectReader& reader, Limits& limits) {
    const auto into = [&](std::string_view key, Ladder& ladder) {
        reader.object(key, [&](const ObjectReader& rule) { read_ladder(rule, ladder); });
    };
    into("leakage_ratio", limits.leakage_ratio);
    into("efficiency_points", limits.efficiency_points);
    into("drain_share_percent", limits.drain_share_percent);
    into("over_temperature_c", limits.over_temperature_c);
    into("case_pressure_bar", limits.case_pressure_bar);
    into("inlet_vacuum_bar", limits.inlet_vacuum_bar);
    reader.read("step_lasting_h", limits.step_lasting_h);
}

void read_section_facts(const ObjectReader& reader, SectionDraft& draft) {
    Section& section = draft.section;
    reader.read("model", section.model);
    reader.read("displacement_cm3", section.displacement_cm3);
    if (reader.has("displacement_cm3")) draft.written.insert("displacement_cm3");
    reader.read("displacement_accuracy_percent", section.displacement_accuracy_percent);
    reader.object("rated", [&](const ObjectReader& duty) { read_rated(duty, draft); });
    reader.object("reference", [&](const ObjectReader& duty) { read_reference_point(duty, draft); });
    reader.read("compensator_bar", section.compensator_bar);
    reader.read("plateau_percent", section.plateau_percent);
    reader.read("relief_bar", section.relief_bar);
    reader.read("max_stroke_fraction", section.max_stroke_fraction);
    reader.read("full_stroke", section.full_stroke);
    reader.read("drain_group", section.drain_group);
    reader.read("case_flushing_lpm", section.case_flushing_lpm);
    reader.object("maker_test", [&](const ObjectReader& test) { read_maker_test(test, section.maker_test); });
    reader.object("baseline", [&](const ObjectReader& hours) { read_baseline(hours, section.baseline); });
    reader.each_named("sensors", [&](const std::string& name, const ObjectReader& sensor) {
        read_sensor(name, sensor, section.sensors);
    });
    reader.object("limits", [&](const ObjectReader& limits) { read_limits(limits, section.limits); });
    reader.object("spare", [&](const ObjectReader& spare) { read_spare(spare, section.spare); });
    reader.object("replacement",
                  [&](const ObjectReader& costs) { read_replacement(costs, section.replacement); });
}

Section finish_section(const ObjectReader& reader, SectionDraft draft) {
    if (!draft.written.contains("displacement_cm3")) reader.require("displacement_cm3");
    std::vector<std::string_view> missing;
    for (const std::string_view key : {"rated.pressure_bar", "rated.speed_rpm", "rated.fluid_temperature_c"})
        if (!draft.written.contains(key)) missing.push_back(key.substr(std::string_view("rated.").size()));
    if (!missing.empty())
        reader.complain("rated", fmt::format("{}, from the maker's data sheet", fmt::join(missing, ", ")), "missing");
    Section& section = draft.section;
    constexpr double reference_share = 0.75;  // of rated pressure: where most pumps spend their loaded hours
    section.reference.pressure_bar =
        draft.reference_pressure_bar.value_or(reference_share * section.rated.pressure_bar);
    section.reference.speed_rpm = draft.reference_speed_rpm.value_or(section.rated.speed_rpm);
    section.reference.fluid_temperature_c = draft.reference_temperature_c.value_or(section.rated.fluid_temperature_c);
    return std::move(draft.section);
}

}  // namespace slipledger::config
