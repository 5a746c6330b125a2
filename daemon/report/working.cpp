#include "daemon/report/working.hpp"

#include <cmath>

#include "daemon/report/working_chapters.hpp"
#include "daemon/report/working_facts.hpp"

namespace slipledger::report {

namespace {

// As far as the readings go: without a pressure or a temperature some of it cannot be worked out.
void write_point(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::JudgedPoint& point = facts.point->point;
    write_readings(facts, sheet);
    write_regime(facts, sheet);
    write_oil_line(facts, sheet);
    if (std::isfinite(point.viscosity_cst)) write_oil_at(facts, sheet, point.temperature_c, "");
    write_reference(facts, sheet);
    if (std::isfinite(point.leakage_lpm)) write_leakage_seen(facts, sheet);
    if (std::isfinite(point.features.laminar + point.features.speed)) write_features(facts, sheet);
}

// Why the page goes no further; empty: it came to its end.
std::string write_page(const WorkingFacts& facts, WorkSheet& sheet) {
    if (!facts.record) return facts.nothing_because;
    if (facts.point) {
        write_point(facts, sheet);
    } else {
        sheet.chapter("Raw readings");
        sheet.remark(facts.remark);
        write_oil_line(facts, sheet);
        write_reference(facts, sheet);
    }
    if (const Stop stop = write_summary(facts, sheet)) return *stop;
    if (const Stop stop = write_estimate(facts, sheet)) return *stop;
    write_ratio(facts, sheet);
    write_efficiency(facts, sheet);
    write_losses(facts, sheet);
    write_hours_in_hand(facts, sheet);
    write_level(facts, sheet);
    write_cost(facts, sheet);
    return {};
}

}  // namespace

Working working_of(const WorkingFacts& facts) {
    Working working;
    working.pump = facts.pump.id;
    working.section = facts.section.id;
    working.pump_name = facts.pump.name;
    working.only_section = facts.pump.sections.size() == 1;
    working.basis = facts.basis;
    if (facts.point) working.at = facts.point->point.time;
    if (facts.record) {
        const analytics::Summary& summary = facts.record->summary;
        working.summary_from = summary.start;
        working.summary_to = summary.start + summary.length;
        working.life = summary.life;
    }
    working.points = facts.points;
    WorkSheet sheet;
    working.ends_because = write_page(facts, sheet);
    working.chapters = sheet.take();
    return working;
}

}  // namespace slipledger::report
