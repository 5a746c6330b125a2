// Baseline and wear of one section estimated together, summary by summary. A baseline fitted once and frozen calls the
// first summer wear; here what cannot be told apart widens the range instead.
//
//   leakage seen = dV n / 1000 + zero + k + exp(x + u) (a f1 + b f2 + c f3) + noise
//
// with f1..f3 the feature means of the summary in units of the reference point, k only while compensating. An extended
// Kalman filter in Joseph's form, the mean sighting relinearised while the coefficients are still loose. Use `Course`,
// which ties it to steps, levels and days; this class knows neither days nor limits. Source: method.md, 5; Anderson and
// Moore 1979; Durbin and Koopman 2012 (from memory).
#pragma once

#include <limits>

#include "analytics/fact_change.hpp"
#include "analytics/reference_test.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/summary.hpp"
#include "analytics/wear_prior.hpp"

namespace slipledger::analytics {

// ln value and how well it is known: quoted as exp(ln), exp(ln -+ 1.2816 sd).
struct LogEstimate {
    double ln = unknown;
    double sd = unknown;
};

// What the summary at hand says by itself, with the coefficients known at its end.
struct OwnReading {
    double leakage_lpm = unknown;  // wear-dependent part of what was seen
    double healthy_lpm = unknown;  // what it would be at ratio 1, at the same operating points
    double ratio = unknown;
    double ratio_sd = unknown;
};

// Lowest and highest yet seen. Natural logarithms; empty while low > high.
struct SeenSpan {
    double low = std::numeric_limits<double>::infinity();
    double high = -std::numeric_limits<double>::infinity();

    // Not computed: remembers.
    void widen(double ln_low, double ln_high) {
        if (ln_low < low) low = ln_low;
        if (ln_high > high) high = ln_high;
    }
    // Not computed: a difference. Returns a logarithm; 0 while empty. Source: definition.
    double width() const { return high > low ? high - low : 0.0; }
    // Not computed: a difference. Returns a logarithm; 0 inside. Source: definition.
    double distance(double ln) const { return ln < low ? low - ln : ln > high ? ln - high : 0.0; }
};

// Threads: one at a time.
class WearFilter {
public:
    // A new life: forgets all. Nothing is believed until the first summary is fed. Not computed: bookkeeping.
    void begin(const SectionSpec& spec, Basis basis);
    // Facts of the same life changed: coefficients are carried to the new reference point, oil and name plate.
    void adopt(const SectionSpec& spec);

    bool primed() const { return primed_; }

    // What no pump can do: leakage above theoretical flow or far below nothing, features that are no numbers.
    //
    // Not computed: a plausibility check.
    bool impossible(const Summary& summary) const;

    // Time passes: wear, drift and disturbance move as in wear_motion, all else stays.
    // Source: method.md, 5.
    void advance(double running_days, double calendar_days);

    // How far a summary's mean leakage is from what is expected, in standard deviations, before it is fed; of the
    // judged regime with most points. NaN before the first feed and where nothing was judged.
    //
    // Returns a pure number, about N(0, 1) while nothing jumps.
    // Source: Anderson and Moore 1979 (standardised innovation).
    double surprise(const Summary& summary) const;

    // Takes a summary in: mean of each judged regime, contrasts within it, and the meter's zero at a stop. Innovations
    // beyond 2.5 standard deviations weigh less (Huber). With `settled` a, b, c, dV and zero are only considered.
    // Source: method.md, 5.
    void feed(const Summary& summary, bool settled);

    // A jump was found: lets x go where the next summaries say (`jump_variance` more).
    // Source: method.md, 5.
    void open_wear();

    // Facts changed: opens what they may have moved (reopening.hpp), the wear kept. Not computed: hands it on.
    void open_for(const FactChange& change);

    // Takes in a test made past the plant's meters, its leakage seen as exp(x + u) (a f1 + b f2 + c f3), by delivery
    // with dV n / 1000 more. Its variance counts the test's own sd, the gain error that the baseline was learned with,
    // and 3 % of the predicted leakage. Within 3 standard deviations it is a sighting like others, and anchors
    // everything. Beyond, meter and test contradict each other, and the test is believed: x alone follows it all the
    // way, then the meter is opened as if it had been changed.
    //
    // True where they contradict each other; false before the first feed.
    // Example: 3 L/min expected +- 0.1, tested 3.1 +- 0.09 -> false; tested 4.5 -> true, x up by ln 1.5.
    // Source: method.md, 7 (a reference test outranks inference); Anderson and Moore 1979.
    bool heed_test(const TestedLeakage& tested);

    // The part is told to be as new: a sighting of x as 0 +- 0.05. Source: definition; 0.05 is common practice, no source.
    void heed_as_new();

    // x with its standard deviation: ln of the leakage ratio. NaN before the first feed.
    // Source: method.md, 5.
    LogEstimate wear() const;

    // Drift of x per running day, mean and standard deviation, and its covariance with x.
    // Not computed: reads the state.
    const WearBelief& belief() const { return belief_; }

    // The summary's own ratio: (leakage seen - dV n/1000 - zero - k) / (a f1 + b f2 + c f3), regimes by their points.
    // Source: method.md, 5.
    OwnReading own_reading(const Summary& summary) const;

    // ln of healthy leakage a f1 + b f2 + c f3 at a duty point, and how well it is known.
    // Source: method.md, 3 and 5.
    LogEstimate healthy_leakage(const DutyPoint& at) const;

    // The same times exp(x): leakage now, without the slow disturbance.
    // Source: method.md, 3 and 5.
    LogEstimate worn_leakage(const DutyPoint& at) const;

    // Healthy coefficients a, b, c at the reference point; NaN before the first feed. Not computed: exponentials of the
    // state.
    LeakageCoefficients coefficients() const;

    // Distance of a summary or a duty point from what was seen in ln dp and ln viscosity; 0 inside.
    // Returns a pure number. Source: method.md, 5 (after Kennedy and O'Hagan 2001).
    double distance_from_seen(const Moments& moments) const;
    double distance_from_seen(const DutyPoint& at) const;

    // Factor by which dp/mu varied over what was fed. Returns a pure number, 1 before anything.
    // Source: method.md, 3.
    double laminar_span() const;

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.belief_.mean, self.belief_.covariance, self.primed_, self.contrasts_, self.means_, self.misfit_, self.lowered_,
           self.plate_cm3_, self.reference_.pressure_rise_bar, self.reference_.viscosity_pas,
           self.reference_.density_kgm3, self.reference_.speed_rpm);
        for (auto* span : {&self.pressure_, &self.viscosity_, &self.laminar_, &self.speed_}) io(span->low, span->high);
    }
    // After a restore: what follows from the plant file. Not computed: bookkeeping.
    void attach(const SectionSpec& spec, Basis basis);

private:
    using Sighting = stats::Sighting<wear_states>;
    struct Expected {
        WearVector design;
        double leakage_lpm;  // all that is expected to be seen
        double worn_lpm;     // its wear-dependent part
    };
    Expected expect(const WearVector& mean, const Moments& moments, bool compensating) const;
    double noise_variance(const Moments& moments, double worn_lpm) const;
    double inflation() const { return misfit_ > 1.0 ? misfit_ : 1.0; }
    void learn_misfit(double surprise);
    void prime(const Summary& summary);
    void feed_mean(const Moments& moments, bool compensating, bool settled);
    void feed_contrasts(const Moments& moments, bool settled);
    void feed_stop(const Summary& summary, bool settled);
    void take(const Sighting& seen, bool settled);
    void keep_from_healing();
    WearVector held(WearVector gain, bool settled) const;
    void remember(const Moments& moments);
    LogEstimate leakage_at(const DutyPoint& at, bool worn) const;

    WearBelief belief_;
    bool primed_ = false;
    double contrasts_ = 0.0;  // fed so far
    double means_ = 0.0;      // fed so far, up to the memory of `misfit_`
    double misfit_ = 1.0;     // mean square of lately standardised innovations: over 1, the pump bends the three terms
    double lowered_ = 0.0;  // by how much the baseline was moved so that wear does not heal, in ln ratio
    double plate_cm3_ = unknown;
    LeakageState reference_;
    SeenSpan pressure_;
    SeenSpan viscosity_;
    SeenSpan laminar_;
    SeenSpan speed_;
    SectionSpec spec_;
    Basis basis_ = Basis::case_drain;
};

}  // namespace slipledger::analytics
