#include "tools/judging/floors.hpp"

#include <fmt/format.h>

#include <array>
#include <cmath>

namespace slipledger::judging {
namespace {

struct Floor {
    std::string_view figure;
    double lowest;
    double highest;
};

constexpr double any = 1e9;

constexpr std::array<Floor, 1> floors{{
    {"false-healthy", -any, any},
}};

}  // namespace

BenchOrder short_order() {
    return {.fleets = {{Fleet::healthy, 8},
                       {Fleet::wear, 14},
                       {Fleet::step, 6},
                       {Fleet::confounded, 15},
                       {Fleet::hard, 4},
                       {Fleet::double_pumps, 2},
                       {Fleet::taken_over, 3}},
            .telling = {.seed = 4}};
}

BenchOrder full_order() {
    return {.fleets = {{Fleet::healthy, 180},
                       {Fleet::wear, 240},
                       {Fleet::step, 50},
                       {Fleet::confounded, 270},
                       {Fleet::mixed, 100},
                       {Fleet::hard, 60},
                       {Fleet::double_pumps, 24},
                       {Fleet::taken_over, 30},
                       {Fleet::second_life, 30},
                       {Fleet::internal_return, 12}},
            .telling = {.seed = 4, .fast_loggers = true}};
}

std::vector<std::string> fallen(const std::vector<Figure>& figures) {
    std::vector<std::string> sentences;
    for (const Floor& floor : floors)
        for (const Figure& figure : figures) {
            if (figure.name != floor.figure) continue;
            if (figure.value >= floor.lowest && figure.value <= floor.highest) continue;
            sentences.push_back(fmt::format("{} ({}) is {:.4g}; wanted {:g} to {:g}", figure.name, figure.what,
                                            figure.value, floor.lowest, floor.highest));
        }
    return sentences;
}

}  // namespace slipledger::judging
