// The oil: how thick and how dense it is where it matters, from two points and a density.
#include <fmt/format.h>

#include "analytics/leakage.hpp"
#include "daemon/report/working_chapters.hpp"

namespace slipledger::report {

namespace {

constexpr int line_digits = 9;  // two exponents are raised from them: fewer would spoil the viscosity's third digit

struct OilSources {
    std::string colder;
    std::string warmer;
};

OilSources sources_of(const config::Fluid& oil) {
    if (!oil.iso_vg || oil.points.size() == 2) return {"measured viscosity of " + oil.name, "the same"};
    return {fmt::format("{}: ISO 3448, grade {:g}", oil.name, *oil.iso_vg),
            fmt::format("ASTM D2270, index {:g}, inverted", oil.viscosity_index.value_or(100.0))};
}

}  // namespace

void write_oil_line(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::ViscosityLine line = facts.spec.fluid.line();
    const OilSources sources = sources_of(facts.oil);
    sheet.chapter("The oil: " + facts.oil.name);
    sheet.put({.name = "first point, temperature",
               .symbol = "t_1",
               .value = line.one.temperature_c,
               .unit = "degC",
               .source = sources.colder});
    sheet.put({.name = "first point, viscosity",
               .symbol = "nu_1",
               .value = line.one.viscosity_cst,
               .unit = "mm2/s",
               .source = sources.colder});
    sheet.put({.name = "second point, temperature",
               .symbol = "t_2",
               .value = line.other.temperature_c,
               .unit = "degC",
               .source = sources.warmer});
    sheet.put({.name = "second point, viscosity",
               .symbol = "nu_2",
               .value = line.other.viscosity_cst,
               .unit = "mm2/s",
               .source = sources.warmer});
    sheet.put({.name = "slope of the line",
               .symbol = "B",
               .value = line.b,
               .formula = "(log10(log10(nu_1 + 0.7)) - log10(log10(nu_2 + 0.7))) / (log10(t_2 + 273.15) - log10(t_1 + "
                          "273.15))",
               .source = "ASTM D341",
               .digits = line_digits});
    sheet.put({.name = "intercept of the line",
               .symbol = "A",
               .value = line.a,
               .formula = "log10(log10(nu_1 + 0.7)) + B * log10(t_1 + 273.15)",
               .source = "ASTM D341",
               .digits = line_digits});
    sheet.put({.name = "density at 15 degC",
               .symbol = "rho_15",
               .value = facts.spec.fluid.density_15_kgm3(),
               .unit = "kg/m3",
               .source = "plant file"});
}

void write_oil_at(const WorkingFacts& facts, WorkSheet& sheet, double temperature_c, const std::string& tag) {
    const analytics::Fluid& oil = facts.spec.fluid;
    const auto with = [&](std::string symbol) { return symbol + tag; };
    sheet.put({.name = "kinematic viscosity",
               .symbol = with("nu"),
               .value = oil.kinematic_cst(temperature_c),
               .unit = "mm2/s",
               .formula = fmt::format("10 ^ (10 ^ (A - B * log10(t{} + 273.15))) - 0.7", tag),
               .source = "ASTM D341"});
    sheet.put(
        {.name = "density",
         .symbol = with("rho"),
         .value = oil.density_kgm3(temperature_c),
         .unit = "kg/m3",
         .formula = fmt::format("rho_15 * exp(-0.6278 / rho_15 * (t{0} - 15) * (1 + 0.8 * 0.6278 / rho_15 * (t{0} - "
                                "15)))",
                                tag),
         .source = "ASTM D1250, lubricating oils"});
    sheet.put({.name = "dynamic viscosity",
               .symbol = with("mu"),
               .value = oil.dynamic_pas(temperature_c),
               .unit = "Pa s",
               .formula = fmt::format("nu{0} * rho{0} / 1000000", tag),
               .source = "definition"});
}

void write_reference(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::DutyPoint& at = facts.spec.reference;
    sheet.chapter("The reference point");
    sheet.remark(
        "Leakage is split into three parts, each written as what it is at this point times a feature that is 1 "
        "here: gaps (f1), edges and holes (f2), speed (f3).");
    sheet.put({.name = "pressure rise",
               .symbol = "p_r",
               .value = at.pressure_bar,
               .unit = "bar",
               .source = "plant file, else 75 % of rated pressure"});
    sheet.put({.name = "shaft speed",
               .symbol = "n_r",
               .value = at.speed_rpm,
               .unit = "rpm",
               .source = "plant file, else rated speed"});
    sheet.put({.name = "oil temperature",
               .symbol = "t_r",
               .value = at.temperature_c,
               .unit = "degC",
               .source = "plant file, else rated temperature"});
    write_oil_at(facts, sheet, at.temperature_c, "_r");
}

}  // namespace slipledger::report
