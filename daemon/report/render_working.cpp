#include "daemon/report/render_working.hpp"

#include <fmt/format.h>

#include <charconv>
#include <cmath>
#include <nlohmann/json.hpp>

#include "daemon/report/health.hpp"
#include "daemon/report/number.hpp"
#include "daemon/report/paragraph.hpp"
#include "daemon/report/when.hpp"
#include "daemon/report/work_sheet.hpp"

namespace slipledger::report {

using nlohmann::ordered_json;

namespace {

constexpr std::size_t name_width = 28;

std::string basis_words(analytics::Basis basis) {
    return basis == analytics::Basis::case_drain ? "case drain flow" : "delivery";
}

std::string heading(const Working& working, const config::Plant& plant) {
    const std::string section = working.only_section ? "" : ", section " + printable(working.section);
    std::string out = fmt::format("{}{}  {}\n", printable(working.pump), section, printable(working.pump_name));
    if (!working.summary_from) return out;
    out += fmt::format("The working behind {} to {}, by {}, life {}\n",
                       local_minute(*working.summary_from, plant.time_zone),
                       local_minute(*working.summary_to, plant.time_zone), basis_words(working.basis), working.life);
    return out;
}

std::string result(const WorkStep& step) {
    const std::string unit = step.unit.empty() ? "" : " " + step.unit;
    const std::string sd =
        std::isfinite(step.sd) ? fmt::format(", sd_{} = {}", step.symbol, written(step.sd, step.digits)) : "";
    return fmt::format("{}{}{}  [{}]", written(step.value, step.digits), unit, sd, step.source);
}

// Name and formula, the formula with its numbers, and what comes of it: each begins with "=" in one column where it
// can.
std::string step_text(const WorkStep& step) {
    const std::string lead = "  " + cell(printable(step.name), name_width) + " ";
    const std::string equals = std::string(name_width + 3, ' ') + std::string(step.symbol.size(), ' ') + " = ";
    const std::string begin = lead + step.symbol + " = ";
    if (step.formula.empty()) return paragraph(begin, printable(result(step)));
    std::string out = paragraph(begin, step.formula);
    if (step.numbers != step.formula) out += paragraph(equals, step.numbers);
    return out + paragraph(equals, printable(result(step)));
}

std::string point_line(const analytics::JudgedPoint& point, const config::Plant& plant) {
    return fmt::format("  {} {} {:>10} {:>9} {:>9} {:>9}\n", local_second(point.time, plant.time_zone).substr(11, 8),
                       cell(name_of(point.standing), 16), written(point.leakage_lpm), written(point.features.laminar),
                       written(point.features.orifice), written(point.features.speed));
}

std::string points_text(const Working& working, const config::Plant& plant) {
    std::string out = fmt::format("\nAll points of the summary\n  {} {} {:>10} {:>9} {:>9} {:>9}\n", cell("time", 8),
                                  cell("standing", 16), "leak L/min", "f1", "f2", "f3");
    for (const analytics::JudgedPoint& point : working.points) out += point_line(point, plant);
    return out;
}

// To the digits the text shows, so that both agree.
ordered_json as_written(double value, int digits) {
    if (!std::isfinite(value)) return nullptr;
    const std::string text = written(value, digits);
    double rounded = 0.0;
    std::from_chars(text.data(), text.data() + text.size(), rounded);
    return rounded;
}

ordered_json text_or_null(const std::string& text) {
    return text.empty() ? ordered_json(nullptr) : ordered_json(text);
}

ordered_json step_json(const WorkChapter& chapter, const WorkStep& step) {
    return {{"chapter", chapter.title},
            {"name", step.name},
            {"symbol", step.symbol},
            {"value", as_written(step.value, step.digits)},
            {"sd", as_written(step.sd, step.digits)},
            {"unit", text_or_null(step.unit)},
            {"formula", text_or_null(step.formula)},
            {"numbers", text_or_null(step.numbers)},
            {"source", step.source}};
}

ordered_json point_json(const analytics::JudgedPoint& point) {
    const bool judged = is_judged(point.standing);
    const auto judged_number = [&](double value) { return judged ? number(value) : ordered_json(nullptr); };
    return {{"time", rfc3339(point.time)},
            {"standing", name_of(point.standing)},
            {"leakage_lpm", judged_number(point.leakage_lpm)},
            {"f1", judged_number(point.features.laminar)},
            {"f2", judged_number(point.features.orifice)},
            {"f3", judged_number(point.features.speed)},
            {"pressure_rise_bar", number(point.pressure_rise_bar)},
            {"temperature_c", number(point.temperature_c)},
            {"speed_rpm", number(point.speed_rpm)}};
}

ordered_json time_or_null(const std::optional<analytics::Instant>& at) {
    return at ? ordered_json(rfc3339(*at)) : ordered_json(nullptr);
}

}  // namespace

std::string working_text(const Working& working, const config::Plant& plant, bool points) {
    std::string out = heading(working, plant) + std::string(page_width, '-') + '\n';
    int number = 0;
    for (const WorkChapter& chapter : working.chapters) {
        out += '\n' + paragraph(fmt::format("{}. ", ++number), printable(chapter.title));
        for (const std::string& remark : chapter.remarks) out += paragraph("  ", printable(remark));
        for (const WorkStep& step : chapter.steps) out += step_text(step);
    }
    if (!working.ends_because.empty())
        out += '\n' + paragraph("", "The working ends here: " + printable(working.ends_because));
    if (points) out += points_text(working, plant);
    out += std::string(page_width, '-') + '\n';
    out += paragraph("",
                     "Formulas: * times, ^ to the power of, ln natural and log10 common logarithm. Numbers carry six "
                     "significant digits.");
    for (const std::string& caution : cautions()) out += paragraph("! ", caution);
    return out;
}

ordered_json to_json(const Working& working) {
    ordered_json steps = ordered_json::array();
    ordered_json remarks = ordered_json::array();
    for (const WorkChapter& chapter : working.chapters) {
        for (const WorkStep& step : chapter.steps) steps.push_back(step_json(chapter, step));
        for (const std::string& remark : chapter.remarks)
            remarks.push_back({{"chapter", chapter.title}, {"text", remark}});
    }
    ordered_json points = ordered_json::array();
    for (const analytics::JudgedPoint& point : working.points) points.push_back(point_json(point));
    return {{"pump", working.pump},
            {"section", working.section},
            {"name", working.pump_name},
            {"basis", name_of(working.basis)},
            {"at", time_or_null(working.at)},
            {"summary", {{"from", time_or_null(working.summary_from)}, {"to", time_or_null(working.summary_to)}}},
            {"life", working.life},
            {"steps", steps},
            {"remarks", remarks},
            {"points", points},
            {"ends_because", text_or_null(working.ends_because)},
            {"cautions", cautions()}};
}

}  // namespace slipledger::report
