// Gathers from the summaries of one section what tells causes apart: how its pressures, oil, scatter and instruments
// stand of late beside what they were when it was learned. Knows no weights; causes.hpp has those.
#pragma once

#include <optional>

#include "analytics/course.hpp"
#include "analytics/departure_look.hpp"
#include "analytics/excess_slope.hpp"
#include "analytics/instrument_watch.hpp"
#include "analytics/own_usual.hpp"
#include "analytics/signs.hpp"
#include "analytics/swing_pattern.hpp"

namespace slipledger::analytics {

// What the other basis of the section said at the end of the day before, where both are fitted.
struct OtherBasis {
    double excess_lpm = unknown;
    double excess_low = unknown;  // 80 % range
    double excess_high = unknown;
};

// The other basis in the terms of signs, from its verdict: the excess with the range of its ratio. NaN where it has
// none.
//
//   e = (w - 1) q0,   q0 = leakage / w
//
// Example: leakage 4 L/min at ratio 2 (1.5 to 2.5) -> 2 (1 to 3).
// Source: definition of the ratio (method.md, 3).
OtherBasis other_basis_of(const DayVerdict& verdict);

// What is known of the section's leakage when its signs are asked for. Threads: a value, share freely.
struct LeakageStanding {
    Ranged ratio;
    bool step = false;            // in force
    bool step_explained = false;  // by a change of oil, sensor, setting or range at the same hour
    double step_ratio = unknown;
    std::optional<Slope> slope;
    OtherBasis other;
};

// Threads: one at a time.
class SignWatch {
public:
    SignWatch();

    // Takes one summary, and what it says of leakage with the coefficients known before it is fed (NaN before there are
    // any). Not computed: hands it on.
    void add(const Summary& summary, const OwnReading& own, const LeakageCoefficients& coefficients,
             const SectionSpec& spec);

    // Leakage has departed upwards, from that summary on: keeps what was usual before. False where that is known
    // already. Not computed: remembers.
    bool begin_departure(Instant began);
    // Facts of the life changed. Not computed: forgets what they bear on.
    void change_facts(const SectionSpec& before, const SectionSpec& now);

    // How each sign stands. What `from` and `to` of each are (0 absent, 1 plain) stands beside it in sign_watch.cpp.
    // Source: common practice, no source.
    Signs signs(const LeakageStanding& leakage) const;

    // Something other than the leakage ratio asks for an explanation. A summer is no reason to ask: oil must be thinner
    // by a fifth than at the rated temperature too. Not computed: compares strengths.
    bool ask_for_explanation(const Signs& signs) const;

    // Not computed: reads the state.
    const InstrumentWatch& instruments() const { return instruments_; }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.basis_, self.instruments_, self.share_, self.viscosity_, self.pressure_, self.highest_pressure_,
           self.compensating_, self.case_pressure_, self.inlet_, self.stop_flow_, self.leakage_, self.excess_,
           self.pattern_, self.departure_, self.since_departure_h_, self.rated_cst_);
    }

private:
    void take_running(const Summary& summary);
    void take_leakage(const Summary& summary, const OwnReading& own, const LeakageCoefficients& coefficients,
                      const SectionSpec& spec);

    void fill_leakage(Signs& signs, const LeakageStanding& leakage) const;
    void fill_slope(Signs& signs, const LeakageStanding& leakage) const;
    std::optional<Slope> slope_of_all(const std::optional<Slope>& between_hours, double excess) const;
    void fill_zero(Signs& signs) const;
    void fill_oil(Signs& signs) const;
    void fill_ports(Signs& signs) const;
    void fill_pattern(Signs& signs, const LeakageStanding& leakage) const;
    void fill_departure(Signs& signs, const LeakageStanding& leakage) const;
    void fill_other_basis(Signs& signs, const LeakageStanding& leakage) const;

    Basis basis_ = Basis::case_drain;
    InstrumentWatch instruments_;
    OwnUsual share_;             // leakage seen over theoretical flow, fraction
    OwnUsual viscosity_;         // mm2/s
    OwnUsual pressure_;          // bar, mean while running
    OwnUsual highest_pressure_;  // bar, of a summary
    OwnUsual compensating_;      // share of points on the plateau
    OwnUsual case_pressure_;     // bar, highest of a summary
    OwnUsual inlet_;             // bar, lowest of a summary
    OwnUsual stop_flow_;         // L/min, by summaries with a settled stop
    OwnUsual leakage_;           // L/min
    OwnUsual excess_;            // L/min
    SwingPattern pattern_;
    DepartureLook departure_;
    double since_departure_h_ = 1e6;  // judged hours
    double rated_cst_ = unknown;      // the oil's viscosity at rated temperature
};

}  // namespace slipledger::analytics
