#include "daemon/report/render_page.hpp"

#include <fmt/format.h>

#include "daemon/report/render_text.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {

namespace {

std::string page(std::string_view title, std::string_view body) {
    std::string foot;
    for (const std::string& caution : cautions()) foot += "<li>" + escaped(caution) + "</li>\n";
    return fmt::format(
        "<!doctype html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n"
        "<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n<title>{}</title>\n"
        "<link rel=\"stylesheet\" href=\"/web/page.css\">\n</head>\n<body>\n<main>\n{}</main>\n"
        "<footer>\n<h2>Before anyone touches a pump</h2>\n<ul>\n{}</ul>\n</footer>\n</body>\n</html>\n",
        escaped(title), body, foot);
}

std::string level_mark(analytics::Level level) {
    return fmt::format("<span class=\"level {0}\">{1}</span>", name_of(level), escaped(level_word(level, Paper{})));
}

std::string fleet_row(const SectionHealth& health) {
    const std::string name = health.only_section ? health.pump : health.pump + " / " + health.section;
    return fmt::format("<tr><td>{}</td><td><a href=\"/pumps/{}\">{}</a><br>{}</td><td>{}</td></tr>\n",
                       level_mark(health.level), escaped(health.pump), escaped(name), escaped(health.pump_name),
                       escaped(health.sentence));
}

}  // namespace

std::string escaped(std::string_view text) {
    std::string out;
    out.reserve(text.size());
    for (const char c : text) switch (c) {
            case '&': out += "&amp;"; break;
            case '<': out += "&lt;"; break;
            case '>': out += "&gt;"; break;
            case '"': out += "&quot;"; break;
            case '\'': out += "&#39;"; break;
            default: out += c;
        }
    return out;
}

std::string fleet_page(const std::vector<SectionHealth>& fleet, const config::Plant& plant) {
    std::string body = fmt::format("<h1>{}</h1>\n<table>\n<thead><tr><th>Level</th><th>Pump</th><th>Finding</th></tr></thead>\n<tbody>\n",
                                   escaped(plant.name));
    for (const SectionHealth& health : fleet) body += fleet_row(health);
    return page(plant.name, body + "</tbody>\n</table>\n");
}

std::string health_page(const PumpHealth& health, const config::Plant& plant) {
    std::string body = fmt::format("<p><a href=\"/\">{}</a></p>\n<h1>{}</h1>\n", escaped(plant.name), escaped(health.pump));
    for (const SectionHealth& section : health.sections) {
        body += fmt::format("<section>\n<h2>Section {}</h2>\n<p class=\"sentence\">{} {}</p>\n", escaped(section.section),
                            level_mark(section.level), escaped(section.sentence));
        body += "<pre>" + escaped(health_text(section, plant, Paper{})) + "</pre>\n</section>\n";
    }
    return page(health.pump, body);
}

}  // namespace slipledger::report
