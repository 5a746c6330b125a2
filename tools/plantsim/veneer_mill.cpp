#include "tools/plantsim/veneer_mill.hpp"

#include <date/tz.h>

#include "tools/plantsim/gap_sets.hpp"

namespace slipledger::plantsim {
namespace {

constexpr const char* zone = "Europe/Helsinki";

Millis local(int month, int day, int hour = 0, int year = 2025) {
    const date::local_days midnight{date::year{year} / month / day};
    const auto instant = date::locate_zone(zone)->to_sys(midnight + std::chrono::hours{hour});
    return instant.time_since_epoch().count() * second_ms;
}

Life whole_year(double displacement_cm3, double true_share, std::vector<Gap> gaps, Wear wear = {}) {
    return {.from = 0,
            .displacement_cm3 = displacement_cm3,
            .true_share = true_share,
            .gaps = std::move(gaps),
            .wear = wear};
}

constexpr Compensator press_compensator{
    .setting_bar = 250.0, .droop_bar = 5.0, .pilot_lpm = 1.6, .idle_pilot_lpm = 0.3, .hold_share = 0.55};

PumpDrawing press(std::string id, std::size_t reservoir, double true_share, Wear wear) {
    return {.id = std::move(id),
            .reservoir = reservoir,
            .rated = {280.0, 1480.0, 50.0},
            .compensator = press_compensator,
            .idle_bar = 22.0,
            .gauge_behind_check_valve = true,
            .sections = {{.id = "A",
                          .fitted = {.drain = true},
                          .product_bar = {135.0, 165.0, 190.0, 212.0},
                          .lives = {whole_year(140.0, true_share, axial_piston_gaps(), wear)}}}};
}

PumpDrawing lathe() {
    const Millis fitting = local(7, 2, 12);
    const SectionDrawing spindle{
        .id = "A",
        .fitted = {.drain = true},
        .product_bar = {85.0, 105.0, 125.0, 145.0},
        .lives = {whole_year(67.0, 1.004, vane_gaps(1.0), {.end_ratio = 2.5, .begins = 0.25})}};
    const SectionDrawing knife{
        .id = "B",
        .fitted = {.drain = true},
        .product_bar = {70.0, 100.0, 120.0, 150.0},
        .lives = {whole_year(45.0, 0.995, vane_gaps(0.7)),
                  {.from = fitting, .displacement_cm3 = 58.0, .true_share = 1.003, .gaps = vane_gaps(0.88)}}};
    return {.id = "lathe-1",
            .reservoir = 2,
            .rated = {175.0, 1480.0, 50.0},
            .overhaul = {{fitting - 3 * hour_ms, fitting + 2 * hour_ms}},
            .sections = {spindle, knife}};
}

PumpDrawing loader() {
    return {.id = "loader-1",
            .reservoir = 3,
            .rated = {210.0, 1480.0, 50.0},
            .shifts = Shifts::two,
            .sections = {{.id = "A",
                          .fitted = {.delivery = true},
                          .product_bar = {60.0, 95.0, 130.0, 165.0},
                          .lives = {whole_year(63.0, 0.994, external_gear_gaps())}}}};
}

PumpDrawing trimmer() {
    return {.id = "trimmer-1",
            .reservoir = 1,
            .rated = {250.0, 1480.0, 50.0},
            .sections = {{.id = "A",
                          .fitted = {.delivery = true, .delivery_on_return = true},
                          .product_bar = {80.0, 120.0, 160.0, 195.0},
                          .lives = {whole_year(80.0, 1.006, internal_gear_gaps())}}}};
}

PumpDrawing barker() {
    const Wear broken{.step_at = local(8, 28, 9), .step_ratio = 1.85};
    return {.id = "barker-1",
            .reservoir = 4,
            .rated = {350.0, 1480.0, 50.0},
            .sections = {{.id = "A",
                          .fitted = {.drain = true},
                          .product_bar = {150.0, 190.0, 230.0, 270.0},
                          .lives = {whole_year(90.0, 1.002, radial_piston_gaps(), broken)}}}};
}

PumpDrawing scarfer(Millis year_ends) {
    return {.id = "scarfer-1",
            .reservoir = 2,
            .rated = {175.0, 1480.0, 50.0},
            .starts = year_ends - 2 * day_ms,
            .sections = {{.id = "A",
                          .fitted = {.drain = true},
                          .product_bar = {80.0, 110.0, 140.0},
                          .lives = {whole_year(67.0, 1.0, vane_gaps(1.0))}}}};
}

PumpDrawing clipper() {
    return {.id = "clipper-1",
            .reservoir = 3,
            .rated = {175.0, 1480.0, 50.0},
            .shifts = Shifts::two,
            .has_temperature = false,
            .sections = {{.id = "A",
                          .fitted = {.drain = true},
                          .product_bar = {70.0, 100.0, 130.0},
                          .lives = {whole_year(45.0, 1.0, vane_gaps(0.7))}}}};
}

PumpDrawing stacker(Millis year_ends) {
    const Compensator own{
        .setting_bar = 210.0, .droop_bar = 4.0, .pilot_lpm = 1.0, .idle_pilot_lpm = 0.2, .hold_share = 0.5};
    return {.id = "stacker-1",
            .reservoir = 0,
            .rated = {280.0, 1480.0, 50.0},
            .compensator = own,
            .shifts = Shifts::two,
            .has_speed = false,
            .has_running = true,
            .falls_silent = year_ends - 5 * day_ms,
            .sections = {{.id = "A",
                          .fitted = {.drain = true},
                          .product_bar = {90.0, 130.0, 165.0, 185.0},
                          .lives = {whole_year(71.0, 1.003, axial_piston_gaps(0.6))}}}};
}

// The second tank's cooler was chosen for another machine: its oil follows the summer.
std::vector<ReservoirDrawing> tanks() {
    return {
        {.id = "hpu-1", .oil = {.at_40_cst = 47.1, .at_100_cst = 6.95}},
        {.id = "hpu-2",
         .oil = {.at_40_cst = 45.2, .at_100_cst = 6.72},
         .heat_capacity_kj_per_k = 4000.0,
         .wall_w_per_k = 80.0,
         .cooler_w_per_k = 205.0,
         .air_cooled = true,
         .cooler_opens_c = 40.0,
         .machine_losses = 0.12},
        {.id = "hpu-3",
         .oil = {.at_40_cst = 46.3, .at_100_cst = 6.84},
         .heat_capacity_kj_per_k = 800.0,
         .cooler_w_per_k = 700.0},
        {.id = "hpu-4",
         .oil = {.at_40_cst = 46.8, .at_100_cst = 6.85},
         .heat_capacity_kj_per_k = 600.0,
         .wall_w_per_k = 80.0,
         .cooler_w_per_k = 320.0},
        {.id = "hpu-5",
         .oil = {.at_40_cst = 67.0, .at_100_cst = 8.75},
         .heat_capacity_kj_per_k = 900.0,
         .cooler_w_per_k = 800.0,
         .cooler_opens_c = 45.0},
    };
}

std::vector<std::array<Millis, 2>> mill_stops() {
    return {
        {local(1, 1), local(1, 2, 6)},     {local(1, 6), local(1, 7, 6)},   {local(4, 18), local(4, 22, 6)},
        {local(5, 1), local(5, 2, 6)},     {local(6, 20), local(6, 23, 6)}, {local(7, 14, 6), local(7, 19, 6)},
        {local(12, 24, 6), local(12, 27)},
    };
}

}  // namespace

PlantDrawing veneer_mill() {
    PlantDrawing mill{.time_zone = zone,
                      .year_begins = local(1, 1),
                      .year_ends = local(1, 1, 0, 2026),
                      .stops = mill_stops(),
                      .reservoirs = tanks(),
                      .pumps = {}};
    mill.pumps = {
        press("press-1", 0, 1.003, {.end_ratio = 2.6, .begins = 0.22}),
        press("press-2", 1, 0.996, {}),
        lathe(),
        loader(),
        trimmer(),
        barker(),
        scarfer(mill.year_ends),
        clipper(),
        stacker(mill.year_ends),
    };
    return mill;
}

}  // namespace slipledger::plantsim
