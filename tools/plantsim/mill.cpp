#include "tools/plantsim/mill.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

#include "tools/plantsim/weather.hpp"

namespace slipledger::plantsim {
namespace {

constexpr Millis step = 5 * minute_ms;
constexpr Millis warm_up = 4 * day_ms;  // before the year, so that tanks do not begin where they were put
constexpr double case_bar = 0.6;
constexpr double first_guess_c = 35.0;

double kilowatt(double bar, double lpm) {
    return bar * lpm / 600.0;
}

}  // namespace

struct Mill::SectionAtWork {
    std::vector<WearCourse> courses;  // by life
    std::vector<double> begun_h;      // running hours of the pump at which the life began
    Meter pressure;
    Meter drain;
    Meter delivery;
    Chance disturbance;
};

struct Mill::PumpAtWork {
    const PumpDrawing& drawing;
    DutyPlan duty;
    Meter speed;
    Meter temperature;
    std::vector<double> hours{};  // by step
    std::vector<SectionAtWork> sections{};
};

Mill::Mill(PlantDrawing plant, std::uint64_t seed)
    : plant_(std::move(plant)),
      walk_begins_(plant_.year_begins - warm_up),
      walk_steps_(static_cast<std::size_t>((plant_.year_ends + day_ms - walk_begins_) / step)),
      calendar_(plant_, walk_begins_, plant_.year_ends + day_ms) {
    for (const PumpDrawing& pump : plant_.pumps)
        pumps_.push_back(std::make_unique<PumpAtWork>(
            PumpAtWork{.drawing = pump,
                       .duty = DutyPlan(pump, calendar_, seed),
                       .speed = Meter(speed_class(), seed, pump.id + "/speed"),
                       .temperature = Meter(temperature_class(), seed, pump.id + "/temperature")}));
    count_hours();
    fit_wear(seed);
    heat_tanks(seed);
}

Mill::~Mill() = default;

void Mill::count_hours() {
    for (const auto& pump : pumps_) {
        double hours = 0.0;
        for (std::size_t i = 0; i < walk_steps_; ++i) {
            pump->hours.push_back(hours);
            const Millis time = walk_begins_ + static_cast<Millis>(i) * step;
            if (time >= plant_.year_begins && pump->duty.running(time))
                hours += static_cast<double>(step) / static_cast<double>(hour_ms);
        }
    }
}

void Mill::fit_wear(std::uint64_t seed) {
    for (std::size_t p = 0; p < pumps_.size(); ++p) {
        const PumpDrawing& drawing = plant_.pumps[p];
        const Oil& oil = plant_.reservoirs[drawing.reservoir].oil;
        const double year_h = running_hours(p, plant_.year_ends);
        for (const SectionDrawing& section : drawing.sections) {
            const std::string name = drawing.id + "/" + section.id;
            SectionAtWork at_work{.courses = {},
                                  .begun_h = {},
                                  .pressure = Meter(pressure_class(), seed, name + "/pressure"),
                                  .drain = Meter(drain_class(), seed, name + "/drain"),
                                  .delivery = Meter(delivery_class(), seed, name + "/delivery"),
                                  .disturbance = Chance(seed, name + "/disturbance")};
            for (const Life& life : section.lives) {
                at_work.begun_h.push_back(running_hours(p, std::max(life.from, plant_.year_begins)));
                const double life_h = std::max(1.0, year_h - at_work.begun_h.back());
                at_work.courses.emplace_back(life, section.fitted, oil, drawing.rated, life_h);
            }
            pumps_[p]->sections.push_back(std::move(at_work));
        }
    }
}

// First-order: what the losses bring in, less what goes to the hall and, once the thermostat opens, to the cooling
// water. Solved implicitly, so that a big cooler on a small tank does not ring.
void Mill::heat_tanks(std::uint64_t seed) {
    const Weather weather(calendar_, seed);
    const double step_s = static_cast<double>(step) / 1000.0;
    tanks_c_.assign(plant_.reservoirs.size(), std::vector<double>(walk_steps_, first_guess_c));
    for (std::size_t i = 1; i < walk_steps_; ++i) {
        const Millis time = walk_begins_ + static_cast<Millis>(i - 1) * step;
        for (std::size_t r = 0; r < plant_.reservoirs.size(); ++r) {
            const ReservoirDrawing& tank = plant_.reservoirs[r];
            const double now_c = tanks_c_[r][i - 1];
            double heat_w = 0.0;
            for (std::size_t p = 0; p < pumps_.size(); ++p)
                if (plant_.pumps[p].reservoir == r) heat_w += 1000.0 * losses_kw(p, time, now_c);
            const double cooler = tank.cooler_w_per_k * std::clamp((now_c - tank.cooler_opens_c) / 5.0, 0.0, 1.0);
            const double coolant_c = tank.air_cooled ? weather.outdoors_c(time) : weather.water_c(time);
            const double per_k = step_s / (tank.heat_capacity_kj_per_k * 1000.0);
            const double inflow = heat_w + tank.wall_w_per_k * weather.hall_c(time) + cooler * coolant_c;
            tanks_c_[r][i] = (now_c + per_k * inflow) / (1.0 + per_k * (tank.wall_w_per_k + cooler));
        }
    }
}

double Mill::losses_kw(std::size_t pump, Millis time, double tank_c) const {
    const PumpDrawing& drawing = plant_.pumps[pump];
    const ReservoirDrawing& tank = plant_.reservoirs[drawing.reservoir];
    double sum = 0.0;
    for (std::size_t s = 0; s < drawing.sections.size(); ++s) {
        const Demand demand = pumps_[pump]->duty.demand(s, time);
        if (demand.doing == Doing::standing) continue;
        const Life& life = drawing.sections[s].lives[life_at(pump, s, time)];
        Strain strain = strain_of(pump, s, time);
        strain.pressure_bar = demand.pressure_bar;
        strain.speed_rpm = drawing.rated.speed_rpm;
        strain.temperature_c = tank_c;
        const Leakage lost = leakage(life, tank.oil, strain, drawing.rated.pressure_bar);
        const double out_lpm = life.displacement_cm3 * strain.speed_rpm / 1000.0 * demand.stroke;
        sum += kilowatt(demand.pressure_bar, tank.machine_losses * out_lpm + lost.to_drain_lpm + lost.inside_lpm);
    }
    return sum;
}

std::size_t Mill::life_at(std::size_t pump, std::size_t section, Millis time) const {
    const std::vector<Life>& lives = plant_.pumps[pump].sections[section].lives;
    std::size_t life = 0;
    while (life + 1 < lives.size() && lives[life + 1].from <= time) ++life;
    return life;
}

Strain Mill::strain_of(std::size_t pump, std::size_t section, Millis time) const {
    const std::size_t life = life_at(pump, section, time);
    const SectionAtWork& at_work = pumps_[pump]->sections[section];
    const double hours = running_hours(pump, time) - at_work.begun_h[life];
    return {.oil_age_years = calendar_.year_share(time), .growth = at_work.courses[life].growth(hours, time)};
}

double Mill::ratio(std::size_t pump, std::size_t section, Millis time) const {
    const PumpDrawing& drawing = plant_.pumps[pump];
    const SectionDrawing& part = drawing.sections[section];
    const double growth = strain_of(pump, section, time).growth;
    return true_ratio(part.lives[life_at(pump, section, time)], part.fitted, plant_.reservoirs[drawing.reservoir].oil,
                      drawing.rated, growth);
}

double Mill::along(const std::vector<double>& course, Millis time) const {
    const double at = std::clamp(static_cast<double>(time - walk_begins_) / static_cast<double>(step), 0.0,
                                 static_cast<double>(walk_steps_ - 1));
    const auto left = std::min(static_cast<std::size_t>(at), walk_steps_ - 2);
    const double share = at - static_cast<double>(left);
    return course[left] * (1.0 - share) + course[left + 1] * share;
}

double Mill::running_hours(std::size_t pump, Millis time) const {
    return along(pumps_[pump]->hours, time);
}

double Mill::tank_c(std::size_t reservoir, Millis time) const {
    return along(tanks_c_[reservoir], time);
}

double Mill::shaft_speed(const PumpAtWork& pump, const std::vector<Demand>& demands) const {
    double power = 0.0;
    double rated = 0.0;
    for (std::size_t s = 0; s < demands.size(); ++s) {
        if (demands[s].doing == Doing::standing) return 0.0;
        const double size = pump.drawing.sections[s].lives.front().displacement_cm3;
        power += size * demands[s].pressure_bar * demands[s].stroke;
        rated += size * pump.drawing.rated.pressure_bar;
    }
    return pump.drawing.synchronous_rpm * (1.0 - pump.drawing.slip_at_rated * power / rated);
}

void Mill::sample(std::size_t pump, Millis time, std::vector<Row>& rows) const {
    const PumpAtWork& at_work = *pumps_[pump];
    const PumpDrawing& drawing = at_work.drawing;
    if (drawing.starts && time < *drawing.starts) return;
    if (drawing.falls_silent && time >= *drawing.falls_silent) return;

    std::vector<Demand> demands;
    for (std::size_t s = 0; s < drawing.sections.size(); ++s) demands.push_back(at_work.duty.demand(s, time));
    const double speed = shaft_speed(at_work, demands);
    const double inlet_c = tank_c(drawing.reservoir, time);
    for (std::size_t s = 0; s < drawing.sections.size(); ++s) {
        Row row{.time = time,
                .pump = drawing.id,
                .section = drawing.sections.size() > 1 ? std::string_view(drawing.sections[s].id) : std::string_view()};
        Strain strain = strain_of(pump, s, time);
        strain.speed_rpm = speed;
        strain.temperature_c = inlet_c;
        show_section(pump, s, demands[s], strain, row);
        if (s == 0) {  // what the sections share stands in the first one's row
            if (drawing.has_speed) row[Column::shaft_speed] = at_work.speed.show(speed, 30.0, time);
            if (drawing.has_temperature) row[Column::fluid_temperature] = at_work.temperature.show(inlet_c, 30.0, time);
            if (drawing.has_running) row[Column::running] = speed > 0.0 ? 1.0 : 0.0;
        }
        if (!row.empty()) rows.push_back(row);
    }
}

void Mill::show_section(std::size_t pump, std::size_t section, const Demand& demand, Strain strain, Row& row) const {
    const PumpDrawing& drawing = plant_.pumps[pump];
    const SectionDrawing& part = drawing.sections[section];
    const SectionAtWork& at_work = pumps_[pump]->sections[section];
    const Life& life = part.lives[life_at(pump, section, row.time)];
    const Oil& oil = plant_.reservoirs[drawing.reservoir].oil;
    const double rated_bar = drawing.rated.pressure_bar;
    const double cst = kinematic_cst(oil, strain.temperature_c, strain.oil_age_years);

    const bool standing = demand.doing == Doing::standing;
    const double locked_in_bar =
        drawing.gauge_behind_check_valve ? 45.0 + 5.0 * at_work.disturbance.wander(row.time, 8 * hour_ms) : 0.0;
    const double outlet_bar = standing ? locked_in_bar : demand.pressure_bar;
    row[Column::outlet_pressure] = at_work.pressure.show(outlet_bar, cst, row.time);

    strain.pressure_bar = standing ? 0.0 : demand.pressure_bar - case_bar;
    if (part.fitted.drain) {
        double lpm = standing ? 0.0 : leakage(life, oil, strain, rated_bar).to_drain_lpm;
        lpm *= 1.0 + 0.012 * at_work.disturbance.wander(row.time, 6 * day_ms);
        if (drawing.compensator && !standing)
            lpm +=
                demand.doing == Doing::holding ? drawing.compensator->pilot_lpm : drawing.compensator->idle_pilot_lpm;
        row[Column::case_drain_flow] = at_work.drain.show(lpm, cst, row.time);
    }
    if (part.fitted.delivery) {
        double lpm = standing ? 0.0 : delivered_lpm(life, oil, strain, rated_bar, demand.stroke);
        if (!part.fitted.delivery_on_return) lpm *= 1.0 - compression(strain.temperature_c, strain.pressure_bar);
        row[Column::delivery_flow] = at_work.delivery.show(lpm, cst, row.time);
    }
}

}  // namespace slipledger::plantsim
