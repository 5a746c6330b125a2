#include "daemon/report/cause_words.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "analytics/units.hpp"

namespace slipledger::report {
namespace {

using analytics::Basis;
using analytics::CauseKind;
using analytics::Evidence;
using analytics::PumpType;
using analytics::Quantity;
using analytics::RankedCause;
using analytics::Sign;

namespace units = analytics::units;

// Three digits at most, but never an exponent: "1.31", "69.8", "3110".
std::string number(double value) {
    if (!std::isfinite(value)) return "?";
    return std::abs(value) >= 1000.0 ? fmt::format("{:.0f}", value) : fmt::format("{:.3g}", value);
}

bool us(const CauseFacts& facts) { return facts.units == config::DisplayUnits::us; }

std::string flow(double lpm, const CauseFacts& facts) {
    return us(facts) ? number(lpm / units::litres_per_us_gallon) + " gpm" : number(lpm) + " L/min";
}

std::string pressure(double bar, const CauseFacts& facts) {
    return us(facts) ? number(bar / units::bar_per_psi) + " psi" : number(bar) + " bar";
}

std::string reading(double value, Quantity quantity, const CauseFacts& facts) {
    switch (quantity) {
        case Quantity::case_drain_flow:
        case Quantity::delivery_flow: return flow(value, facts);
        case Quantity::outlet_pressure: return pressure(value, facts);
        case Quantity::fluid_temperature:
            return us(facts) ? number(value * 1.8 + 32.0) + " degF" : number(value) + " degC";
        default: return number(value) + " " + std::string(facts_of(quantity).unit);
    }
}

std::string_view instrument_of(Quantity quantity) {
    switch (quantity) {
        case Quantity::case_drain_flow: return "case drain flow meter";
        case Quantity::delivery_flow: return "delivery flow meter";
        case Quantity::outlet_pressure: return "outlet pressure sensor";
        case Quantity::shaft_speed: return "shaft speed sensor";
        case Quantity::fluid_temperature: return "fluid thermometer";
        default: return "instrument";
    }
}

std::string_view flow_meter(Basis basis) {
    return instrument_of(basis == Basis::case_drain ? Quantity::case_drain_flow : Quantity::delivery_flow);
}

std::string part(PumpType type) { return std::string(replaceable_part(type)); }

std::optional<Quantity> instrument_in(const RankedCause& cause) {
    for (const Evidence& evidence : cause.in_favour)
        if (evidence.present && evidence.quantity) return evidence.quantity;
    return std::nullopt;
}

std::string leakage_words(const Evidence& e, const CauseFacts& facts) {
    switch (e.sign) {
        case Sign::ratio_up:
            return e.present ? fmt::format("It leaks {} times what it did when healthy (low end {}), at the same pressure, "
                                           "speed and oil.", number(e.value), number(e.beside))
                             : fmt::format("It leaks no more than when healthy at the same pressure, speed and oil (ratio "
                                           "{}).", number(e.value));
        case Sign::ratio_down:
            return e.present ? fmt::format("It seems to leak less than when healthy (ratio {}); gaps do not heal.",
                                           number(e.value))
                             : fmt::format("It leaks no less than when healthy (ratio {}).", number(e.value));
        case Sign::step:
            return e.present ? fmt::format("Leakage rose at one step, {} times.", number(e.value))
                             : "Leakage has not risen at one step.";
        case Sign::step_explained:
            return e.present ? "The step came in the hour of a change of oil, setting, sensor or operating range."
                             : "No change of oil, setting, sensor or operating range came with the step.";
        case Sign::excess_scales:
            return fmt::format("What it leaks above healthy grows with pressure and thin oil as open gaps do (slope {}, low "
                               "end {}; 1 would be something added).", number(e.value), number(e.beside));
        case Sign::excess_constant:
            return fmt::format("What it leaks above healthy stays the same whatever the pressure and oil, as something added "
                               "does (slope {}; open gaps would make it the leakage ratio).", number(e.value));
        case Sign::worse_when_thick:
            return e.present ? fmt::format("Flow is missing most while the oil is thick (slope {}); open gaps leak most "
                                           "while it is thin.", number(e.value))
                             : "Flow is not missing more while the oil is thick.";
        case Sign::flow_unmoved:
            return fmt::format("At the step the leakage read moved by {} %, what is expected of it by {} %: pressure or "
                               "temperature is read differently, the flow is not.", number(e.value), number(e.beside));
        case Sign::other_basis_agrees:
            return fmt::format("{} shows it too: {} above healthy, {} here.",
                               facts.basis == Basis::case_drain ? "Delivery" : "The case drain", flow(e.value, facts),
                               flow(e.beside, facts));
        case Sign::other_basis_differs:
            return fmt::format("{} does not show it: {} above healthy, {} here.",
                               facts.basis == Basis::case_drain ? "Delivery" : "The case drain", flow(e.value, facts),
                               flow(e.beside, facts));
        default: return {};
    }
}

std::string instrument_words(const Evidence& e, const CauseFacts& facts) {
    const Quantity quantity = e.quantity.value_or(Quantity::outlet_pressure);
    const std::string instrument(instrument_of(quantity));
    switch (e.sign) {
        case Sign::zero_moved:
            return fmt::format("The {} shows {} at standstill, {} when learned.", flow_meter(facts.basis),
                               flow(e.value, facts), flow(e.beside, facts));
        case Sign::flow_at_standstill:
            return fmt::format("It shows {} while the shaft stands still, {} while it runs.", flow(e.value, facts),
                               flow(e.beside, facts));
        case Sign::unit_jump:
            return e.present ? fmt::format("The {} went from {} to {} at once: the factor between two units.", instrument,
                                           reading(e.beside, quantity, facts), reading(e.value, quantity, facts))
                             : "No reading has jumped by the factor between two units.";
        case Sign::stuck:
            return e.present ? fmt::format("The {} has stood at {} to the last digit over {} summaries, while the duty moved.",
                                           instrument, reading(e.value, quantity, facts), number(e.beside))
                             : "No reading stands still.";
        case Sign::off_the_scale:
            if (!e.present) return "No reading is beyond what a pump can do.";
            return std::isfinite(e.beside)
                       ? fmt::format("The {} shows {}; no pump passes {}.", instrument, reading(e.value, quantity, facts),
                                     reading(e.beside, quantity, facts))
                       : fmt::format("The {} stands at {}, where it never was before.", instrument,
                                     reading(e.value, quantity, facts));
        case Sign::contradicting:
            return e.present ? fmt::format("{} % of its readings under way contradict each other.", number(e.value))
                             : "Its readings do not contradict each other.";
        case Sign::missing:
            return e.present ? fmt::format("The {} is missing for {} % of the time under way, {} % when learned.", instrument,
                                           number(e.value), number(e.beside))
                             : "No reading stays away.";
        case Sign::pattern_lost:
            return e.present ? fmt::format("Within the hour the flow no longer follows the pressure (slope {}, {} when "
                                           "learned).", number(e.value), number(e.beside))
                             : "Within the hour the flow follows the pressure as ever.";
        default: return {};
    }
}

std::string moved(std::string_view what, std::string_view now, std::string_view then, bool present) {
    return present ? fmt::format("{} is {}, {} when learned.", what, now, then)
                   : fmt::format("{} is what it was: {}, {} when learned.", what, now, then);
}

std::string plant_words(const Evidence& e, const CauseFacts& facts) {
    const std::string now = number(e.value);
    const std::string then = number(e.beside);
    switch (e.sign) {
        case Sign::share_up:
        case Sign::share_down:
            return moved("Raw leakage as a share of theoretical flow", now + " %", then + " %", e.present);
        case Sign::oil_thinner: return moved("The oil's viscosity", now + " mm2/s", then + " mm2/s", e.present);
        case Sign::pressure_up:
            return moved("Mean pressure", pressure(e.value, facts), pressure(e.beside, facts), e.present);
        case Sign::plateau_moved:
            return moved("The pressure it holds", pressure(e.value, facts), pressure(e.beside, facts), e.present);
        case Sign::case_pressure_up:
            return moved("Case pressure", pressure(e.value, facts), pressure(e.beside, facts), e.present);
        case Sign::inlet_lower:
            return moved("The lowest inlet pressure", pressure(e.value, facts), pressure(e.beside, facts), e.present);
        case Sign::unsteady:
            return e.present ? fmt::format("Within the hour its flow scatters {} times as much as when learned.", now)
                             : fmt::format("Its flow is as steady as when learned (scatter {} times).", now);
        default: return {};
    }
}

std::string sentence_of(const Evidence& evidence, const CauseFacts& facts) {
    for (const auto& words : {leakage_words, instrument_words, plant_words})
        if (std::string text = words(evidence, facts); !text.empty()) return text;
    return std::string(name_of(evidence.sign));
}

std::vector<std::string> sentences_of(const std::vector<Evidence>& evidence, const CauseFacts& facts) {
    std::vector<std::string> sentences;
    for (const Evidence& each : evidence) sentences.push_back(sentence_of(each, facts));
    return sentences;
}

constexpr std::string_view hot_oil =
    " Case oil is hot: a vessel and hose made for it, never a hand; lock out and bleed down before opening the line.";

std::string flow_test(const CauseFacts& facts) {
    const std::string at = pressure(facts.test_pressure_bar, facts);
    if (facts.basis == Basis::case_drain)
        return "Compare drain flow by bucket and stopwatch at " + at + " and usual oil temperature with what is shown." +
               std::string(hot_oil);
    return "Compare delivery at " + at +
           " and usual oil temperature with a calibrated meter in the line. Fit it with the pump locked out and the line "
           "bled down.";
}

std::string settling(CauseKind kind, const CauseFacts& facts) {
    constexpr std::string_view locked = " Lock out and bleed down first.";
    switch (kind) {
        case CauseKind::sudden_damage:
            return "Look for metal in the drain filter and take an oil sample." + std::string(locked);
        case CauseKind::oil_or_operation:
            return "Check what was changed that day: oil, setting, sensor, product. A viscosity measured on a sample tells "
                   "the oil.";
        case CauseKind::internal_return:
        case CauseKind::bypass:
            return "Feel or measure the return lines of the relief and unloading valves between pump and meter for heat; if "
                   "they are cool, it is inside the pump. Pipes burn: use a contact thermometer.";
        case CauseKind::thin_oil:
            return "Compare the tank's temperature with a second thermometer and send an oil sample for viscosity at 40 and "
                   "100 degC; look at sister pumps on the tank.";
        case CauseKind::compensator:
            return "Read the pressure at closed flow on a second gauge and compare it with the setting. Do not turn the "
                   "setting beyond the relief valve's.";
        case CauseKind::inlet_starvation:
            return "Read the vacuum at the inlet port with the oil cold, and look at strainer, suction valve and tank level.";
        case CauseKind::blocked_drain:
            return "Read case pressure at the port and look at drain line, cooler and filter. A shaft seal may burst: keep "
                   "clear of it.";
        case CauseKind::vanes:
            return "Compare delivery with warm oil and at full speed: if it comes back, look at vanes and pressure plate." +
                   std::string(locked);
        case CauseKind::air_in_oil:
            return "Look at the tank through the sight glass for foam and at the suction line's joints for air drawn in.";
        case CauseKind::sensor_stuck:
        case CauseKind::sensor_off_scale:
        case CauseKind::sensor_unit:
            return "Hold a second instrument beside it, and look at its wiring and at how the logger is set up.";
        case CauseKind::clock_off:
            return "Compare the clocks of the loggers that feed this pump; readings of one moment must bear one time.";
        case CauseKind::feed_silent: return "See whether the logger and the line of that reading are alive.";
        case CauseKind::sensor_drifting:
            return "Read the meter with the pump stopped. " + flow_test(facts);
        default: return flow_test(facts);
    }
}

}  // namespace

std::string title_of(const RankedCause& cause, PumpType type, Basis basis) {
    const auto whose = instrument_in(cause);
    const std::string instrument(whose ? instrument_of(*whose) : std::string_view("instrument"));
    switch (cause.kind) {
        case CauseKind::none: return "none";
        case CauseKind::wear: return "wear of the " + part(type);
        case CauseKind::sudden_damage: return "sudden damage of the " + part(type);
        case CauseKind::wear_or_instrument: return "wear or instrument, not separable";
        case CauseKind::instrument: return "instrument in doubt";
        case CauseKind::oil_or_operation: return "a change of oil, setting or duty";
        case CauseKind::internal_return:
            return type == PumpType::vane ? "leakage back inside the pump, at the side plates"
                                          : "leakage back inside the pump, at the port plate";
        case CauseKind::bypass: return "a valve between pump and meter that passes";
        case CauseKind::thin_oil: return "thin or hot oil";
        case CauseKind::compensator: return "compensator out of adjustment";
        case CauseKind::inlet_starvation: return "inlet starved, cavitation";
        case CauseKind::blocked_drain: return "case drain blocked";
        case CauseKind::vanes: return "vanes that do not come out";
        case CauseKind::air_in_oil: return "air in the oil";
        case CauseKind::sensor_stuck: return instrument + " standing still";
        case CauseKind::sensor_drifting: return std::string(flow_meter(basis)) + " or another instrument drifting";
        case CauseKind::sensor_off_scale: return instrument + " off its scale";
        case CauseKind::sensor_unit: return instrument + " read in another unit";
        case CauseKind::clock_off: return "a logger whose clock is off";
        case CauseKind::feed_silent: return instrument + " silent";
    }
    return "none";
}

std::vector<CauseWords> words_of(const std::vector<RankedCause>& causes, const CauseFacts& facts) {
    std::vector<CauseWords> words;
    for (const RankedCause& cause : causes)
        words.push_back({cause.kind, cause.weight, title_of(cause, facts.type, facts.basis),
                         sentences_of(cause.in_favour, facts), sentences_of(cause.against, facts),
                         settling(cause.kind, facts)});
    return words;
}

bool wear_or_instrument(const std::vector<RankedCause>& causes) {
    if (causes.empty() || causes.front().kind != CauseKind::wear) return false;
    return std::ranges::none_of(causes.front().in_favour,
                                [](const Evidence& evidence) { return evidence.sign == Sign::excess_scales; });
}

}  // namespace slipledger::report
