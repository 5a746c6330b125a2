// What speaks against the instruments of a section: readings that stand still, jump by the factor between two units,
// leave what any pump can do, stay away, or contradict each other. Everything here is decided on what the readings
// themselves show, before anything is made of the leakage.
#pragma once

#include <array>
#include <optional>

#include "analytics/own_usual.hpp"
#include "analytics/signs.hpp"
#include "analytics/stuck_run.hpp"
#include "analytics/summary.hpp"
#include "analytics/unit_jump.hpp"

namespace slipledger::analytics {

// Threads: one at a time.
class InstrumentWatch {
public:
    InstrumentWatch();

    // Takes what the instruments showed over one summary. Not computed: hands it on.
    void add(const Summary& summary, const SectionSpec& spec);

    // Fills in the signs unit_jump, stuck, off_the_scale, contradicting, missing and flow_at_standstill:
    //
    //   contradicting        of the last 3 running hours' points: plain from half of them
    //   missing              share of points without pressure, speed or temperature: from 30 to 70 %, where it was
    //   under
    //                        10 % when learned
    //   off_the_scale        outlet below -1.5 bar or above 1.6 times rated, oil below -30 or above 120 degC, shaft
    //                        faster than 1.5 times rated; or a value that stands still where it never was
    //   flow_at_standstill   median of a settled stop over the mean flow while running: from 15 to 40 %
    //
    // Source: common practice, no source.
    void fill(Signs& signs) const;

    // An instrument contradicts itself so plainly that what rests on it cannot be judged: a unit jump, a standstill,
    // off the scale. Not computed: reads the state.
    bool broken() const;

    // Facts of sensors changed: nothing told so far holds. Not computed: forgets.
    void begin_anew() { *this = InstrumentWatch(); }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.basis_, self.flow_run_, self.pressure_run_, self.speed_run_, self.temperature_run_, self.flow_jump_,
           self.pressure_jump_, self.speed_jump_, self.temperature_jump_, self.contradicting_, self.missing_pressure_,
           self.missing_speed_, self.missing_temperature_, self.running_flow_, self.stop_flow_, self.off_value_,
           self.off_limit_, self.off_quantity_, self.off_in_a_row_);
    }

private:
    // A reading alone, and beside the one that would go with it if it were the pump: a drain flow follows its pressure,
    // a delivery its shaft. Told only where both jump.
    struct Jumps {
        UnitJumpWatch alone;
        UnitJumpWatch beside;

        explicit Jumps(Quantity quantity) : alone(quantity), beside(quantity) {}
        void add(double mean, double companion) {
            alone.add(mean);
            beside.add(mean / companion);
        }
        bool told() const { return alone.told() && beside.told(); }
        template <typename Self, typename Io>
        static void each_field(Self& self, Io& io) {
            io(self.alone, self.beside);
        }
    };

    void take_runs(const Summary& summary);
    void take_jumps(const Summary& summary);
    void take_counts(const Summary& summary);
    void take_scale(const Summary& summary, const SectionSpec& spec);
    Quantity flow() const;
    SignReading jumped() const;
    // The longest run of a stuck sensor, at a value where it had been, or at one where it never was.
    SignReading stands_still(bool where_it_had_been) const;
    SignReading off_the_scale() const;
    SignReading missing() const;
    SignReading at_standstill() const;

    Basis basis_ = Basis::case_drain;
    StuckRun flow_run_;
    StuckRun pressure_run_;
    StuckRun speed_run_;
    StuckRun temperature_run_;
    Jumps flow_jump_{Quantity::case_drain_flow};
    Jumps pressure_jump_{Quantity::outlet_pressure};
    Jumps speed_jump_{Quantity::shaft_speed};
    Jumps temperature_jump_{Quantity::fluid_temperature};
    OwnUsual contradicting_;
    OwnUsual missing_pressure_;
    OwnUsual missing_speed_;
    OwnUsual missing_temperature_;
    OwnUsual running_flow_;
    double stop_flow_ = unknown;  // of the last settled stop
    double off_value_ = unknown;
    double off_limit_ = unknown;
    Quantity off_quantity_ = Quantity::outlet_pressure;
    std::int32_t off_in_a_row_ = 0;
};

}  // namespace slipledger::analytics
