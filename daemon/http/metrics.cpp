#include "daemon/http/metrics.hpp"

#include <fmt/format.h>

#include <cmath>
#include <functional>

namespace slipledger::http {

namespace {

// A label's value with the three characters escaped that OpenMetrics wants escaped.
std::string label(std::string_view text) {
    std::string out;
    for (const char c : text) {
        if (c == '\\' || c == '"') out += '\\';
        if (c == '\n') {
            out += "\\n";
            continue;
        }
        out += c;
    }
    return out;
}

using Value = std::function<double(const report::SectionHealth&)>;

std::string gauge(std::string_view name, std::string_view help, const std::vector<report::SectionHealth>& fleet,
                  const Value& value) {
    std::string out = fmt::format("# TYPE {0} gauge\n# HELP {0} {1}\n", name, help);
    for (const report::SectionHealth& section : fleet) {
        const double x = value(section);
        if (std::isfinite(x))
            out += fmt::format("{}{{pump=\"{}\",section=\"{}\"}} {:.6g}\n", name, label(section.pump),
                               label(section.section), x);
    }
    return out;
}

analytics::DayVerdict day_of(const report::SectionHealth& section) {
    return section.verdict.value_or(analytics::DayVerdict{});
}

}  // namespace

std::string open_metrics(const std::vector<report::SectionHealth>& fleet, const ledger::Reader& reader) {
    std::string out = gauge("slipledger_level", "0 unjudged, 1 sound, 2 watch, 3 plan, 4 act.", fleet,
                            [](const auto& section) { return static_cast<double>(section.level); });
    out += gauge("slipledger_leakage_ratio", "Leakage now over leakage when healthy.", fleet,
                 [](const auto& section) { return day_of(section).leakage_ratio.value; });
    out += gauge("slipledger_volumetric_efficiency", "Fraction, at the rated point.", fleet,
                 [](const auto& section) { return day_of(section).efficiency.value; });
    out += gauge("slipledger_hours_in_hand_low", "Running hours to the act limit, 10 % quantile.", fleet,
                 [](const auto& section) { return day_of(section).hours_in_hand.low; });
    out += "# TYPE slipledger_refused_rows counter\n# HELP slipledger_refused_rows Rows and cells refused, by feed.\n";
    for (const ledger::FeedState& feed : reader.feeds())
        out += fmt::format("slipledger_refused_rows_total{{feed=\"{}\"}} {}\n", label(feed.feed), feed.refused);
    return out + "# EOF\n";
}

}  // namespace slipledger::http
