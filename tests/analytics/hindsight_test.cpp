#include "analytics/hindsight.hpp"

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// reference: in_hindsight - hand-worked: the table of its header, row by row
TEST(Hindsight, HoldsTheLastVerdictBesideWhatWasFound) {
    struct Row {
        Level level;
        Found found;
        Hindsight wanted;
    };
    for (const Row& row :
         {Row{Level::act, Found::worn, Hindsight::right}, Row{Level::plan, Found::damaged, Hindsight::right},
          Row{Level::watch, Found::worn, Hindsight::late}, Row{Level::sound, Found::worn, Hindsight::wrong},
          Row{Level::sound, Found::damaged, Hindsight::wrong}, Row{Level::sound, Found::good, Hindsight::right},
          Row{Level::watch, Found::good, Hindsight::right}, Row{Level::plan, Found::good, Hindsight::wrong},
          Row{Level::act, Found::good, Hindsight::wrong}, Row{Level::unjudged, Found::worn, Hindsight::not_known},
          Row{Level::act, Found::not_told, Hindsight::not_known}})
        EXPECT_EQ(in_hindsight(row.level, row.found), row.wanted)
            << name_of(row.level) << ' ' << static_cast<int>(row.found);
    EXPECT_EQ(found_named("worn"), Found::worn);
    EXPECT_EQ(found_named("scored plate"), Found::not_told);
    EXPECT_EQ(name_of(Hindsight::late), "late");
}

}  // namespace
}  // namespace slipledger::analytics
