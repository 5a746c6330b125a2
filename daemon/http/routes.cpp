#include "daemon/http/routes.hpp"

#include <fmt/format.h>

#include <array>
#include <boost/url/parse.hpp>
#include <boost/url/url_view.hpp>
#include <nlohmann/json.hpp>
#include <optional>
#include <vector>

#include "daemon/http/embedded.hpp"
#include "daemon/http/metrics.hpp"
#include "daemon/report/health_query.hpp"
#include "daemon/report/history.hpp"
#include "daemon/report/render_json.hpp"
#include "daemon/report/render_page.hpp"

namespace slipledger::http {

namespace {

// A parsed request with what its path named.
struct Request {
    std::string pump;
    boost::urls::url_view url;
    const ledger::Reader& reader;
    const config::Plant& plant;
};

std::optional<std::string> parameter(const Request& request, std::string_view name) {
    const auto params = request.url.params();
    const auto found = params.find(name);
    if (found == params.end()) return std::nullopt;
    return std::string((*found).value);
}

Answer json_answer(const nlohmann::ordered_json& value) {
    constexpr auto replace = nlohmann::ordered_json::error_handler_t::replace;
    return Answer{200, "application/json", value.dump(2, ' ', false, replace) + "\n"};
}

Answer html_answer(std::string body) { return Answer{200, "text/html; charset=utf-8", std::move(body)}; }

Answer fleet_api(const Request& request) {
    return json_answer(report::to_json(report::query_fleet(request.reader, request.plant)));
}

Answer fleet_html(const Request& request) {
    return html_answer(report::fleet_page(report::query_fleet(request.reader, request.plant), request.plant));
}

Answer metrics_text(const Request& request) {
    return Answer{200, "application/openmetrics-text; version=1.0.0; charset=utf-8",
                  open_metrics(report::query_fleet(request.reader, request.plant), request.reader)};
}

Answer alive(const Request& /*request*/) { return Answer{200, "text/plain; charset=utf-8", "alive\n"}; }

// Ready: the ledger answers.
Answer ready(const Request& request) {
    static_cast<void>(request.reader.newest_of_plant());
    return Answer{200, "text/plain; charset=utf-8", "ready\n"};
}

Answer style(const Request& /*request*/) {
    for (const Text& text : embedded_texts())
        if (text.name == "page.css") return Answer{200, "text/css; charset=utf-8", std::string(text.text)};
    return problem(404, "Not here", "the style sheet was left out of this build");
}

Answer unknown_pump(const Request& request) {
    return problem(404, "No such pump", fmt::format("the plant file has no pump \"{}\"", request.pump));
}

Answer health_api(const Request& request) {
    const config::Pump* pump = request.plant.find_pump(request.pump);
    if (pump == nullptr) return unknown_pump(request);
    return json_answer(report::to_json(report::query_health(request.reader, request.plant, *pump)));
}

Answer health_html(const Request& request) {
    const config::Pump* pump = request.plant.find_pump(request.pump);
    if (pump == nullptr) return unknown_pump(request);
    return html_answer(report::health_page(report::query_health(request.reader, request.plant, *pump), request.plant));
}

Answer history_api(const Request& request) {
    const config::Pump* pump = request.plant.find_pump(request.pump);
    if (pump == nullptr) return unknown_pump(request);
    const std::optional<std::string> section = parameter(request, "section");
    if (section && pump->find_section(*section) == nullptr)
        return problem(400, "No such section", fmt::format("pump {} has no section \"{}\"", request.pump, *section));
    const std::string by = parameter(request, "by").value_or("day");
    if (by != "day" && by != "summary") return problem(400, "Foul parameter", "\"by\" is \"day\" or \"summary\"");
    const bool by_summary = by == "summary";
    return json_answer(report::to_json(by_summary ? report::history_by_summary(request.reader, *pump, section)
                                                  : report::history_by_day(request.reader, *pump, section)));
}

struct Route {
    std::string_view before;  // path, or what stands before the pump's id
    std::string_view after;   // what stands behind it
    bool names_pump;
    Answer (*handler)(const Request&);
};

constexpr std::array<Route, 9> routes{{
    {"/", "", false, fleet_html},
    {"/pumps/", "", true, health_html},
    {"/web/page.css", "", false, style},
    {"/api/fleet", "", false, fleet_api},
    {"/api/pumps/", "/health", true, health_api},
    {"/api/pumps/", "/history", true, history_api},
    {"/metrics", "", false, metrics_text},
    {"/healthz", "", false, alive},
    {"/readyz", "", false, ready},
}};

// The pump's id where the path fits the route; empty where the route names none.
std::optional<std::string> fit(const Route& route, std::string_view path) {
    if (!route.names_pump) return path == route.before ? std::optional<std::string>("") : std::nullopt;
    if (!path.starts_with(route.before) || !path.ends_with(route.after)) return std::nullopt;
    if (path.size() <= route.before.size() + route.after.size()) return std::nullopt;
    path.remove_prefix(route.before.size());
    path.remove_suffix(route.after.size());
    if (path.find('/') != std::string_view::npos) return std::nullopt;
    return std::string(path);
}

}  // namespace

Answer problem(unsigned status, std::string_view title, std::string_view detail) {
    const nlohmann::ordered_json details{{"type", "about:blank"}, {"title", title}, {"status", status}, {"detail", detail}};
    constexpr auto replace = nlohmann::ordered_json::error_handler_t::replace;
    return Answer{status, "application/problem+json", details.dump(-1, ' ', false, replace) + "\n"};
}

Answer answer(std::string_view target, const ledger::Reader& reader, const config::Plant& plant) {
    const auto url = boost::urls::parse_origin_form(target);
    if (!url) return problem(400, "Foul target", "the request target is not a path with an optional query");
    const std::string path = url->path();
    for (const Route& route : routes)
        if (const std::optional<std::string> pump = fit(route, path))
            return route.handler(Request{*pump, *url, reader, plant});
    return problem(404, "Not here", "see /api/fleet, /api/pumps/ID/health, /api/pumps/ID/history, /metrics");
}

}  // namespace slipledger::http
