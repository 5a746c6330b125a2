#include "analytics/hindsight.hpp"

namespace slipledger::analytics {

Found found_named(std::string_view word) {
    if (word == "worn") return Found::worn;
    if (word == "damaged") return Found::damaged;
    return word == "good" ? Found::good : Found::not_told;
}

std::string_view name_of(Hindsight hindsight) {
    switch (hindsight) {
        case Hindsight::right:
            return "right";
        case Hindsight::late:
            return "late";
        case Hindsight::wrong:
            return "wrong";
        case Hindsight::not_known:
            break;
    }
    return "";
}

Hindsight in_hindsight(Level at_end, Found found) {
    if (found == Found::not_told || at_end == Level::unjudged) return Hindsight::not_known;
    if (found == Found::good) return at_end >= Level::plan ? Hindsight::wrong : Hindsight::right;
    if (at_end >= Level::plan) return Hindsight::right;
    return at_end == Level::watch ? Hindsight::late : Hindsight::wrong;
}

}  // namespace slipledger::analytics
