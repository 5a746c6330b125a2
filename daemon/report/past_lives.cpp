#include "daemon/report/past_lives.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <map>

#include "analytics/stats/quantile.hpp"
#include "daemon/ledger/lives.hpp"

namespace slipledger::report {
namespace {

using analytics::Basis;
using analytics::Hindsight;

constexpr double enough_hours = 100.0;  // below it a rate per 1000 h says nothing

// The more urgent of the two bases speaks, as everywhere.
void take_last_day(const ledger::Reader& reader, const ledger::Directory& directory, PastLife& life) {
    for (const Basis basis : {Basis::case_drain, Basis::delivery}) {
        const ledger::TrackEntry& track = directory.track(life.pump, life.section, basis);
        const auto day = reader.last_day_of_life(track.id, life.number, std::numeric_limits<std::int32_t>::max());
        if (!day || day->verdict.reason == analytics::UnjudgedReason::no_basis) continue;
        if (life.verdict && day->verdict.level <= life.verdict->level) continue;
        life.basis = basis;
        life.verdict = day->verdict;
    }
}

void take_wear(PastLife& life) {
    if (!life.verdict || !(life.verdict->life_running_h >= enough_hours)) return;
    life.wear_per_1000_h = (life.verdict->leakage_ratio.value - 1.0) * 1000.0 / life.verdict->life_running_h;
}

std::vector<PastLife> lives_of(const ledger::Reader& reader, const ledger::Directory& directory,
                               const config::Pump& pump) {
    const std::vector<ledger::Event> events = reader.events(pump.id);
    const std::vector<ledger::FactsFrom> facts = ledger::facts_of(events);
    std::vector<PastLife> lives;
    for (const config::Section& section : pump.sections)
        for (const ledger::Life& told : ledger::lives_of(events, section.id)) {
            PastLife& life = lives.emplace_back();
            life.pump = pump.id;
            life.section = section.id;
            life.model = ledger::model_of(told, facts, section);
            life.number = told.number;
            life.from = told.since;
            life.to = told.ended;
            life.found = told.found;
            life.note = told.note;
            take_last_day(reader, directory, life);
            take_wear(life);
            if (told.ended && life.verdict)
                life.hindsight = analytics::in_hindsight(life.verdict->level, analytics::found_named(told.found));
        }
    return lives;
}

void sum_up(ModelLives& model) {
    std::vector<double> hours;
    std::vector<double> wear;
    for (const PastLife& life : model.lives) {
        model.right += life.hindsight == Hindsight::right ? 1 : 0;
        model.late += life.hindsight == Hindsight::late ? 1 : 0;
        model.wrong += life.hindsight == Hindsight::wrong ? 1 : 0;
        if (!life.to) continue;
        ++model.ended;
        if (life.verdict) hours.push_back(life.verdict->life_running_h);
        if (std::isfinite(life.wear_per_1000_h)) wear.push_back(life.wear_per_1000_h);
    }
    if (!hours.empty()) model.median_hours = analytics::stats::median(std::move(hours));
    if (!wear.empty()) model.median_wear_per_1000_h = analytics::stats::median(std::move(wear));
}

}  // namespace

std::vector<ModelLives> query_lives(const ledger::Reader& reader, const config::Plant& plant, const config::Pump* pump,
                                    const std::optional<std::string>& model) {
    const ledger::Directory directory = reader.directory();
    std::map<std::string, ModelLives> by_model;
    for (const config::Pump& each : plant.pumps) {
        if (pump != nullptr && each.id != pump->id) continue;
        for (PastLife& life : lives_of(reader, directory, each)) {
            if (model && life.model != *model) continue;
            ModelLives& same = by_model[life.model];
            same.model = life.model;
            same.lives.push_back(std::move(life));
        }
    }
    std::vector<ModelLives> models;
    for (auto& [name, lives] : by_model) {
        sum_up(lives);
        models.push_back(std::move(lives));
    }
    std::ranges::stable_partition(models, [](const ModelLives& lives) { return !lives.model.empty(); });
    return models;
}

}  // namespace slipledger::report
