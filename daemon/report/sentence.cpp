#include "daemon/report/sentence.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <cmath>

#include "analytics/outlook.hpp"
#include "daemon/report/cause_words.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {
namespace {

using analytics::CauseKind;
using analytics::DayVerdict;
using analytics::Level;
using analytics::Ranged;
using analytics::UnjudgedReason;

// As precise as a ratio deserves: hundredths near 1, where they tell sound from worn, tenths beyond.
std::string ratio(double value) {
    return value < 1.5 ? fmt::format("{:.2f}", value) : fmt::format("{:.1f}", value);
}

std::string range(const Ranged& ranged) {
    const int digits = ranged.value < 1.5 ? 2 : 1;
    return fmt::format("{:.{}f} to {:.{}f}", ranged.low, digits, ranged.high, digits);
}

// Two significant digits; hours in hand are never better known.
std::string hours(double value) {
    if (value < 1.0) return "0";
    const double unit = std::pow(10.0, std::floor(std::log10(value)) - 1.0);
    return fmt::format("{:.0f}", unit < 1.0 ? std::round(value) : std::round(value / unit) * unit);
}

std::string subject(const SentenceFacts& facts) {
    return facts.only_section ? "The pump" : "Section " + facts.section;
}

std::string limit_name(const SentenceFacts& facts, std::string_view rule) {
    if (rule == "efficiency") return fmt::format("its limit of {:g} points of efficiency lost", facts.act_points_lost);
    if (rule == "drain-share") return fmt::format("its limit of {:g} % drain share", facts.act_drain_share_percent);
    return fmt::format("its limit of {:g}", facts.act_ratio);
}

std::string unjudged(const SentenceFacts& facts) {
    const DayVerdict& day = facts.verdict;
    switch (day.reason) {
        case UnjudgedReason::learning: {
            const double judged = std::max(0.0, facts.least_judged_h - day.learning_h_left);
            return fmt::format("{} is still being learned: {:.0f} of {:g} judged running hours.", subject(facts), judged,
                               facts.least_judged_h);
        }
        case UnjudgedReason::seldom_judged:
            if (!std::isfinite(day.share_judged_30d))
                return subject(facts) + " is not judged: too few of its running hours of the last 30 days could be.";
            return fmt::format("{} is not judged: only {:.0f} % of its running hours of the last 30 days could be.",
                               subject(facts), 100.0 * day.share_judged_30d);
        case UnjudgedReason::shared_drain:
            return subject(facts) + " is not judged by itself: one drain meter serves it and others.";
        case UnjudgedReason::no_basis:
            return subject(facts) + " is not judged: neither a case drain flow nor a delivery flow comes in for it.";
        case UnjudgedReason::no_temperature:
            return subject(facts) + " is not judged: its fluid temperature, and so the oil's viscosity, is not known; only its raw "
                                    "drain share is watched.";
        case UnjudgedReason::instrument:
            return subject(facts) + " is not judged: an instrument is in doubt, and what rests on it is held back.";
        default: return subject(facts) + " is not judged yet: no steady operating point under load has come in.";
    }
}

std::string leaks(const SentenceFacts& facts) {
    const Ranged& now = facts.verdict.leakage_ratio;
    if (!std::isfinite(now.value))
        return fmt::format("{} is {}; its leakage ratio is not known", subject(facts), name_of(facts.verdict.level));
    const std::string same = facts.temperature_known ? "at the same pressure, speed and oil"
                                                     : "at the same pressure and speed, oil temperature unknown";
    const std::string seen = facts.basis == analytics::Basis::delivery ? ", by its delivery flow" : "";
    const bool as_before = facts.verdict.level <= Level::sound && now.low <= 1.0 && now.high >= 1.0;
    if (as_before)
        return fmt::format("{} leaks {} (ratio {}, {}), {}{}", subject(facts), facts.compared_with, ratio(now.value),
                           range(now), same, seen);
    return fmt::format("{} leaks {} times ({}) {}, {}{}", subject(facts), ratio(now.value), range(now),
                       facts.compared_with, same, seen);
}

// The same as dates, at the duty planned or usual.
std::string when(const SentenceFacts& facts) {
    const analytics::HoursInHand& left = facts.verdict.hours_in_hand;
    if (facts.time_zone.empty()) return {};
    const auto low = analytics::instant_ahead(facts.verdict.day.end, left.low, left.duty_h_per_day);
    const auto mid = analytics::instant_ahead(facts.verdict.day.end, left.mid, left.duty_h_per_day);
    if (!low || !mid) return {};
    return fmt::format(", around {} and hardly before {}", local_date(*mid, facts.time_zone),
                       local_date(*low, facts.time_zone));
}

std::string in_hand(const SentenceFacts& facts) {
    const DayVerdict& day = facts.verdict;
    const analytics::HoursInHand& left = day.hours_in_hand;
    if (day.leakage_ratio.value > facts.act_ratio) return "; that is beyond " + limit_name(facts, "leakage-ratio");
    if (std::isfinite(left.mid))
        return fmt::format("; about {} running hours to {}", hours(left.mid), limit_name(facts, left.limit)) + when(facts);
    if (std::isfinite(left.low) && day.trend.established)
        return fmt::format("; at least {} running hours to {}", hours(left.low), limit_name(facts, left.limit));
    if (std::isfinite(left.low))
        return fmt::format("; no wear trend, at least {} running hours in hand", hours(left.low));
    return {};
}

std::string step(const SentenceFacts& facts) {
    const double ratio_of_step = facts.verdict.step_ratio;
    if (!std::isfinite(ratio_of_step) || facts.verdict.level <= Level::sound) return {};  // it has gone again
    return fmt::format(" It rose at one step, {} times.", ratio(ratio_of_step));
}

std::string part(const SentenceFacts& facts) { return std::string(replaceable_part(facts.type)); }

std::string wear_action(const SentenceFacts& facts) {
    switch (facts.verdict.level) {
        case Level::watch: return "Watch it; nothing to order yet.";
        case Level::plan:
            return facts.spare_in_stock ? "Plan to fit the " + part(facts) + " in stock."
                                        : "Order a " + part(facts) + ".";
        case Level::act:
            return facts.spare_in_stock ? "Replace the " + part(facts) + " at the next stop; one is in stock."
                                        : "Order a " + part(facts) + " now and replace it at the next stop.";
        default: return "Nothing to do.";
    }
}

std::string not_separable(const SentenceFacts& facts) {
    std::string action = "Wear or instrument, not yet separable: check the flow meter with a reference test";
    if (facts.verdict.level < Level::plan) return action + ".";
    std::string then = wear_action(facts);
    then[0] = static_cast<char>(std::tolower(static_cast<unsigned char>(then[0])));
    return action + "; if it agrees, " + then;
}

std::string look_at_instruments(const SentenceFacts& facts) {
    const std::vector<analytics::RankedCause>& causes = facts.verdict.causes;
    if (causes.empty() || !is_instrument(causes.front().kind)) return "Check the instruments first.";
    return "Check the instruments first: " + title_of(causes.front(), facts.type, facts.basis) + ".";
}

// What goes before replacing anything; empty where nothing does.
std::string first_look(const SentenceFacts& facts) {
    const CauseKind cause = facts.verdict.cause;
    if (is_instrument(cause)) return look_at_instruments(facts);
    switch (cause) {
        case CauseKind::wear_or_instrument: return "Wear or instrument, not yet separable: check the flow meter with a "
                                                   "reference test.";
        case CauseKind::wear:
            return wear_or_instrument(facts.verdict.causes) ? not_separable(facts) : std::string();
        case CauseKind::oil_or_operation: return "Check oil and settings first: the change came with one of them.";
        case CauseKind::internal_return:
        case CauseKind::bypass:
            return "Rule out a valve that passes between pump and meter; if none does, have the pump opened.";
        case CauseKind::thin_oil: return "Check oil temperature and grade first.";
        case CauseKind::compensator: return "Check the compensator's setting first.";
        case CauseKind::inlet_starvation: return "Check suction line, strainer and oil level first.";
        case CauseKind::blocked_drain: return "Check the drain line and its filter first.";
        case CauseKind::vanes: return "Check first whether delivery comes back with warm oil.";
        case CauseKind::air_in_oil: return "Look for foam in the tank and air drawn in at the suction line first.";
        default: return {};
    }
}

}  // namespace

std::string compared_with(analytics::BaselineKind baseline, bool from_new, const std::string& began) {
    using analytics::BaselineKind;
    if (from_new) return "what it did when new";
    switch (baseline) {
        case BaselineKind::maker_test: return "what its maker measured when it was new";
        case BaselineKind::reference_test: return "what a reference test showed when it was as new";
        case BaselineKind::sisters: return "what its sisters do when healthy";
        case BaselineKind::from_new: return "what it did when new";
        case BaselineKind::watching_began: break;
    }
    return "what it did when watching began (" + began + ")";
}

std::string what_to_do(const SentenceFacts& facts) {
    if (!facts.silent_since.empty()) return "Check its feed.";
    if (facts.verdict.level == Level::unjudged) {
        if (facts.verdict.reason == UnjudgedReason::no_temperature)
            return "Fit a temperature sensor at its inlet, or give the tank's thermometer to its reservoir.";
        if (facts.verdict.reason == UnjudgedReason::instrument) return look_at_instruments(facts);
        const bool sensors = facts.verdict.reason == UnjudgedReason::no_basis ||
                             facts.verdict.reason == UnjudgedReason::shared_drain;
        return sensors ? "Fit a flow meter of its own to have it judged." : "Keep its readings coming.";
    }
    const std::string first = first_look(facts);
    const bool speaks_of_wear = facts.verdict.cause <= CauseKind::wear_or_instrument;
    if (first.empty() || (facts.verdict.level == Level::sound && speaks_of_wear)) return wear_action(facts);
    return first;
}

std::string sentence(const SentenceFacts& facts) {
    if (!facts.silent_since.empty())
        return fmt::format("{} has sent no readings since {}. {}", subject(facts), facts.silent_since, what_to_do(facts));
    if (facts.verdict.level == Level::unjudged) return unjudged(facts) + " " + what_to_do(facts);
    return leaks(facts) + in_hand(facts) + "." + step(facts) + " " + what_to_do(facts);
}

}  // namespace slipledger::report
