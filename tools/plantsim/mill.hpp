// The mill at work. Two passes: first the year is walked through once, in steps of five minutes, for what has a memory
// (running hours, and oil temperatures, into which every pump's losses go); then any row of any pump at any moment is a
// pure function of that.
#pragma once

#include <memory>
#include <string_view>
#include <vector>

#include "tools/plantsim/drawing.hpp"
#include "tools/plantsim/duty.hpp"
#include "tools/plantsim/meter.hpp"
#include "tools/plantsim/row.hpp"
#include "tools/plantsim/section.hpp"
#include "tools/plantsim/wear.hpp"

namespace slipledger::plantsim {

// Threads: immutable once made, share freely.
class Mill {
public:
    Mill(PlantDrawing plant, std::uint64_t seed);
    ~Mill();
    Mill(const Mill&) = delete;
    Mill& operator=(const Mill&) = delete;

    const PlantDrawing& plant() const { return plant_; }

    // Appends what the pump's logger writes at `time`, a row a section: nothing before it starts and once it is silent.
    void sample(std::size_t pump, Millis time, std::vector<Row>& rows) const;

    // True leakage ratio of the life in service at `time`, as far as the section's meters see it.
    double ratio(std::size_t pump, std::size_t section, Millis time) const;

    // Growth of that life's fastest gap at `time`, or, with all that has broken by then, after `hours` more running
    // hours.
    double growth(std::size_t pump, std::size_t section, Millis time, double hours = 0.0) const;
    const Life& life(std::size_t pump, std::size_t section, Millis time) const;

    double running_hours(std::size_t pump, Millis time) const;  // since the year began
    double tank_c(std::size_t reservoir, Millis time) const;

private:
    struct SectionAtWork;
    struct PumpAtWork;

    void count_hours();
    void fit_wear(std::uint64_t seed);
    void heat_tanks(std::uint64_t seed);
    double losses_kw(std::size_t pump, Millis time, double tank_c) const;
    double shaft_speed(const PumpAtWork& pump, const std::vector<Demand>& demands) const;
    std::size_t life_at(std::size_t pump, std::size_t section, Millis time) const;
    OilFill oil_at(std::size_t reservoir, Millis time) const;
    Strain strain_of(std::size_t pump, std::size_t section, Millis time) const;
    Strain strain_at_work(std::size_t pump, std::size_t section, const Demand& demand, double speed, Millis time) const;
    void show_honestly(std::size_t pump, Millis time, std::vector<Row>& rows) const;
    void show_shaft_and_oil(std::size_t pump, double speed, Row& row) const;
    void show_common_drain(std::size_t pump, const std::vector<Demand>& demands, double speed, Row& row) const;
    void show_section(std::size_t pump, std::size_t section, const Demand& demand, const Strain& strain,
                      Row& row) const;
    double drained_lpm(std::size_t pump, std::size_t section, const Demand& demand, const Strain& strain,
                       Millis time) const;
    double outlet_lpm(std::size_t pump, std::size_t section, const Demand& demand, const Strain& strain,
                      Millis time) const;
    double passing_lpm(std::size_t pump, std::size_t section, const Strain& strain, Millis time) const;
    void mislead(std::size_t pump, Millis time, std::vector<Row>& rows, std::size_t first) const;
    double misread(std::size_t pump, const Trouble& trouble, const Row& row) const;
    double along(const std::vector<double>& course, Millis time) const;

    PlantDrawing plant_;
    Millis walk_begins_;
    std::size_t walk_steps_;
    Calendar calendar_;
    std::vector<std::unique_ptr<PumpAtWork>> pumps_;
    std::vector<std::vector<double>> tanks_c_;  // by reservoir and step
};

}  // namespace slipledger::plantsim
