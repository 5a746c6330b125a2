#include "tools/plantsim/trouble.hpp"

#include <algorithm>

namespace slipledger::plantsim {

double Trouble::strength(Millis time) const {
    if (time < from || time >= to) return 0.0;
    if (ramp <= 0) return 1.0;
    return std::min(1.0, static_cast<double>(time - from) / static_cast<double>(ramp));
}

double total(const Troubles& troubles, TroubleKind kind, Millis time) {
    double sum = 0.0;
    for (const Trouble& trouble : troubles)
        if (trouble.kind == kind) sum += trouble.size * trouble.strength(time);
    return sum;
}

double left_of(const Troubles& troubles, TroubleKind kind, Millis time) {
    double left = 1.0;
    for (const Trouble& trouble : troubles)
        if (trouble.kind == kind) left *= 1.0 - trouble.size * trouble.strength(time);
    return left;
}

}  // namespace slipledger::plantsim
