#include "daemon/report/render_lives.hpp"

#include <fmt/format.h>

#include <cmath>
#include <nlohmann/json.hpp>

#include "daemon/report/number.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {

using nlohmann::ordered_json;

namespace {

std::string plain(double value, const char* format) {
    return std::isfinite(value) ? fmt::format(fmt::runtime(format), value) : std::string("-");
}

std::string life_line(const PastLife& life, const config::Plant& plant, const Paper& paper) {
    const analytics::DayVerdict day = life.verdict.value_or(analytics::DayVerdict{});
    const bool judged = life.verdict.has_value();
    const std::string hindsight(name_of(life.hindsight));
    return fmt::format("{} {:>4} {} {:>6} {:>5} {:>6} {} {} {}\n", cell(printable(life.pump + "/" + life.section), 18),
                       life.number, cell(life.to ? local_date(*life.to, plant.time_zone) : "in service", 10),
                       judged ? fmt::format("{:.0f}", day.life_running_h) : "-",
                       plain(day.leakage_ratio.value, "{:.2f}"), plain(life.wear_per_1000_h, "{:+.2f}"),
                       level_word(day.level, paper), cell(life.found.empty() ? "-" : printable(life.found), 7),
                       hindsight.empty() ? "-" : hindsight);
}

std::string counted_verdicts(const ModelLives& model) {
    const std::size_t told = model.right + model.late + model.wrong;
    if (told == 0) return "nobody said what was found";
    return fmt::format("last verdict right in {} of {}{}", model.right, told,
                       model.late > 0 ? fmt::format(", late in {}", model.late) : std::string());
}

std::string model_heading(const ModelLives& model) {
    const std::string name = model.model.empty() ? "no model told" : "model " + printable(model.model);
    if (model.ended == 0) return paragraph("", name + ": no life has ended yet");
    return paragraph("", fmt::format("{}: {} ended, median {} running hours, wear {} in ratio per 1000 h; {}", name,
                                     model.ended, plain(model.median_hours, "{:.0f}"),
                                     plain(model.median_wear_per_1000_h, "{:+.2f}"), counted_verdicts(model)));
}

ordered_json time_or_null(const std::optional<Instant>& at) {
    return at ? ordered_json(rfc3339(*at)) : ordered_json(nullptr);
}
ordered_json text_or_null(const std::string& text) {
    return text.empty() ? ordered_json(nullptr) : ordered_json(text);
}

ordered_json life_json(const PastLife& life) {
    const analytics::DayVerdict day = life.verdict.value_or(analytics::DayVerdict{});
    return {{"pump", life.pump},
            {"section", life.section},
            {"life", life.number},
            {"from", time_or_null(life.from)},
            {"to", time_or_null(life.to)},
            {"running_hours", life.verdict ? number(day.life_running_h) : ordered_json(nullptr)},
            {"basis", life.basis ? ordered_json(name_of(*life.basis)) : ordered_json(nullptr)},
            {"baseline", life.verdict ? ordered_json(name_of(day.baseline)) : ordered_json(nullptr)},
            {"leakage_ratio", ranged(day.leakage_ratio)},
            {"wear_per_1000_h", number(life.wear_per_1000_h)},
            {"level", name_of(day.level)},
            {"cause", text_or_null(day.cause == analytics::CauseKind::none ? "" : std::string(name_of(day.cause)))},
            {"found", text_or_null(life.found)},
            {"verdict_was", text_or_null(std::string(name_of(life.hindsight)))},
            {"note", text_or_null(life.note)}};
}

}  // namespace

std::string lives_text(const std::vector<ModelLives>& models, const config::Plant& plant, const Paper& paper) {
    std::string out;
    for (const ModelLives& model : models) {
        out += model_heading(model);
        out += fmt::format("{} {:>4} {} {:>6} {:>5} {:>6} {} {} {}\n", cell("pump/section", 18), "life",
                           cell("until", 10), "hours", "ratio", "/1000h", cell("level", 12), cell("found", 7), "was");
        for (const PastLife& life : model.lives) out += life_line(life, plant, paper);
        out += '\n';
    }
    return out +
           paragraph("",
                     "Ratio and level as on the last finished day of the life; `was`: that verdict beside what was "
                     "found: right, late or wrong.");
}

ordered_json to_json(const std::vector<ModelLives>& models) {
    ordered_json out = ordered_json::array();
    for (const ModelLives& model : models) {
        ordered_json lives = ordered_json::array();
        for (const PastLife& life : model.lives) lives.push_back(life_json(life));
        out.push_back({{"model", text_or_null(model.model)},
                       {"ended", model.ended},
                       {"median_hours", number(model.median_hours)},
                       {"median_wear_per_1000_h", number(model.median_wear_per_1000_h)},
                       {"right", model.right},
                       {"late", model.late},
                       {"wrong", model.wrong},
                       {"lives", lives}});
    }
    return {{"models", out}};
}

}  // namespace slipledger::report
