#include "analytics/reference_test.hpp"

#include <cmath>

#include "analytics/flow.hpp"
#include "analytics/wear_prior.hpp"

namespace slipledger::analytics {

std::optional<TestedLeakage> tested_leakage(const ReferenceTest& test, const SectionSpec& spec) {
    TestedLeakage tested;
    const LeakageState at = leakage_state(test.at, test.viscosity_cst, spec);
    tested.features = features_at(at, reference_state(spec));
    tested.flow_lpm = test.flow_lpm;
    tested.speed_rpm = test.at.speed_rpm;
    tested.sd_lpm = test.accuracy * test.flow_lpm;
    tested.leakage_lpm =
        test.of == Basis::case_drain
            ? test.flow_lpm - spec.case_flushing_lpm
            : theoretical_flow_lpm(spec.displacement_cm3, test.at.speed_rpm, spec.max_stroke_fraction) - test.flow_lpm;
    const Features& f = tested.features;
    const bool oil_known = std::isfinite(test.at.temperature_c) || std::isfinite(test.viscosity_cst);
    const bool can_be = oil_known && tested.sd_lpm > 0.0 && test.at.speed_rpm > 0.0 && test.at.pressure_bar > 0.0 &&
                        std::isfinite(f.laminar + f.orifice + f.speed + tested.leakage_lpm);
    return can_be ? std::optional(tested) : std::nullopt;
}

}  // namespace slipledger::analytics
