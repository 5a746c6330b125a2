#include "daemon/watch/notices.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <set>

#include "daemon/report/fingerprint.hpp"
#include "daemon/report/number.hpp"
#include "daemon/report/sentence.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::watch {
namespace {

using analytics::AlarmChange;
using analytics::DayVerdict;
using analytics::Instant;
using ledger::Notice;
using nlohmann::ordered_json;
using report::AlarmPlace;

AlarmPlace place_of(const NoticeContext& context) { return {context.pump.id, context.section.id, context.basis}; }

// What was known of the section when the change came: the newest day that was over by then.
const DayVerdict* day_before(const NoticeContext& context, Instant at) {
    const DayVerdict* found = nullptr;
    for (const DayVerdict& day : context.finished_days)
        if (day.day.end <= at) found = &day;
    return found;
}

report::SentenceFacts sentence_facts(const NoticeContext& context, const DayVerdict& day) {
    const Stretch& stretch = context.stretches[stretch_at(context.stretches, day.day.end - analytics::Milliseconds(1))];
    report::SentenceFacts facts;
    facts.type = stretch.pump.type;
    facts.section = context.section.id;
    facts.only_section = context.pump.sections.size() == 1;
    facts.basis = context.basis;
    facts.compared_with = report::compared_with(day.baseline, stretch.watched_from_new,
                                                report::local_date(context.first_reading, context.plant.time_zone));
    facts.temperature_known = context.temperature_known;
    facts.least_judged_h = stretch.section.baseline.min_h;
    facts.act_ratio = stretch.section.limits.leakage_ratio.act.value_or(analytics::unknown);
    facts.act_points_lost = stretch.section.limits.efficiency_points.act.value_or(analytics::unknown);
    facts.act_drain_share_percent = stretch.section.limits.drain_share_percent.act.value_or(analytics::unknown);
    facts.spare_in_stock = stretch.section.spare && stretch.section.spare->in_stock > 0;
    facts.time_zone = context.plant.time_zone;
    facts.verdict = day;
    return facts;
}

struct RuleWords {
    std::string_view what;
    std::string_view unit;
    std::string_view advice;
};

RuleWords words_of(analytics::Rule rule) {
    switch (rule) {
        case analytics::Rule::leakage_ratio: return {"leakage ratio", "", ""};
        case analytics::Rule::efficiency: return {"loss of volumetric efficiency", " points", ""};
        case analytics::Rule::hours_in_hand: return {"running hours in hand", " h", ""};
        case analytics::Rule::step_change: return {"step of the leakage ratio", "", ""};
        case analytics::Rule::drain_share:
            return {"case drain flow as a share of theoretical flow", " %", "Look at pressure and oil temperature first."};
        case analytics::Rule::over_temperature:
            return {"fluid temperature", " degC", "Check the cooler and the oil level."};
        case analytics::Rule::case_pressure:
            return {"case pressure", " bar", "Check the drain line and its filter for a blockage."};
        case analytics::Rule::inlet_vacuum:
            return {"inlet vacuum", " bar", "Check the suction line, strainer and oil level."};
        case analytics::Rule::instrument_suspect:
            return {"doubt about an instrument", "", "Check the instruments: the readings contradict each other."};
        case analytics::Rule::unrecorded_replacement:
            return {"leakage fell as if the part had been replaced, to a ratio of", "",
                    "If the part was replaced, say so: `slipledger replaced`; `slipledger health` gives the time."};
    }
    return {"", "", ""};
}

// Three digits at most, but never an exponent: "1.31", "69.8", "3110".
std::string short_number(double value) {
    return std::abs(value) >= 1000.0 ? fmt::format("{:.0f}", value) : fmt::format("{:.3g}", value);
}

// One line on the change itself: "Alarm raised, watch: leakage ratio 1.31, limit 1.17."
std::string headline(const AlarmChange& change) {
    const RuleWords words = words_of(change.rule);
    std::string line = fmt::format("Alarm {}, {}: {}", name_of(change.edge), name_of(change.level), words.what);
    if (std::isfinite(change.value)) line += fmt::format(" {}{}", short_number(change.value), words.unit);
    if (std::isfinite(change.limit)) line += fmt::format(", limit {}{}", short_number(change.limit), words.unit);
    return line + ".";
}

ordered_json hours_json(const analytics::HoursInHand& left) {
    return {{"low", report::number(left.low)},
            {"mid", report::number(left.mid)},
            {"high", report::number(left.high)},
            {"limit", left.limit.empty() ? ordered_json() : ordered_json(std::string(left.limit))}};
}

ordered_json begin_body(const NoticeContext& context, const std::string& id, const std::string& kind) {
    return {{"id", id},
            {"kind", kind},
            {"plant", context.plant.name},
            {"pump", context.pump.id},
            {"section", context.section.id},
            {"basis", std::string(name_of(context.basis))},
            {"name", context.pump.name},
            {"machine", context.pump.machine},
            {"area", context.pump.area}};
}

void add_judgement(ordered_json& body, const NoticeContext& context, const AlarmChange& change) {
    const std::string line = headline(change);
    const std::string advice(words_of(change.rule).advice);
    const DayVerdict* day = day_before(context, change.at);
    if (day == nullptr) {
        body["sentence"] = advice.empty() ? line : line + " " + advice;
        body["leakage_ratio"] = nullptr;
        body["hours_in_hand"] = nullptr;
        body["cause"] = nullptr;
        body["what_to_do"] = advice;
        return;
    }
    const report::SentenceFacts facts = sentence_facts(context, *day);
    body["sentence"] = line + " " + report::sentence(facts);
    body["leakage_ratio"] = report::ranged(day->leakage_ratio);
    body["hours_in_hand"] = hours_json(day->hours_in_hand);
    body["cause"] = std::string(name_of(day->cause));
    body["what_to_do"] = advice.empty() ? report::what_to_do(facts) : advice;
}

Notice begin_notice(const NoticeContext& context, std::string id, std::string kind) {
    Notice notice;
    notice.id = std::move(id);
    notice.pump = context.pump.id;
    notice.section = context.section.id;
    notice.kind = std::move(kind);
    return notice;
}

Notice tell(const NoticeContext& context, const AlarmChange& change) {
    const AlarmPlace place = place_of(context);
    Notice notice = begin_notice(context, notice_id(place, change), std::string(name_of(change.edge)));
    notice.episode = report::episode_id(place, change.rule, change.life, change.began);
    notice.level = std::string(name_of(change.level));
    notice.at = change.at;
    ordered_json body = begin_body(context, notice.id, notice.kind);
    body["episode"] = notice.episode;
    body["rule"] = std::string(name_of(change.rule));
    body["level"] = notice.level;
    body["life"] = change.life;
    body["time"] = report::rfc3339(change.at);
    body["raised"] = report::rfc3339(change.began);
    body["value"] = report::number(change.value);
    body["limit"] = report::number(change.limit);
    add_judgement(body, context, change);
    notice.body = body.dump(-1, ' ', false, ordered_json::error_handler_t::replace);
    return notice;
}

bool told_of_change(const Notice& notice) {
    return notice.kind == "raised" || notice.kind == "worsened" || notice.kind == "eased" || notice.kind == "returned";
}

// What makes two changes the same story told of another time.
struct Story {
    std::string rule;
    std::string kind;
    std::string level;
    std::int64_t life = 1;

    bool operator==(const Story&) const = default;
};

// A change that was told and is no longer found. Threads: a value, share freely.
struct Vanished {
    const Notice* notice = nullptr;
    Story story;
    const AlarmChange* moved_to = nullptr;
};

Story story_of(const AlarmChange& change) {
    return {std::string(name_of(change.rule)), std::string(name_of(change.edge)), std::string(name_of(change.level)),
            change.life};
}

bool is_of(const nlohmann::json& body, const NoticeContext& context) {
    return body.is_object() && body.value("section", "") == context.section.id &&
           body.value("basis", "") == name_of(context.basis);
}

std::vector<Vanished> vanished_of(const NoticeContext& context, const ChangesOfPass& changes,
                                  const std::set<std::string>& found) {
    std::vector<Vanished> vanished;
    for (const Notice& notice : changes.told) {
        const bool looked_at = notice.at >= changes.from && notice.at <= changes.to;
        if (!looked_at || !told_of_change(notice) || found.contains(notice.id)) continue;
        const auto body = nlohmann::json::parse(notice.body, nullptr, false);
        if (!is_of(body, context)) continue;
        vanished.push_back({&notice, {body.value("rule", ""), notice.kind, notice.level, body.value("life", 1)}, nullptr});
    }
    return vanished;
}

// Pairs what vanished with new changes that tell the same story of another time; what is left is news.
std::vector<const AlarmChange*> pair_up(std::vector<Vanished>& vanished, std::vector<const AlarmChange*> fresh) {
    for (Vanished& gone : vanished) {
        const auto same = std::ranges::find_if(
            fresh, [&](const AlarmChange* change) { return story_of(*change) == gone.story; });
        if (same == fresh.end()) continue;
        gone.moved_to = *same;
        fresh.erase(same);
    }
    return fresh;
}

Notice correct(const NoticeContext& context, const Vanished& gone) {
    const Notice& first = *gone.notice;
    Notice notice = begin_notice(context, report::fingerprint("corrected\n" + first.episode), "corrected");
    notice.episode = first.episode;
    notice.level = first.level;
    notice.at = first.at;
    ordered_json body = begin_body(context, notice.id, notice.kind);
    body["episode"] = notice.episode;
    body["corrects"] = first.id;
    body["rule"] = gone.story.rule;
    body["level"] = notice.level;
    body["life"] = gone.story.life;
    body["time"] = report::rfc3339(first.at);
    body["moved_to"] = gone.moved_to ? ordered_json(report::rfc3339(gone.moved_to->at)) : ordered_json();
    body["sentence"] = gone.moved_to
                           ? fmt::format("Late readings moved the alarm {} told as {}: it was {} {}.", gone.story.rule,
                                         first.kind, first.kind, report::local_minute(gone.moved_to->at, context.plant.time_zone))
                           : fmt::format("Late readings show that the alarm {} told as {} did not stand.", gone.story.rule,
                                         first.kind);
    notice.body = body.dump(-1, ' ', false, ordered_json::error_handler_t::replace);
    return notice;
}

}  // namespace

std::string notice_id(const AlarmPlace& place, const AlarmChange& change) {
    return report::fingerprint(fmt::format("{}\n{}\n{}\n{}", report::episode_id(place, change.rule, change.life, change.began),
                                           name_of(change.edge), name_of(change.level),
                                           change.at.time_since_epoch().count()));
}

std::vector<Notice> notices_of(const NoticeContext& context, const ChangesOfPass& changes) {
    const AlarmPlace place = place_of(context);
    std::set<std::string> known;  // stored by an earlier pass, or told
    for (const AlarmChange& change : changes.stored) known.insert(notice_id(place, change));
    for (const Notice& notice : changes.told) known.insert(notice.id);
    std::set<std::string> found;
    std::vector<const AlarmChange*> fresh;
    for (const AlarmChange& change : changes.now) {
        const std::string id = notice_id(place, change);
        found.insert(id);
        if (!known.contains(id)) fresh.push_back(&change);
    }
    std::vector<Vanished> vanished = vanished_of(context, changes, found);
    fresh = pair_up(vanished, std::move(fresh));
    std::vector<Notice> notices;
    for (const Vanished& gone : vanished) {
        Notice correction = correct(context, gone);
        if (known.insert(correction.id).second) notices.push_back(std::move(correction));
    }
    for (const AlarmChange* change : fresh) notices.push_back(tell(context, *change));
    return notices;
}

}  // namespace slipledger::watch
