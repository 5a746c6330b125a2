#include "analytics/reopening.hpp"

#include "analytics/operating_point.hpp"

namespace slipledger::analytics {

namespace {

constexpr double label_sd = 0.058;    // ln viscosity: 10 % to either side, equally likely: 0.1 / sqrt 3
constexpr double old_gain_sd = 0.35;  // ln flow: by how much a meter that had to go may have been off
constexpr double delivery_gain_sd = 0.03;
constexpr double pressure_sd = 0.10;     // ln pressure
constexpr double thermometer_sd = 0.10;  // ln viscosity: 2 K at 5 % per K
constexpr double speed_sd = 0.01;        // ln speed

double square(double v) {
    return v * v;
}

void open_level(WearBelief& belief, double sd) {
    belief.covariance.topLeftCorner<3, 3>().array() += square(sd);
}

void renew_zero(WearBelief& belief, const SectionSpec& spec, Basis basis) {
    belief.mean(meter_zero) = 0.0;
    belief.covariance.row(meter_zero).setZero();
    belief.covariance.col(meter_zero).setZero();
    belief.covariance(meter_zero, meter_zero) = square(zero_spread(spec, basis));
}

}  // namespace

void open_for(WearBelief& belief, const FactChange& change, const SectionSpec& spec, Basis basis) {
    const bool by_delivery = basis == Basis::delivery;
    if (change.oil_by_label) belief.covariance(ln_laminar, ln_laminar) += square(label_sd);
    if (change.changes(flow_quantity(basis))) {
        renew_zero(belief, spec, basis);
        if (by_delivery)
            belief.covariance(displacement, displacement) += square(delivery_gain_sd * spec.displacement_cm3);
        else
            open_level(belief, old_gain_sd);
    }
    if (change.changes(Quantity::outlet_pressure)) {
        belief.covariance(ln_laminar, ln_laminar) += square(pressure_sd);
        belief.covariance(ln_orifice, ln_orifice) += square(pressure_sd / 2.0);
    }
    if (change.changes(Quantity::fluid_temperature))
        belief.covariance(ln_laminar, ln_laminar) += square(thermometer_sd);
    if (by_delivery && change.changes(Quantity::shaft_speed))
        belief.covariance(displacement, displacement) += square(speed_sd * spec.displacement_cm3);
}

}  // namespace slipledger::analytics
