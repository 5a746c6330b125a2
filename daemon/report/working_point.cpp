// From the raw readings of one instant to the leakage seen there and the features it is held against.
#include <fmt/format.h>

#include <array>
#include <cmath>

#include "daemon/report/when.hpp"
#include "daemon/report/working_chapters.hpp"

namespace slipledger::report {

namespace {

using analytics::Basis;
using analytics::Quantity;
using analytics::SectionSpec;

struct CellName {
    Quantity quantity;
    const char* name;
    const char* symbol;
};

// In the order of the page; what has no part in the judging is not on it.
constexpr std::array<CellName, 9> cell_names{{{Quantity::case_drain_flow, "case drain flow", "q"},
                                              {Quantity::delivery_flow, "delivery flow", "q"},
                                              {Quantity::outlet_pressure, "outlet pressure", "p"},
                                              {Quantity::inlet_pressure, "inlet pressure", "p_i"},
                                              {Quantity::case_pressure, "case pressure", "p_c"},
                                              {Quantity::shaft_speed, "shaft speed", "n"},
                                              {Quantity::fluid_temperature, "fluid temperature", "t"},
                                              {Quantity::stroke, "stroke", "s"},
                                              {Quantity::shaft_power, "shaft power", "P_s"}}};

std::string source_of(const ReadCell& cell, const WorkingFacts& facts) {
    const std::string at = local_second(cell.reading.taken, facts.plant.time_zone);
    const bool is_flow = cell.reading.hold == analytics::Milliseconds{0};
    return fmt::format("reading of {}, {}{}", cell.place, at,
                       is_flow ? "" : fmt::format(", stands {} at most", span_words(cell.reading.hold)));
}

// What the feed's own text said, worked back from what is stored.
void put_as_written(const ReadCell& cell, const CellName& name, const EdgeConversion& by, WorkSheet& sheet) {
    const double in_unit = cell.reading.value / by.factor - by.shift;
    sheet.put({.name = fmt::format("as feed {} writes it", by.feed),
               .symbol = fmt::format("y_{}", name.symbol),
               .value = (in_unit - by.offset) / by.scale,
               .unit = by.unit,
               .source = "worked back from what is stored"});
}

std::string conversion(const EdgeConversion& by, const CellName& name) {
    std::string formula = fmt::format("y_{}", name.symbol);
    if (by.scale != 1.0) formula += fmt::format(" * {:g}", by.scale);
    if (by.offset + by.shift != 0.0) formula = fmt::format("({} + ({:.9g}))", formula, by.offset + by.shift);
    return by.factor == 1.0 ? formula : fmt::format("{} * {:.9g}", formula, by.factor);
}

void put_cell(const ReadCell& cell, const CellName& name, const WorkingFacts& facts, WorkSheet& sheet) {
    WorkStep step{.name = name.name,
                  .symbol = name.symbol,
                  .value = cell.reading.value,
                  .unit = std::string(facts_of(cell.reading.quantity).unit),
                  .source = source_of(cell, facts)};
    if (cell.conversions.size() == 1) {
        put_as_written(cell, name, cell.conversions.front(), sheet);
        step.formula = conversion(cell.conversions.front(), name);
    }
    sheet.put(std::move(step));
}

void put_unmeasured(WorkSheet& sheet, const char* name, const char* symbol) {
    if (sheet.has(symbol)) return;
    sheet.put(
        {.name = name, .symbol = symbol, .value = 0.0, .unit = "bar", .source = "not measured: taken as 0 bar gauge"});
}

// Speed of a motor on the mains where none is measured.
void put_motor_speed(const WorkingFacts& facts, WorkSheet& sheet) {
    const SectionSpec& spec = facts.spec;
    sheet.put({.name = "motor, no load",
               .symbol = "n_0",
               .value = spec.motor_nominal_rpm,
               .unit = "rpm",
               .source = "plant file; no speed is measured"});
    sheet.put(
        {.name = "slip at rated pressure", .symbol = "s_m", .value = spec.motor_slip_at_rated, .source = "plant file"});
    sheet.put({.name = "rated pressure",
               .symbol = "p_R",
               .value = spec.rated.pressure_bar,
               .unit = "bar",
               .source = "plant file"});
    sheet.put({.name = "shaft speed",
               .symbol = "n",
               .value = facts.point->point.speed_rpm,
               .unit = "rpm",
               .formula = facts.point->point.pressure_bar > 0.0 ? "n_0 * (1 - s_m * p / p_R)" : "n_0",
               .source = "motor's slip, linear in load"});
}

bool is_reversed(const WorkingFacts& facts) {
    return facts.point->joined.stroke < 0.0;
}

std::string magnitude(const std::string& symbol, double value) {
    return value < 0.0 ? "abs(" + symbol + ")" : symbol;
}

void put_pressure_rise(const WorkingFacts& facts, WorkSheet& sheet) {
    const bool drain = facts.basis == Basis::case_drain;
    if (drain)
        put_unmeasured(sheet, "case pressure", "p_c");
    else
        put_unmeasured(sheet, "inlet pressure", "p_i");
    const std::string from = is_reversed(facts) ? "p_i" : "p";
    const std::string against = drain ? "p_c" : is_reversed(facts) ? "p" : "p_i";
    sheet.put({.name = "pressure rise",
               .symbol = "dp",
               .value = facts.point->point.pressure_rise_bar,
               .unit = "bar",
               .formula = from + " - " + against,
               .source = drain ? "outlet over case: the leak's own pressure" : "outlet over inlet"});
}

void put_theoretical_flow(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::OperatingPoint& joined = facts.point->joined;
    const bool stroke_counts = facts.basis == Basis::delivery && std::isfinite(joined.stroke);
    sheet.put({.name = "displacement",
               .symbol = "V",
               .value = facts.spec.displacement_cm3,
               .unit = "cm3/rev",
               .source = "name plate"});
    std::string formula = "V * " + magnitude("n", joined.speed_rpm);
    if (stroke_counts)
        formula += " * " + magnitude("s", joined.stroke);
    else if (facts.spec.max_stroke_fraction != 1.0)
        formula += fmt::format(" * {:g}", facts.spec.max_stroke_fraction);
    sheet.put({.name = "theoretical flow",
               .symbol = "q_th",
               .value = facts.point->point.theoretical_lpm,
               .unit = "L/min",
               .formula = formula + " / 1000",
               .source = stroke_counts ? "displacement x speed x stroke" : "displacement x speed, at full stroke"});
}

void put_drain(const WorkingFacts& facts, WorkSheet& sheet) {
    sheet.put({.name = "case flushing",
               .symbol = "q_f",
               .value = facts.spec.case_flushing_lpm,
               .unit = "L/min",
               .source = "plant file"});
    sheet.put({.name = "leakage seen",
               .symbol = "q_s",
               .value = facts.point->point.leakage_lpm,
               .unit = "L/min",
               .formula = "q - q_f",
               .source = "by case drain: what leaks back inside is not seen"});
}

void put_delivery(const WorkingFacts& facts, WorkSheet& sheet) {
    const std::string read = is_reversed(facts) ? magnitude("q", facts.point->point.flow_lpm) : "q";
    WorkStep delivered{.name = "delivery",
                       .symbol = "q_d",
                       .value = facts.point->point.delivery_lpm,
                       .unit = "L/min",
                       .formula = read,
                       .source = "metered where the oil has expanded again"};
    if (facts.spec.delivery_meter.on_pressure_side) {
        sheet.put({.name = "bulk modulus, secant",
                   .symbol = "K",
                   .value = facts.spec.fluid.bulk_modulus_gpa(),
                   .unit = "GPa",
                   .source = "plant file"});
        delivered.formula = read + " / (1 - dp / (K * 10000))";
        delivered.name = "delivery, inlet density";
        delivered.source = "secant bulk modulus; metered at pressure";
    }
    sheet.put(std::move(delivered));
    sheet.put({.name = "leakage seen",
               .symbol = "q_s",
               .value = facts.point->point.leakage_lpm,
               .unit = "L/min",
               .formula = "q_th - q_d",
               .source = "by delivery"});
}

}  // namespace

void write_readings(const WorkingFacts& facts, WorkSheet& sheet) {
    sheet.chapter("Raw readings at " + local_second(facts.point->point.time, facts.plant.time_zone));
    if (!facts.remark.empty()) sheet.remark(facts.remark);
    const bool by_motor = !facts.spec.has_speed_sensor;
    for (const CellName& name : cell_names)
        for (const ReadCell& cell : facts.point->cells)
            if (cell.reading.quantity == name.quantity && !(by_motor && name.quantity == Quantity::shaft_speed))
                put_cell(cell, name, facts, sheet);
    if (by_motor && sheet.has("p")) put_motor_speed(facts, sheet);
}

void write_leakage_seen(const WorkingFacts& facts, WorkSheet& sheet) {
    sheet.chapter("Leakage seen at that instant");
    put_pressure_rise(facts, sheet);
    put_theoretical_flow(facts, sheet);
    if (facts.basis == Basis::case_drain)
        put_drain(facts, sheet);
    else
        put_delivery(facts, sheet);
}

void write_features(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::Features& features = facts.point->point.features;
    const std::string rise = facts.point->point.pressure_rise_bar < 0.0 ? "0" : "dp";
    const std::string source = "terms of the published loss models";
    sheet.chapter("Features at that instant");
    sheet.put({.name = "laminar feature",
               .symbol = "f1",
               .value = features.laminar,
               .formula = rise + " / p_r * mu_r / mu",
               .source = source});
    sheet.put({.name = "orifice feature",
               .symbol = "f2",
               .value = features.orifice,
               .formula = "sqrt(" + rise + " / p_r * rho_r / rho)",
               .source = source});
    sheet.put({.name = "speed feature",
               .symbol = "f3",
               .value = features.speed,
               .formula = magnitude("n", facts.point->joined.speed_rpm) + " / n_r",
               .source = source});
}

}  // namespace slipledger::report
