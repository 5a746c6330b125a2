#include "tools/plantsim/span.hpp"

#include <algorithm>
#include <array>
#include <thread>

namespace slipledger::plantsim {

CsvLayout layout_for(const PlantDrawing& plant, const std::vector<std::size_t>& pumps) {
    CsvLayout layout;
    std::array<bool, column_count> fitted{};
    const auto mark = [&](Column column, bool is_fitted) { fitted[static_cast<std::size_t>(column)] |= is_fitted; };
    for (const std::size_t p : pumps) {
        const PumpDrawing& pump = plant.pumps[p];
        layout.with_section |= pump.sections.size() > 1;
        mark(Column::outlet_pressure, true);
        mark(Column::shaft_speed, pump.has_speed);
        mark(Column::fluid_temperature, pump.has_temperature);
        mark(Column::running, pump.has_running);
        mark(Column::inlet_pressure, pump.has_inlet_pressure);
        mark(Column::case_pressure, pump.has_case_pressure);
        for (const SectionDrawing& section : pump.sections) {
            mark(Column::case_drain_flow, section.fitted.drain);
            mark(Column::delivery_flow, section.fitted.delivery);
        }
    }
    for (std::size_t i = 0; i < column_count; ++i)
        if (fitted[i]) layout.columns.push_back(static_cast<Column>(i));
    return layout;
}

Pace::Pace(Millis from, std::optional<double> speedup)
    : from_(from), speedup_(speedup), begun_(std::chrono::steady_clock::now()) {}

void Pace::wait_until(Millis data_time) const {
    if (!speedup_) return;
    const std::chrono::duration<double, std::milli> due{static_cast<double>(data_time - from_) / *speedup_};
    std::this_thread::sleep_until(begun_ + std::chrono::duration_cast<std::chrono::steady_clock::duration>(due));
}

}  // namespace slipledger::plantsim
