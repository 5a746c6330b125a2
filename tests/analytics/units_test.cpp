#include "analytics/units.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <set>
#include <string>

namespace slipledger::analytics {
namespace {

struct Conversion {
    Quantity quantity;
    const char* unit;
    double written;
    double canonical;
};

// reference: to_canonical, from_canonical - outside: NIST SP 811, appendix B, and definitions (from memory): psi
// 6894.757 Pa, US gallon 3.785412 L, imperial gallon 4.54609 L, horsepower 745.6999 W, metric horsepower 735.49875 W,
// 212 degF = 100 degC
TEST(Units, ConvertAsTheTablesSay) {
    for (const Conversion& row :
         {Conversion{Quantity::outlet_pressure, "psi", 3000.0, 206.84271},
          Conversion{Quantity::outlet_pressure, "MPa", 21.0, 210.0},
          Conversion{Quantity::outlet_pressure, "kgf/cm2", 100.0, 98.0665},
          Conversion{Quantity::case_pressure, "kPa", 150.0, 1.5},
          Conversion{Quantity::inlet_pressure, "mbar", -200.0, -0.2},
          Conversion{Quantity::case_drain_flow, "gpm", 1.0, 3.785412},
          Conversion{Quantity::delivery_flow, "imp gpm", 1.0, 4.54609},
          Conversion{Quantity::delivery_flow, "m3/h", 6.0, 100.0},
          Conversion{Quantity::delivery_flow, "L/s", 1.5, 90.0},
          Conversion{Quantity::fluid_temperature, "degF", 212.0, 100.0},
          Conversion{Quantity::fluid_temperature, "degF", -40.0, -40.0},
          Conversion{Quantity::drain_temperature, "K", 273.15, 0.0},
          Conversion{Quantity::shaft_speed, "Hz", 25.0, 1500.0},
          Conversion{Quantity::shaft_power, "hp", 1.0, 0.7456999},
          Conversion{Quantity::shaft_power, "PS", 1.0, 0.73549875},
          Conversion{Quantity::shaft_power, "W", 2613.5, 2.6135}, Conversion{Quantity::stroke, "%", 85.0, 0.85},
          Conversion{Quantity::hour_meter, "min", 90.0, 1.5},
          Conversion{Quantity::particle_count, "1/100mL", 130000.0, 1300.0}}) {
        const auto unit = unit_named(row.quantity, row.unit);
        ASSERT_TRUE(unit) << row.unit;
        EXPECT_NEAR(to_canonical(row.written, *unit), row.canonical, 1e-6 * (1.0 + std::abs(row.canonical))) << row.unit;
        EXPECT_NEAR(from_canonical(to_canonical(row.written, *unit), *unit), row.written, 1e-9 * (1.0 + std::abs(row.written)));
    }
}

TEST(Units, BeginWithTheCanonicalOneOfTheQuantityTable) {
    for (const QuantityFacts& facts : quantity_table) {
        ASSERT_FALSE(units_of(facts.quantity).empty()) << facts.name;
        EXPECT_EQ(units_of(facts.quantity).front().name, facts.unit);
        EXPECT_EQ(unit_named(facts.quantity, "")->name, facts.unit);
        EXPECT_EQ(to_canonical(12.5, units_of(facts.quantity).front()), 12.5);
    }
}

TEST(Units, OfAnotherQuantityAreNotTaken) {
    EXPECT_FALSE(unit_named(Quantity::outlet_pressure, "gpm"));
    EXPECT_FALSE(unit_named(Quantity::outlet_pressure, "Psi"));
    EXPECT_FALSE(unit_named(Quantity::shaft_speed, "bar"));
}

TEST(QuantityTable, StandsInTheOrderOfItsEnumerationUnderNamesOfItsOwn) {
    std::set<std::string_view> names;
    for (std::size_t i = 0; i < quantity_count; ++i) {
        EXPECT_EQ(index_of(quantity_table[i].quantity), i);
        EXPECT_LT(quantity_table[i].lowest, quantity_table[i].highest);
        EXPECT_EQ(quantity_named(quantity_table[i].name), quantity_table[i].quantity);
        names.insert(quantity_table[i].name);
    }
    EXPECT_EQ(names.size(), quantity_count);
    EXPECT_FALSE(quantity_named("outlet pressure"));
}

}  // namespace
}  // namespace slipledger::analytics
