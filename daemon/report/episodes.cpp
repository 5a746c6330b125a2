#include "daemon/report/episodes.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <nlohmann/json.hpp>

#include "daemon/report/fingerprint.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {
namespace {

using analytics::AlarmChange;
using analytics::AlarmEdge;
using analytics::Instant;
using ledger::Event;

// An operator's act, its body read.
struct Act {
    std::string kind;
    Instant at;
    std::string by;
    std::string rule;
    std::optional<std::int32_t> life;
    std::string why;
    std::optional<Instant> until;
};

std::string text_of(const nlohmann::json& body, const char* key) {
    const auto found = body.find(key);
    return found != body.end() && found->is_string() ? found->get<std::string>() : std::string();
}

Act read_act(const Event& event) {
    Act act{event.kind, event.at, event.by.empty() ? event.user : event.by, {}, {}, {}, {}};
    const nlohmann::json body = nlohmann::json::parse(event.body, nullptr, false);
    if (!body.is_object()) return act;
    act.rule = text_of(body, "rule");
    if (act.rule == "all") act.rule.clear();
    act.why = text_of(body, "why");
    act.until = instant_of(text_of(body, "until"));
    if (const auto life = body.find("life"); life != body.end() && life->is_number_integer())
        act.life = life->get<std::int32_t>();
    return act;
}

bool is_act(const std::string& kind) {
    return kind == "acknowledged" || kind == "shelved" || kind == "unshelved" || kind == "out-of-service" ||
           kind == "in-service";
}

std::vector<Act> acts_on(const AlarmPlace& place, std::span<const Event> events) {
    std::vector<Act> acts;
    for (const Event& event : events) {
        const bool here = event.pump == place.pump && (event.section.empty() || event.section == place.section);
        if (here && is_act(event.kind)) acts.push_back(read_act(event));
    }
    return acts;
}

bool speaks_of(const Act& act, const Episode& episode) {
    return (act.rule.empty() || act.rule == episode.rule) && (!act.life || *act.life == episode.life);
}

bool covers(const Episode& episode, Instant at) {
    return episode.raised <= at && (!episode.cleared || at < *episode.cleared);
}

void lay_over(Episode& episode, std::span<const Act> acts, Instant now) {
    bool out_of_service = false;
    for (const Act& act : acts) {
        if (!speaks_of(act, episode)) continue;
        if (act.kind == "acknowledged" && covers(episode, act.at)) {
            episode.acknowledged_by = act.by;
            episode.why = act.why;
        } else if (act.kind == "shelved" && (!act.until || *act.until > now)) {
            episode.shelved_until = act.until.value_or(Instant::max());
            episode.why = act.why;
        } else if (act.kind == "unshelved") {
            episode.shelved_until.reset();
        } else if (act.kind == "out-of-service" || act.kind == "in-service") {
            out_of_service = act.kind == "out-of-service";
            if (out_of_service) episode.why = act.why;
        }
    }
    if (episode.cleared) episode.state = "returned";
    else if (out_of_service) episode.state = "out of service";
    else if (episode.shelved_until) episode.state = "shelved";
    else episode.state = episode.acknowledged_by.empty() ? "unacknowledged" : "acknowledged";
}

Episode begin_of(const AlarmPlace& place, const AlarmChange& change) {
    Episode episode;
    episode.id = episode_id(place, change.rule, change.life, change.began);
    episode.pump = place.pump;
    episode.section = place.section;
    episode.basis = place.basis;
    episode.rule = std::string(name_of(change.rule));
    episode.raised = change.began;
    episode.life = change.life;
    return episode;
}

}  // namespace

std::string episode_id(const AlarmPlace& place, analytics::Rule rule, std::int32_t life, Instant began) {
    return fingerprint(fmt::format("{}\n{}\n{}\n{}\n{}\n{}", place.pump, place.section, name_of(place.basis),
                                   name_of(rule), life, began.time_since_epoch().count()));
}

std::vector<Episode> episodes_of(const AlarmPlace& place, std::span<const AlarmChange> changes,
                                 std::span<const Event> events, Instant now) {
    std::vector<Episode> episodes;
    for (const AlarmChange& change : changes) {
        const std::string id = episode_id(place, change.rule, change.life, change.began);
        auto found = std::ranges::find(episodes, id, &Episode::id);
        if (found == episodes.end()) found = episodes.insert(episodes.end(), begin_of(place, change));
        found->level = change.level;
        found->value = change.value;
        found->limit = change.limit;
        if (change.edge == AlarmEdge::returned) found->cleared = change.at;
    }
    const std::vector<Act> acts = acts_on(place, events);
    for (Episode& episode : episodes) lay_over(episode, acts, now);
    std::ranges::stable_sort(episodes, {}, &Episode::raised);
    return episodes;
}

}  // namespace slipledger::report
