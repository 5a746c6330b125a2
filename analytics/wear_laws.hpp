// How fast a section wears, as each of several wear laws sees it, day by day. The wear filter follows wear whatever it
// does and so knows its drift only roughly; a law ties the days of a life together and knows its rate much better, as
// long as it holds. Which law holds, and whether its rate has just changed, is weighed by how well each foretold the
// next day. The prognosis stands on this. Use `Course`, which feeds it once a day.
//
//   dx/dt = r exp((k - 1) x),   ln ratio of the day = x + u + noise
//
// with x = ln w, r the rate at ratio 1 and u the slow disturbance of the wear filter. Each law runs twice: with a rate
// that hardly wanders, and with one that is free to change; between the two it goes over with small chances
// (interacting multiple models). Source: H. A. P. Blom and Y. Bar-Shalom, The interacting multiple model algorithm,
// IEEE TAC 33 (1988) (from memory); method.md, 6.
#pragma once

#include <array>

#include "analytics/life_prior.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/stats/kalman.hpp"
#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

// How much wear jitters about its law: ln ratio per running day^0.5. What a rate may do in the long run is not in it.
inline constexpr double wear_jitter = 0.002;

// What one law says now: joint normal of x and of the rate at ratio 1, per running day.
struct LawBelief {
    double power = 0.0;
    double weight = 0.0;
    double ln_ratio = unknown;
    double rate = unknown;
    double ratio_variance = unknown;
    double rate_variance = unknown;
    double covariance = unknown;
};

// Drift of x per running day over all laws.
struct DriftEstimate {
    double mean = unknown;
    double sd = unknown;
    double positive = unknown;  // probability that there is any
};

// Threads: one at a time.
class WearLaws {
public:
    // Starts where the filter stands once its baseline is learned; of the rate nothing is known. Not computed:
    // bookkeeping.
    void begin(const LogEstimate& wear, Basis basis);
    bool begun() const { return begun_; }

    // Takes in a day: every law moves on by the running and calendar days since the last one, and is weighed by how
    // likely the day's own ln ratio was to it. A day that is no number only moves them. Source: Blom and Bar-Shalom
    // 1988; wear_motion for x and u.
    void take(double ln_ratio, double running_days, double calendar_days, Basis basis);

    // A jump was found: wear goes where the next days say (`jump_variance` more), rates stay.
    // Source: method.md, 5.
    void let_go();

    // What each law says, its weight by the days times its weight beforehand. Both of its runs taken together.
    // Source: Blom and Bar-Shalom 1988 (combination).
    std::array<LawBelief, wear_laws> laws(const LawWeights& beforehand) const;

    // v = r w^(k-1) over all of them, mean and standard deviation, and how likely v > 0 is. NaN before `begin`.
    // Source: method.md, 6.
    DriftEstimate drift(const LawWeights& beforehand) const;

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.laws_, self.begun_);
    }

private:
    static constexpr int states = 3;  // x, r, u
    using Belief = stats::Belief<states>;
    static constexpr std::size_t both = 2;  // steady, free

    struct Run {
        Belief belief;
        double weight = 0.0;  // of the two of its law

        template <typename Self, typename Io>
        static void each_field(Self& self, Io& io) {
            io(self.belief.mean, self.belief.covariance, self.weight);
        }
    };
    struct Law {
        std::array<Run, both> runs;
        double ln_weight = 0.0;  // by the days, up to a constant common to all laws

        template <typename Self, typename Io>
        static void each_field(Self& self, Io& io) {
            io(self.runs, self.ln_weight);
        }
    };
    struct Passed {
        double running_days;
        double calendar_days;
        Basis basis;
    };
    static void mix(Law& law, double running_days);
    static void move(Belief& belief, double power, std::size_t run, const Passed& passed);
    static double weigh(Law& law, double ln_ratio);
    static Belief together(const Law& law);

    std::array<Law, wear_laws> laws_;
    bool begun_ = false;
};

}  // namespace slipledger::analytics
