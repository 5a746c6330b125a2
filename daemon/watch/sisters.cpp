#include "daemon/watch/sisters.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <map>
#include <nlohmann/json.hpp>
#include <utility>

#include "daemon/watch/stretches.hpp"

namespace slipledger::watch {
namespace {

using analytics::BaselineKind;
using analytics::DayVerdict;
using ledger::LifePriorRecord;
using ledger::TrackId;
using nlohmann::json;

constexpr double well_known = 0.2;  // sd of ln healthy leakage: a looser baseline helps nobody

// Only a baseline that says what new is; one that was handed on by sisters says nothing new.
bool says_what_new_is(const DayVerdict& day) {
    return day.baseline == BaselineKind::from_new || day.baseline == BaselineKind::maker_test ||
           day.baseline == BaselineKind::reference_test;
}

bool is_settled(const DayVerdict& day) {
    return day.learning_h_left <= 0.0 && day.life_judged_h > 0.0 && day.healthy_sd <= well_known &&
           std::isfinite(day.healthy.laminar + day.healthy.orifice + day.healthy.speed);
}

// From the start of a life that is over to its act limit, run and foretold; hardly known where it showed no trend.
analytics::PastLife past_life(const DayVerdict& last) {
    constexpr double quantiles_apart = 2.0 * 1.2815515655446004;  // of 10 and 90 %, in standard deviations
    const analytics::HoursInHand& left = last.hours_in_hand;
    const double run = last.life_running_h;
    analytics::PastLife life{run + left.low, analytics::LifePrior{}.ln_sd, last.state.laws};
    if (!last.trend.established || !std::isfinite(left.mid + left.high) || !(run > 0.0)) return life;
    life.life_h = run + left.mid;
    life.ln_sd = std::log((run + left.high) / (run + left.low)) / quantiles_apart;
    return life;
}

bool has_run(const analytics::PastLife& life) { return std::isfinite(life.life_h) && life.life_h > 0.0; }

double number_at(const json& sister, const char* key) {
    const auto found = sister.find(key);
    return found != sister.end() && found->is_number() ? found->get<double>() : analytics::unknown;
}

}  // namespace

const std::vector<Sisters::Life>& Sisters::lives() const {
    if (!lives_.empty()) return lives_;
    std::map<std::string, std::vector<ledger::Event>> events;
    for (ledger::Event& event : reader_.events(""))
        if (!event.pump.empty()) events[event.pump].push_back(std::move(event));
    for (const config::Pump& pump : plant_.pumps)
        for (const config::Section& section : pump.sections) add_lives(pump, section, events[pump.id]);
    return lives_;
}

void Sisters::add_lives(const config::Pump& pump, const config::Section& section,
                        const std::vector<ledger::Event>& events) const {
    const auto dated = std::ranges::count_if(
        events, [](const ledger::Event& event) { return event.kind == "replaced" || event.kind == "plant-changed"; });
    if (dated <= 1) {  // most pumps: one life, as the plant file has always had it
        lives_.push_back({pump.id, section.id, 1, section.model, section.displacement_cm3});
        return;
    }
    std::int32_t last = 0;
    for (const Stretch& stretch : stretches_of(pump, section, events, std::nullopt)) {
        if (stretch.life.number == last) continue;
        last = stretch.life.number;
        lives_.push_back({pump.id, section.id, last, model_of(stretch), displacement_of(stretch)});
    }
}

const ledger::TrackEntry& Sisters::track(TrackId id) const {
    return *std::ranges::find(directory_.tracks, id, &ledger::TrackEntry::id);
}

std::optional<ledger::DayRecord> Sisters::day_before(TrackId track, std::int32_t life, std::int32_t date,
                                                     std::span<const FreshDays> fresh) const {
    const auto anew = std::ranges::find(fresh, track, &FreshDays::track);
    if (anew == fresh.end()) return reader_.last_day_of_life(track, life, date);
    for (std::size_t i = anew->days.size(); i-- > 0;) {
        const ledger::DayRecord& day = anew->days[i];
        if (day.finished && day.verdict.life == life && day.verdict.day.date < date) return day;
    }
    return reader_.last_day_of_life(track, life, std::min(date, anew->from_date));
}

std::string Sisters::told_to(const AskingLife& asking, std::span<const FreshDays> fresh) const {
    if (asking.model.empty()) return "[]";
    std::map<std::pair<TrackId, std::int32_t>, json> said;
    for (const Life& life : lives()) {
        if (life.model != asking.model) continue;
        const TrackId id = directory_.track(life.pump, life.section, asking.track.basis).id;
        if (id == asking.track.id && life.number == asking.life) continue;
        const auto day = day_before(id, life.number, asking.date, fresh);
        if (!day) continue;
        json says{{"track", static_cast<std::int32_t>(id)}, {"life", life.number}};
        if (is_settled(day->verdict) && says_what_new_is(day->verdict)) {
            says["laminar"] = day->verdict.healthy.laminar;
            says["orifice"] = day->verdict.healthy.orifice;
            says["speed"] = day->verdict.healthy.speed;
            says["sd"] = day->verdict.healthy_sd;
            says["displacement_cm3"] = life.displacement_cm3;
        }
        const bool own = id == asking.track.id && life.number < asking.life;
        const bool over = own || day_before(id, life.number + 1, asking.date, fresh);
        if (const analytics::PastLife past = past_life(day->verdict); over && has_run(past)) {
            says["life_h"] = past.life_h;
            says["life_ln_sd"] = past.ln_sd;
            says["laws"] = past.laws;
        }
        if (says.size() > 2) said[{id, life.number}] = std::move(says);
    }
    json told = json::array();  // in an order that the plant file's does not change
    for (auto& [who, figures] : said) told.push_back(std::move(figures));
    return told.dump();
}

std::vector<std::string> Sisters::models_of(std::span<const FreshDays> fresh) const {
    std::vector<std::string> models;
    for (const FreshDays& days : fresh) {
        const ledger::TrackEntry& entry = track(days.track);
        for (const Life& life : lives())
            if (life.pump == entry.pump_name && life.section == entry.section && !life.model.empty())
                models.push_back(life.model);
    }
    return models;
}

std::vector<LifePriorRecord> Sisters::told_otherwise(std::span<const LifePriorRecord> priors,
                                                     std::span<const FreshDays> fresh) const {
    std::int32_t from = std::numeric_limits<std::int32_t>::max();
    for (const FreshDays& days : fresh) from = std::min(from, days.from_date);
    std::vector<LifePriorRecord> touched(priors.begin(), priors.end());  // none without a model
    for (LifePriorRecord& prior : reader_.life_priors_after(from)) {
        const auto anew = std::ranges::find(fresh, prior.track, &FreshDays::track);
        if (anew == fresh.end() || prior.date < anew->from_date) touched.push_back(std::move(prior));
    }
    if (touched.empty()) return touched;
    const std::vector<std::string> models = models_of(fresh);
    std::erase_if(touched, [&](const LifePriorRecord& prior) {
        const bool of_a_model = std::ranges::find(models, prior.model) != models.end();
        const bool told_before =
            std::ranges::any_of(json::parse(prior.sisters, nullptr, false), [&](const json& sister) {
                return std::ranges::find(fresh, TrackId(sister.value("track", 0)), &FreshDays::track) != fresh.end();
            });
        if (!of_a_model && !told_before) return true;
        return told_to({track(prior.track), prior.life, prior.model, prior.date}, fresh) == prior.sisters;
    });
    return touched;
}

std::vector<analytics::PastLife> past_lives_in(const std::string& told) {
    std::vector<analytics::PastLife> lives;
    for (const json& sister : json::parse(told, nullptr, false))
        if (sister.contains("life_h"))
            lives.push_back({number_at(sister, "life_h"), number_at(sister, "life_ln_sd"),
                             sister.value("laws", analytics::LawWeights{})});
    return lives;
}

std::vector<analytics::Sister> sisters_in(const std::string& told) {
    std::vector<analytics::Sister> sisters;
    for (const json& sister : json::parse(told, nullptr, false))
        if (sister.contains("laminar"))
            sisters.push_back({{number_at(sister, "laminar"), number_at(sister, "orifice"), number_at(sister, "speed")},
                           number_at(sister, "sd"),
                           number_at(sister, "displacement_cm3")});
    return sisters;
}

}  // namespace slipledger::watch
