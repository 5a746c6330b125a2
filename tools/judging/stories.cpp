#include "tools/judging/stories.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

#include "tools/judging/confounding.hpp"
#include "tools/judging/papers.hpp"

namespace slipledger::judging {
namespace {

using plantsim::day_ms;
using plantsim::minute_ms;
using plantsim::PlantDrawing;
using plantsim::second_ms;
using plantsim::Wear;
using plantsim::WearLaw;

constexpr Millis new_year_2024 = 1704067200000;
constexpr double days_a_year = 365.25;
constexpr std::size_t most_fast_loggers = 5;

// Threads: one at a time, for one story.
class Teller {
public:
    Teller(Fleet fleet, std::size_t number, const Telling& telling)
        : telling_(telling), dice_(telling.seed, fmt::format("{}/{}", name_of(fleet), number)) {
        story_.fleet = fleet;
        story_.number = number;
        story_.seed = dice_.seed();
    }

    Story tell() {
        set_calendar();
        switch (story_.fleet) {
            case Fleet::healthy:
                healthy();
                break;
            case Fleet::wear:
                worn();
                break;
            case Fleet::step:
                broken();
                break;
            case Fleet::confounded:
                confounded(confounder_of(story_.number));
                break;
            case Fleet::mixed:
                mixed();
                break;
            case Fleet::hard:
                hard();
                break;
            case Fleet::double_pumps:
                double_pump();
                break;
            case Fleet::taken_over:
                taken_over();
                break;
            case Fleet::second_life:
                second_life();
                break;
            case Fleet::internal_return:
                internal_return();
                break;
        }
        bed_in();
        write_papers();
        return std::move(story_);
    }

private:
    PlantDrawing& plant() { return story_.plant; }

    void set_calendar() {
        const double begins = std::floor(dice_.between(0.0, days_a_year));
        plant().time_zone = dice_.one_of({"Europe/Helsinki", "UTC", "America/Chicago", "Asia/Kolkata"});
        plant().year_begins = new_year_2024 + static_cast<Millis>(begins) * day_ms;
        plant().year_ends = plant().year_begins + static_cast<Millis>(telling_.days) * day_ms;
        plant().season_at_begin = begins / days_a_year;
        for (const double share : {dice_.between(0.1, 0.4), dice_.between(0.5, 0.9)}) {
            const Millis from = at_share(share);
            plant().stops.push_back({from, from + static_cast<Millis>(dice_.between(2.0, 12.0)) * day_ms});
        }
        const double draw = dice_.between(0.0, 1.0);
        const double minutes = draw < 0.05 ? 1.0 : draw < 0.25 ? 2.0 : draw < 0.7 ? 5.0 : 10.0;
        story_.interval = static_cast<Millis>(minutes) * minute_ms;
    }

    Millis at_share(double share) const {
        const auto span = static_cast<double>(story_.plant.year_ends - story_.plant.year_begins);
        return story_.plant.year_begins + static_cast<Millis>(std::floor(share * span / day_ms)) * day_ms;
    }

    // Pumps, sisters beside them where there are several, and their tank.
    void build(const Wanted& wanted, std::size_t pumps) {
        papers_.push_back({.pump = pump_from_yard(dice_, wanted)});
        for (std::size_t i = 1; i < pumps; ++i) papers_.push_back({.pump = sister_of(papers_.front().pump, dice_)});
        for (std::size_t i = 0; i < pumps; ++i) {
            PumpPapers& papers = papers_[i];
            papers.pump.drawing.id = fmt::format("pump-{}", i + 1);
            papers.ranges_given = dice_.happens(0.7);
            papers.maker_test = dice_.happens(0.25);
            papers.maker_test_error = dice_.normal(0.0, 0.03);
            if (dice_.happens(0.7)) papers.since = plant().year_begins;
            plant().pumps.push_back(papers.pump.drawing);
            for (std::size_t s = 0; s < papers.pump.drawing.sections.size(); ++s)
                story_.sections.push_back({.pump = i, .section = s});
        }
        plant().reservoirs.push_back(tank_for(plant().pumps.front(), pumps, dice_));
        oil_.index = dice_.happens(0.25) ? 150 : 100;
        oil_.sampled = dice_.happens(0.4);
        oil_.oil = oil_of(dice_.one_of({32, 46, 46, 46, 68}), oil_.index, dice_);
        plant().reservoirs.front().oil = oil_.oil;
    }

    std::size_t one_to_three() {
        const double draw = dice_.between(0.0, 1.0);
        return draw < 0.6 ? 1 : draw < 0.9 ? 2 : 3;
    }

    Wear& wear_of(const SectionStory& section) {
        return plant().pumps[section.pump].sections[section.section].lives.back().wear;
    }

    void let_wear(SectionStory& section) {
        section.shape =
            dice_.one_of({WearShape::linear, WearShape::accelerating, WearShape::decelerating, WearShape::late});
        Wear& wear = wear_of(section);
        wear.end_ratio = std::clamp(std::exp(dice_.normal(std::log(2.4), 0.35)), 1.4, 4.5);
        wear.begins = section.shape == WearShape::late ? dice_.between(0.55, 0.72) : dice_.between(0.04, 0.4);
        if (telling_.laws == Laws::tuning)
            set_tuning_law(section.shape, wear);
        else
            set_test_law(section.shape, wear);
    }

    void set_tuning_law(WearShape shape, Wear& wear) {
        wear.law = WearLaw::ratio_power;
        switch (shape) {
            case WearShape::linear:
                wear.bend = 1.0;
                break;
            case WearShape::accelerating:
                wear.bend = dice_.between(1.5, 2.2);
                break;
            case WearShape::decelerating:
                wear.bend = dice_.between(0.5, 0.7);
                break;
            default:
                wear.bend = dice_.between(0.9, 1.5);
                break;
        }
    }

    void set_test_law(WearShape shape, Wear& wear) {
        const bool by_gap = dice_.happens(0.5);
        switch (shape) {
            case WearShape::linear:
                wear.law = by_gap ? WearLaw::gap_power : WearLaw::ratio_exponential;
                wear.bend = by_gap ? dice_.between(0.8, 1.0) : dice_.sign() * dice_.between(0.1, 0.6);
                break;
            case WearShape::accelerating:
                wear.law = by_gap ? WearLaw::gap_power : WearLaw::ratio_exponential;
                wear.bend = by_gap ? dice_.between(1.2, 1.7) : dice_.between(1.2, 2.8);
                break;
            case WearShape::decelerating:
                wear.law = by_gap ? WearLaw::ratio_rate : WearLaw::ratio_exponential;
                wear.bend = by_gap ? dice_.between(-2.5, -0.8) : dice_.between(-2.2, -0.9);
                break;
            default:
                wear.law = by_gap ? WearLaw::gap_power : WearLaw::ratio_rate;
                wear.bend = by_gap ? dice_.between(0.9, 1.2) : dice_.between(0.2, 0.9);
                break;
        }
    }

    void let_break(SectionStory& section) {
        section.steps = true;
        Wear& wear = wear_of(section);
        wear.step_at =
            at_share(dice_.between(0.35, 0.85)) + static_cast<Millis>(dice_.between(0.0, 24.0)) * plantsim::hour_ms;
        wear.step_ratio = dice_.between(1.35, 2.4);
    }

    void let_confound(std::size_t pump, Confounder confounder) {
        const Millis from =
            confounder == Confounder::ageing_oil ? plant().year_begins : at_share(dice_.between(0.25, 0.6));
        confound(plant(), pump, confounder, from, dice_);
        for (SectionStory& section : story_.sections) {
            if (section.pump != pump && !is_of_tank(confounder)) continue;
            section.confounders.push_back(confounder);
            section.confounded_from = section.confounders.size() == 1 ? from : std::min(from, section.confounded_from);
        }
        if (confounder == Confounder::other_oil && dice_.happens(0.5)) oil_told_ = true;
    }

    void healthy() { build({}, one_to_three()); }

    void worn() {
        build({}, one_to_three());
        for (SectionStory& section : story_.sections) let_wear(section);
    }

    void broken() {
        build({}, 1);
        let_break(story_.sections.front());
    }

    void confounded(Confounder confounder) {
        build(wanted_for(confounder, dice_), is_of_tank(confounder) ? 1 + dice_.below(2) : 1);
        let_confound(0, confounder);
    }

    void mixed() {
        const double draw = dice_.between(0.0, 1.0);
        if (telling_.fast_loggers && story_.number < most_fast_loggers) {
            story_.interval = 10 * second_ms;
            build({}, 1);
        } else if (draw > 0.85) {
            return confounded(confounder_of(dice_.below(confounder_names.size())));
        } else {
            build({}, one_to_three());
        }
        for (SectionStory& section : story_.sections) {
            const double fate = dice_.between(0.0, 1.0);
            if (fate < 0.45)
                let_wear(section);
            else if (fate < 0.55)
                let_break(section);
        }
    }

    // Two to four at once. Where the pump wears beside them, its instruments are honest: else nothing could be known.
    void hard() {
        build({}, 1);
        const bool wears = dice_.happens(0.4);
        std::vector<Confounder> possible;
        for (std::size_t i = 0; i < confounder_names.size(); ++i) {
            const auto confounder = static_cast<Confounder>(i);
            if (can_be_felt(confounder, plant().pumps.front()) && !(wears && is_of_instrument(confounder)))
                possible.push_back(confounder);
        }
        const std::size_t count = std::min(possible.size(), 2 + dice_.below(3));
        for (std::size_t i = 0; i < count; ++i) {
            const std::size_t pick = dice_.below(possible.size());
            let_confound(0, possible[pick]);
            possible.erase(possible.begin() + static_cast<std::ptrdiff_t>(pick));
        }
        if (wears) let_wear(story_.sections.front());
    }

    void double_pump() {
        build({.sections = 2}, 1);
        plantsim::PumpDrawing& pump = plant().pumps.front();
        pump.one_drain_meter = pump.sections.front().fitted.drain && dice_.happens(0.3);
        let_wear(story_.sections[dice_.below(2)]);
    }

    // Nobody knows how old it was; a sister that was new then, or the maker's record, may tell.
    void taken_over() {
        build({}, dice_.happens(0.35) ? 2 : 1);
        SectionStory& section = story_.sections.front();
        let_wear(section);
        section.taken_over = true;
        Wear& wear = wear_of(section);
        wear.first_ratio = dice_.between(1.3, 2.4);
        wear.end_ratio = wear.first_ratio * (dice_.happens(0.4) ? 1.0 : dice_.between(1.1, 2.0));
        wear.begins = 0.0;
        papers_.front().since.reset();
        if (papers_.size() > 1) papers_[1].since = plant().year_begins;
    }

    // The first part was worn out sooner, and what came out was told; the second is another piece of the same model.
    void second_life() {
        build({}, 1);
        SectionStory& section = story_.sections.front();
        plantsim::PumpDrawing& pump = plant().pumps.front();
        plantsim::SectionDrawing& part = pump.sections.front();
        const double share = dice_.between(0.25, 0.4);
        const Millis fitted = at_share(share) + 12 * plantsim::hour_ms;
        const double last_ratio = dice_.between(2.0, 3.2);
        plantsim::Life second = sister_of(papers_.front().pump, dice_).drawing.sections.front().lives.front();
        second.from = fitted;
        part.lives.front().wear = {
            .end_ratio = 1.0 + (last_ratio - 1.0) / share, .begins = 0.0, .bend = 1.0, .law = WearLaw::ratio_power};
        part.lives.push_back(second);
        pump.overhaul = {fitted - 4 * plantsim::hour_ms, fitted + 2 * plantsim::hour_ms};
        section.fitted_at = fitted;
        let_wear(section);
        story_.entries.push_back({.pump = 0,
                                  .section = part.id,
                                  .at = fitted,
                                  .kind = "replaced",
                                  .body = fmt::format(R"({{"displacement_cm3":{},"model":"{}","found":"worn"}})",
                                                      second.displacement_cm3, papers_.front().pump.model)});
    }

    void internal_return() {
        build({.kind = PumpKind::axial_piston, .drain = true, .delivery = true, .compensated = false}, 1);
        SectionStory& section = story_.sections.front();
        section.inside = true;
        let_wear(section);
        plantsim::Life& life = plant().pumps.front().sections.front().lives.front();
        life.wear.inside = true;
        for (plantsim::Gap& gap : life.gaps) {
            gap.wears = gap.to_drain ? 0.0 : 1.0;
            gap.hole_wears = 0.0;
        }
    }

    // What is new beds in; what was there before has.
    void bed_in() {
        for (std::size_t i = 0; i < papers_.size(); ++i)
            for (plantsim::SectionDrawing& section : plant().pumps[i].sections)
                for (plantsim::Life& life : section.lives)
                    if (papers_[i].since || life.from > 0) life.run_in_share = dice_.between(0.0, 0.02);
    }

    void write_papers() {
        for (std::size_t i = 0; i < papers_.size(); ++i) papers_[i].pump.drawing = plant().pumps[i];
        PlantPapers papers{.plant = plant(), .pumps = papers_, .oil = oil_};
        story_.plant_file = plant_file(papers);
        if (!oil_told_) return;
        const plantsim::OilFill& fill = plant().reservoirs.front().oil_changes.front();
        papers.oil = {.oil = fill.oil, .index = oil_.index > 125 ? 100 : 150, .sampled = false};
        for (PumpPapers& pump : papers.pumps) pump.since = fill.from;
        story_.plant_file_after = plant_file(papers);
    }

    Telling telling_;
    Dice dice_;
    Story story_;
    std::vector<PumpPapers> papers_;
    OilPapers oil_;
    bool oil_told_ = false;
};

}  // namespace

Confounder confounder_of(std::size_t number) {
    return static_cast<Confounder>(number % confounder_names.size());
}

Story tell(Fleet fleet, std::size_t number, const Telling& telling) {
    return Teller(fleet, number, telling).tell();
}

}  // namespace slipledger::judging
