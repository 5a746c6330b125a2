#include "analytics/fact_change.hpp"

#include "analytics/operating_point.hpp"

namespace slipledger::analytics {

bool FactChange::opens_baseline(Basis basis) const {
    return oil_by_label || changes(flow_quantity(basis)) || changes(Quantity::outlet_pressure) ||
           changes(Quantity::fluid_temperature) || (basis == Basis::delivery && changes(Quantity::shaft_speed));
}

}  // namespace slipledger::analytics
