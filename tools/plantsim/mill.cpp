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
constexpr double blocked_case_bar = 6.0;    // case pressure gained where nothing finds its way out
constexpr double flooded_inlet_bar = 0.05;  // gauge, under the tank's level
constexpr double vanes_stick_above_cst = 70.0;
constexpr double run_in_h = 15.0;              // over which surfaces bed in
constexpr double starved_share_per_bar = 0.3;  // of delivery lost per bar the inlet lies lower
constexpr double first_guess_c = 35.0;

double kilowatt(double bar, double lpm) {
    return bar * lpm / 600.0;
}

// A logger whose clock is off brings its column in rows of its own, under times of its own.
void move_to_own_row(const Trouble& trouble, Row& row, std::vector<Row>& rows) {
    Row own{.time = row.time + std::llround(trouble.size * static_cast<double>(minute_ms)),
            .pump = row.pump,
            .section = row.section};
    own[*trouble.column] = std::exchange(row[*trouble.column], no_value);
    rows.push_back(own);
}

}  // namespace

struct Mill::SectionAtWork {
    std::vector<WearCourse> courses;  // by life
    std::vector<double> begun_h;      // running hours of the pump at which the life began
    Meter pressure;
    Meter drain;
    Meter delivery;
    Meter case_pressure;
    Chance disturbance;
};

struct Mill::PumpAtWork {
    const PumpDrawing& drawing;
    DutyPlan duty;
    Meter speed;
    Meter temperature;
    Meter inlet_pressure;
    Meter drain;  // of all sections together
    Chance cavitation;
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
                       .temperature = Meter(temperature_class(), seed, pump.id + "/temperature"),
                       .inlet_pressure = Meter(low_pressure_class(), seed, pump.id + "/inlet"),
                       .drain = Meter(drain_class(), seed, pump.id + "/drain"),
                       .cavitation = Chance(seed, pump.id + "/cavitation")}));
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
                                  .case_pressure = Meter(low_pressure_class(), seed, name + "/case"),
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
            const double cooler_w_per_k =
                tank.cooler_w_per_k * left_of(tank.troubles, TroubleKind::cooler_fouled, time);
            const double cooler = cooler_w_per_k * std::clamp((now_c - tank.cooler_opens_c) / 5.0, 0.0, 1.0);
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
        const Leakage lost = leakage(life, oil_at(drawing.reservoir, time).oil, strain, drawing.rated.pressure_bar);
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

const Life& Mill::life(std::size_t pump, std::size_t section, Millis time) const {
    return plant_.pumps[pump].sections[section].lives[life_at(pump, section, time)];
}

OilFill Mill::oil_at(std::size_t reservoir, Millis time) const {
    const ReservoirDrawing& tank = plant_.reservoirs[reservoir];
    OilFill fill{.from = plant_.year_begins, .oil = tank.oil};
    for (const OilFill& change : tank.oil_changes)
        if (change.from <= time) fill = change;
    return fill;
}

Strain Mill::strain_of(std::size_t pump, std::size_t section, Millis time) const {
    const Millis filled = oil_at(plant_.pumps[pump].reservoir, time).from;
    const std::size_t at = life_at(pump, section, time);
    const double hours = running_hours(pump, time) - pumps_[pump]->sections[section].begun_h[at];
    const double bedding = life(pump, section, time).run_in_share * std::exp(-hours / run_in_h);
    return {.oil_age_years = calendar_.year_share(time) - calendar_.year_share(filled),
            .growth = growth(pump, section, time) * (1.0 + bedding)};
}

Strain Mill::strain_at_work(std::size_t pump, std::size_t section, const Demand& demand, double speed,
                            Millis time) const {
    Strain strain = strain_of(pump, section, time);
    strain.speed_rpm = speed;
    strain.temperature_c = tank_c(plant_.pumps[pump].reservoir, time);
    strain.pressure_bar = demand.doing == Doing::standing ? 0.0 : demand.pressure_bar - case_bar;
    return strain;
}

double Mill::growth(std::size_t pump, std::size_t section, Millis time, double hours) const {
    const std::size_t life = life_at(pump, section, time);
    const SectionAtWork& at_work = pumps_[pump]->sections[section];
    return at_work.courses[life].growth(running_hours(pump, time) - at_work.begun_h[life] + hours, time);
}

double Mill::ratio(std::size_t pump, std::size_t section, Millis time) const {
    const PumpDrawing& drawing = plant_.pumps[pump];
    return true_ratio(life(pump, section, time), seen_by(drawing.sections[section].fitted),
                      plant_.reservoirs[drawing.reservoir].oil, drawing.rated, growth(pump, section, time));
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
    const PumpDrawing& drawing = plant_.pumps[pump];
    if (drawing.starts && time < *drawing.starts) return;
    if (drawing.falls_silent && time >= *drawing.falls_silent) return;
    const std::size_t first = rows.size();
    show_honestly(pump, time, rows);
    if (!drawing.troubles.empty()) mislead(pump, time, rows, first);
}

void Mill::show_honestly(std::size_t pump, Millis time, std::vector<Row>& rows) const {
    const PumpAtWork& at_work = *pumps_[pump];
    const PumpDrawing& drawing = at_work.drawing;
    std::vector<Demand> demands;
    for (std::size_t s = 0; s < drawing.sections.size(); ++s) demands.push_back(at_work.duty.demand(s, time));
    const double speed = shaft_speed(at_work, demands);
    for (std::size_t s = 0; s < drawing.sections.size(); ++s) {
        Row row{.time = time,
                .pump = drawing.id,
                .section = drawing.sections.size() > 1 ? std::string_view(drawing.sections[s].id) : std::string_view()};
        show_section(pump, s, demands[s], strain_at_work(pump, s, demands[s], speed, time), row);
        if (s == 0) show_shaft_and_oil(pump, speed, row);  // what the sections share stands in the first one's row
        if (!row.empty()) rows.push_back(row);
    }
    if (!drawing.one_drain_meter) return;
    Row row{.time = time, .pump = drawing.id};
    show_common_drain(pump, demands, speed, row);
    if (!row.empty()) rows.push_back(row);
}

void Mill::show_common_drain(std::size_t pump, const std::vector<Demand>& demands, double speed, Row& row) const {
    double lpm = 0.0;
    for (std::size_t s = 0; s < demands.size(); ++s)
        lpm += drained_lpm(pump, s, demands[s], strain_at_work(pump, s, demands[s], speed, row.time), row.time);
    const Strain strain = strain_of(pump, 0, row.time);
    const std::size_t tank = plant_.pumps[pump].reservoir;
    const double cst = kinematic_cst(oil_at(tank, row.time).oil, tank_c(tank, row.time), strain.oil_age_years);
    row[Column::case_drain_flow] = pumps_[pump]->drain.show(lpm, cst, row.time);
}

void Mill::show_shaft_and_oil(std::size_t pump, double speed, Row& row) const {
    const PumpAtWork& at_work = *pumps_[pump];
    const PumpDrawing& drawing = at_work.drawing;
    if (drawing.has_speed) row[Column::shaft_speed] = at_work.speed.show(speed, 30.0, row.time);
    if (drawing.has_temperature) {
        const double shown_c = tank_c(drawing.reservoir, row.time - drawing.thermometer_lag);
        row[Column::fluid_temperature] = at_work.temperature.show(shown_c, 30.0, row.time);
    }
    if (drawing.has_running) row[Column::running] = speed > 0.0 ? 1.0 : 0.0;
    if (drawing.has_inlet_pressure) {
        const double starved_bar = speed > 0.0 ? total(drawing.troubles, TroubleKind::inlet_starved, row.time) : 0.0;
        const double bar = flooded_inlet_bar - starved_bar * (1.0 + 0.1 * at_work.cavitation.normal(row.time));
        row[Column::inlet_pressure] = at_work.inlet_pressure.show(bar, 30.0, row.time);
    }
}

void Mill::show_section(std::size_t pump, std::size_t section, const Demand& demand, const Strain& strain,
                        Row& row) const {
    const PumpDrawing& drawing = plant_.pumps[pump];
    const SectionDrawing& part = drawing.sections[section];
    const SectionAtWork& at_work = pumps_[pump]->sections[section];
    const double cst =
        kinematic_cst(oil_at(drawing.reservoir, row.time).oil, strain.temperature_c, strain.oil_age_years);

    const bool standing = demand.doing == Doing::standing;
    const double locked_in_bar =
        drawing.gauge_behind_check_valve ? 45.0 + 5.0 * at_work.disturbance.wander(row.time, 8 * hour_ms) : 0.0;
    const double outlet_bar = standing ? locked_in_bar : demand.pressure_bar;
    row[Column::outlet_pressure] = at_work.pressure.show(outlet_bar, cst, row.time);

    if (part.fitted.drain && !drawing.one_drain_meter)
        row[Column::case_drain_flow] =
            at_work.drain.show(drained_lpm(pump, section, demand, strain, row.time), cst, row.time);
    if (part.fitted.delivery)
        row[Column::delivery_flow] =
            at_work.delivery.show(outlet_lpm(pump, section, demand, strain, row.time), cst, row.time);
    if (drawing.has_case_pressure) {
        const double blocked = standing ? 0.0 : total(drawing.troubles, TroubleKind::drain_blocked, row.time);
        const double bar = standing ? 0.0 : case_bar + blocked_case_bar * blocked;
        row[Column::case_pressure] = at_work.case_pressure.show(bar, cst, row.time);
    }
}

double Mill::drained_lpm(std::size_t pump, std::size_t section, const Demand& demand, const Strain& strain,
                         Millis time) const {
    if (demand.doing == Doing::standing) return 0.0;
    const PumpDrawing& drawing = plant_.pumps[pump];
    const Oil oil = oil_at(drawing.reservoir, time).oil;
    double lpm = leakage(life(pump, section, time), oil, strain, drawing.rated.pressure_bar).to_drain_lpm;
    lpm *= 1.0 + 0.012 * pumps_[pump]->sections[section].disturbance.wander(time, 6 * day_ms);
    if (drawing.compensator)
        lpm += demand.doing == Doing::holding ? drawing.compensator->pilot_lpm : drawing.compensator->idle_pilot_lpm;
    lpm += total(drawing.troubles, TroubleKind::pilot_flow, time);
    return lpm * left_of(drawing.troubles, TroubleKind::drain_blocked, time);
}

double Mill::outlet_lpm(std::size_t pump, std::size_t section, const Demand& demand, const Strain& strain,
                        Millis time) const {
    if (demand.doing == Doing::standing) return 0.0;
    const PumpDrawing& drawing = plant_.pumps[pump];
    const Troubles& of_tank = plant_.reservoirs[drawing.reservoir].troubles;
    const Oil oil = oil_at(drawing.reservoir, time).oil;
    double lpm = delivered_lpm(life(pump, section, time), oil, strain, drawing.rated.pressure_bar, demand.stroke);
    if (!drawing.sections[section].fitted.delivery_on_return)
        lpm *= 1.0 - compression(strain.temperature_c, strain.pressure_bar);
    // Bubbles drawn in take the place of oil; most of them is pressed into solution before the outlet.
    lpm *= 1.0 - 0.6 * total(of_tank, TroubleKind::air_in_oil, time);
    lpm -= passing_lpm(pump, section, strain, time);
    if (kinematic_cst(oil, strain.temperature_c, strain.oil_age_years) > vanes_stick_above_cst)
        lpm *= left_of(drawing.troubles, TroubleKind::vanes_stick, time);
    // A pump that is not filled delivers less, and never twice the same.
    const double starved_bar = total(drawing.troubles, TroubleKind::inlet_starved, time);
    if (starved_bar <= 0.0) return lpm;
    return lpm *
           (1.0 - starved_share_per_bar * starved_bar * std::abs(1.0 + 0.5 * pumps_[pump]->cavitation.normal(time)));
}

// Through a valve that does not close, as through any hole.
double Mill::passing_lpm(std::size_t pump, std::size_t section, const Strain& strain, Millis time) const {
    const PumpDrawing& drawing = plant_.pumps[pump];
    const double share = total(drawing.troubles, TroubleKind::valve_passes, time);
    const double theoretical = life(pump, section, time).displacement_cm3 * strain.speed_rpm / 1000.0;
    return share * theoretical * std::sqrt(strain.pressure_bar / drawing.rated.pressure_bar);
}

// What comes from the instruments and not from the pump.
void Mill::mislead(std::size_t pump, Millis time, std::vector<Row>& rows, std::size_t first) const {
    const PumpDrawing& drawing = plant_.pumps[pump];
    for (const Trouble& trouble : drawing.troubles) {
        if (!trouble.column || trouble.strength(time) <= 0.0) continue;
        const std::string_view section =
            drawing.sections.size() > 1 ? std::string_view(drawing.sections[trouble.section].id) : std::string_view();
        const auto row =
            std::find_if(rows.begin() + static_cast<std::ptrdiff_t>(first), rows.end(),
                         [&](const Row& one) { return one.section == section && !std::isnan(one[*trouble.column]); });
        if (row == rows.end()) continue;
        if (trouble.kind == TroubleKind::clock_off)
            move_to_own_row(trouble, *row, rows);
        else
            (*row)[*trouble.column] = misread(pump, trouble, *row);
    }
}

double Mill::misread(std::size_t pump, const Trouble& trouble, const Row& row) const {
    const double shown = row[*trouble.column];
    const double size = trouble.size * trouble.strength(row.time);
    if (trouble.kind == TroubleKind::reads_more_by_share) return shown * (1.0 + size);
    if (trouble.kind == TroubleKind::reads_more_by) return shown + size;
    if (trouble.kind == TroubleKind::reads_nothing_but) return trouble.size;
    if (trouble.kind == TroubleKind::silent) return no_value;
    std::vector<Row> when_it_stuck;
    show_honestly(pump, trouble.from, when_it_stuck);
    for (const Row& then : when_it_stuck)
        if (then.section == row.section) return then[*trouble.column];
    return shown;
}

}  // namespace slipledger::plantsim
