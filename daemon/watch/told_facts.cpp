#include "daemon/watch/told_facts.hpp"

#include <algorithm>
#include <nlohmann/json.hpp>

#include "analytics/fluid.hpp"
#include "daemon/ledger/event_body.hpp"
#include "daemon/watch/past_facts.hpp"
#include "daemon/watch/section_spec.hpp"

namespace slipledger::watch {
namespace {

using analytics::FactChange;
using analytics::Instant;
using analytics::Quantity;
using config::Fluid;
using ledger::Event;

bool tells_of_oil(const Event& event) {
    return event.kind == "oil-changed" || event.kind == "oil-sample";
}

bool is_of_section(const Event& event, std::string_view section) {
    return event.section.empty() || event.section == section;
}

// Of the pump itself or of the reservoir it draws from.
bool is_of_its_oil(const Event& event, const config::Pump& pump) {
    return tells_of_oil(event) && (event.pump == pump.id || ledger::reservoir_of(event) == pump.reservoir);
}

// The same index where only the viscosity at 40 degC was measured.
double at_100_by_index(const Fluid& fluid, double at_40_cst) {
    const analytics::Fluid oil = oil_of(fluid).value_or(analytics::Fluid());
    const double index = analytics::viscosity_index(oil.kinematic_cst(40.0), oil.kinematic_cst(100.0));
    return analytics::viscosity_at_100_cst(at_40_cst, index);
}

Fluid filled(Fluid before, const nlohmann::json& facts) {
    Fluid fluid = with_fluid_facts(before, facts.dump());
    return oil_of(fluid) ? fluid : before;
}

Fluid sampled(Fluid fluid, const nlohmann::json& body) {
    const double at_40 = ledger::number_in(body, "viscosity_40_cst").value_or(analytics::unknown);
    const double at_100 = ledger::number_in(body, "viscosity_100_cst").value_or(at_100_by_index(fluid, at_40));
    if (!analytics::Fluid::from_points({40.0, at_40}, {100.0, at_100})) return fluid;
    fluid.points = {{40.0, at_40}, {100.0, at_100}};
    fluid.iso_vg.reset();
    fluid.viscosity_index.reset();
    return fluid;
}

bool same_setting(const config::Section& a, const config::Section& b) {
    return a.compensator_bar == b.compensator_bar && a.relief_bar == b.relief_bar &&
           a.max_stroke_fraction == b.max_stroke_fraction && a.full_stroke == b.full_stroke &&
           a.case_flushing_lpm == b.case_flushing_lpm;
}

std::uint16_t bit(Quantity quantity) {
    return static_cast<std::uint16_t>(1U << analytics::index_of(quantity));
}

}  // namespace

config::Pump PlantFileFacts::at(Instant at) const {
    const auto after = std::ranges::upper_bound(facts_, at, {}, &ledger::FactsFrom::at);
    if (after == facts_.end()) return today_;
    return with_facts(today_, after == facts_.begin() ? after->facts : std::prev(after)->facts);
}

template <typename Same>
Instant PlantFileFacts::said_since(Instant at, Same same) const {
    for (std::size_t i = facts_.size(); i-- > 1;)
        if (facts_[i].at <= at && !same(this->at(facts_[i - 1].at), this->at(facts_[i].at))) return facts_[i].at;
    return Instant::min();
}

Instant PlantFileFacts::oil_since(Instant at) const {
    return said_since(at, [](const config::Pump& before, const config::Pump& after) {
        return before.fluid == after.fluid && before.reservoir == after.reservoir;
    });
}

Instant PlantFileFacts::setting_since(Instant at, std::string_view section) const {
    return said_since(at, [&](const config::Pump& before, const config::Pump& after) {
        return before.find_section(section)->compensator_bar == after.find_section(section)->compensator_bar;
    });
}

Fluid told_oil(const config::Pump& pump, std::span<const Event> events, Instant since, Instant at) {
    Fluid fluid = pump.fluid;
    for (const Event& event : events) {
        if (event.at < since || event.at > at || !is_of_its_oil(event, pump)) continue;
        const nlohmann::json body = ledger::body_of(event);
        if (event.kind == "oil-sample")
            fluid = sampled(std::move(fluid), body);
        else if (body.contains("fluid"))
            fluid = filled(std::move(fluid), body["fluid"]);
    }
    return fluid;
}

std::optional<ToldSetting> told_setting(std::string_view section, std::span<const Event> events, Instant since,
                                        Instant at) {
    std::optional<ToldSetting> told;
    for (const Event& event : events) {
        if (event.at < since || event.at > at || event.kind != "compensator-set" || !is_of_section(event, section))
            continue;
        const auto bar = ledger::number_in(ledger::body_of(event), "bar");
        if (bar && *bar > 0.0) told = ToldSetting{*bar, event.at};
    }
    return told;
}

FactChange change_between(const config::Pump& before, const config::Pump& after, std::string_view section,
                          std::span<const Event> events, Instant at) {
    const config::Section& was = *before.find_section(section);
    const config::Section& is = *after.find_section(section);
    FactChange change;
    change.oil = !(before.fluid == after.fluid);
    change.setting = !same_setting(was, is);
    for (const Event& event : events) {
        const bool elsewhere = event.pump.empty() && ledger::reservoir_of(event) != after.reservoir;
        if (event.at != at || elsewhere || !is_of_section(event, section)) continue;
        change.oil = change.oil || is_of_its_oil(event, after);
        change.setting = change.setting || event.kind == "compensator-set";
        if (event.kind != "instrument-changed") continue;
        const auto quantity = analytics::quantity_named(ledger::text_in(ledger::body_of(event), "quantity"));
        if (quantity) change.instruments = static_cast<std::uint16_t>(change.instruments | bit(*quantity));
    }
    change.oil_by_label = change.oil && (before.fluid.points.empty() || after.fluid.points.empty());
    return change;
}

}  // namespace slipledger::watch
