#include "analytics/summary.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <cstring>
#include <random>

#include "tests/analytics/readings_builder.hpp"

namespace slipledger::analytics {
namespace {

using namespace std::chrono_literals;
using enum Quantity;

SectionSpec compensated_pump() {
    SectionSpec spec;
    spec.control = Control::pressure_compensated;
    spec.compensator_bar = 250.0;
    spec.displacement_cm3 = 71.0;
    spec.rated = {.pressure_bar = 280.0, .speed_rpm = 1480.0, .temperature_c = 50.0};
    spec.reference = {.pressure_bar = 210.0, .speed_rpm = 1480.0, .temperature_c = 50.0};
    return spec;
}

Usual usual_of(Milliseconds interval) {
    Usual usual;
    usual.hold.fill(interval * 3 / 2);
    return usual;
}

std::vector<Summary> hours_of(const ReadingsBuilder& told, Milliseconds interval, Instant from, Instant to) {
    return summarise(told.readings(), compensated_pump(), usual_of(interval), Basis::case_drain, 1, from, to, 1h);
}

std::uint32_t count_of(const Summary& summary, Standing standing) {
    return summary.counts[static_cast<std::size_t>(standing)];
}

constexpr Values loaded{
    {outlet_pressure, 210}, {shaft_speed, 1480}, {case_drain_flow, 3}, {fluid_temperature, 50}, {case_pressure, 0}};
constexpr Values standing_still{
    {outlet_pressure, 0}, {shaft_speed, 0}, {case_drain_flow, 0.05}, {fluid_temperature, 45}, {case_pressure, 0}};

// On paper: an hour at the reference point has features of 1; 3 of 105.08 L/min drain.
// reference: summarise - hand-worked: rows of a steady hour, figures above
TEST(Summary, OfASteadyHourAtTheReferencePoint) {
    ReadingsBuilder told(1min, midnight - 1h);
    told.rows(120, loaded);
    const auto summaries = hours_of(told, 1min, midnight, midnight + 1h);
    ASSERT_EQ(summaries.size(), 1u);
    const Summary& hour = summaries[0];
    EXPECT_EQ(hour.start, midnight);
    EXPECT_EQ(hour.length, Milliseconds{1h});
    EXPECT_EQ(count_of(hour, Standing::full_flow), 60u);
    EXPECT_NEAR(hour.running_h, 1.0, 1e-9);
    EXPECT_NEAR(hour.judged_h, 1.0, 1e-9);
    EXPECT_NEAR(hour.drain_share, 3.0 / 105.08, 1e-12);
    EXPECT_NEAR(hour.mean_pressure_bar, 210.0, 1e-9);
    EXPECT_EQ(hour.highest_temperature_c, 50.0);
    EXPECT_TRUE(std::isnan(hour.lowest_inlet_bar));
    EXPECT_TRUE(std::isnan(hour.stop_flow_lpm));
    const Moments& moments = hour.judged[0];
    EXPECT_EQ(moments.count, 54u);  // 3 trimmed at each end
    EXPECT_NEAR(moments.leakage_lpm, 3.0, 1e-12);
    for (const double feature : moments.feature) EXPECT_NEAR(feature, 1.0, 1e-12);
    EXPECT_NEAR(moments.theoretical_lpm, 105.08, 1e-9);
    EXPECT_EQ(moments.delivery_lpm, 0.0);
    EXPECT_EQ(hour.judged[1].count, 0u);
}

TEST(Summary, KeepsFullFlowAndCompensatingApart) {
    ReadingsBuilder told(1min);
    for (int i = 0; i < 6; ++i) {
        told.rows(5, loaded);
        told.rows(5, {{outlet_pressure, 250}, {shaft_speed, 1480}, {case_drain_flow, 4.4}, {fluid_temperature, 50}});
    }
    const auto summaries = hours_of(told, 1min, midnight, midnight + 1h);
    ASSERT_EQ(summaries.size(), 1u);
    EXPECT_EQ(count_of(summaries[0], Standing::full_flow), 30u);
    EXPECT_EQ(count_of(summaries[0], Standing::compensating), 30u);
    EXPECT_NEAR(summaries[0].judged[0].leakage_lpm, 3.0, 1e-12);
    EXPECT_NEAR(summaries[0].judged[1].leakage_lpm, 4.4, 1e-12);
}

TEST(Summary, IsCutAtMultiplesOfItsLengthAndWhereItsSpanEnds) {
    ReadingsBuilder told(1min);
    told.rows(180, loaded);
    const auto summaries = hours_of(told, 1min, midnight + 20min, midnight + 130min);
    ASSERT_EQ(summaries.size(), 3u);
    EXPECT_EQ(summaries[0].start, midnight + 20min);
    EXPECT_EQ(summaries[0].length, Milliseconds{40min});
    EXPECT_EQ(summaries[1].start, midnight + 60min);
    EXPECT_EQ(summaries[1].length, Milliseconds{60min});
    EXPECT_EQ(summaries[2].length, Milliseconds{10min});
    EXPECT_EQ(count_of(summaries[2], Standing::full_flow), 10u);
}

TEST(Summary, OfATimeWithoutReadingsIsNone) {
    ReadingsBuilder told(1min);
    told.rows(30, loaded).pause(4h).rows(30, loaded);
    const auto summaries = hours_of(told, 1min, midnight, midnight + 24h);
    ASSERT_EQ(summaries.size(), 2u);
    EXPECT_EQ(summaries[1].start, midnight + 4h);
    EXPECT_TRUE(hours_of(told, 1min, midnight + 10h, midnight + 24h).empty());
}

// Stop from 00:10:00 (half a minute before that, by the rows) to 00:39:30: readings from its third minute on count.
TEST(Summary, TakesTheMetersZeroFromAStopOfTenMinutesWithoutItsFirstTwo) {
    ReadingsBuilder told(1min);
    told.rows(10, loaded);
    told.rows(2, {{outlet_pressure, 0}, {shaft_speed, 0}, {case_drain_flow, 9}, {fluid_temperature, 45}});
    told.rows(27, standing_still);
    told.rows(1, {{outlet_pressure, 0}, {shaft_speed, 0}, {case_drain_flow, 0.3}, {fluid_temperature, 45}});
    told.rows(20, loaded);
    const auto summaries = hours_of(told, 1min, midnight, midnight + 1h);
    ASSERT_EQ(summaries.size(), 1u);
    EXPECT_EQ(count_of(summaries[0], Standing::stopped), 30u);
    EXPECT_EQ(summaries[0].stop_count, 28u);
    EXPECT_DOUBLE_EQ(summaries[0].stop_flow_lpm, 0.05);
    EXPECT_NEAR(summaries[0].running_h, 0.5, 1e-9);
}

TEST(Summary, TakesNoZeroFromAShortStop) {
    ReadingsBuilder told(1min);
    told.rows(10, loaded).rows(9, standing_still).rows(41, loaded);
    const auto summaries = hours_of(told, 1min, midnight, midnight + 1h);
    EXPECT_EQ(summaries[0].stop_count, 0u);
    EXPECT_TRUE(std::isnan(summaries[0].stop_flow_lpm));
}

TEST(Summary, OfSlowRowsOfAPressJudgesThemAll) {
    ReadingsBuilder told(10min, midnight - 2h);
    for (int i = 0; i < 60; ++i) {
        told.rows(1, {{outlet_pressure, 90}, {shaft_speed, 1482}, {case_drain_flow, 1.4}, {fluid_temperature, 50}});
        told.rows(1, {{outlet_pressure, 230}, {shaft_speed, 1471}, {case_drain_flow, 3.3}, {fluid_temperature, 51}});
    }
    const auto summaries = hours_of(told, 10min, midnight, midnight + 12h);
    ASSERT_EQ(summaries.size(), 12u);
    for (const Summary& hour : summaries) {
        EXPECT_EQ(count_of(hour, Standing::full_flow), 6u);
        EXPECT_NEAR(hour.judged_h, 1.0, 1e-9);
    }
}

TEST(Summary, OfASectionWithoutTemperatureStillTellsItsRawDrainShare) {
    ReadingsBuilder told(1min);
    told.rows(60, {{outlet_pressure, 210}, {shaft_speed, 1480}, {case_drain_flow, 3}});
    const auto summaries = hours_of(told, 1min, midnight, midnight + 1h);
    EXPECT_EQ(count_of(summaries[0], Standing::no_temperature), 60u);
    EXPECT_EQ(summaries[0].judged_h, 0.0);
    EXPECT_NEAR(summaries[0].drain_share, 3.0 / 105.08, 1e-12);
}

TEST(Summary, KeepsTheExtremesOfTemperatureCaseAndInlet) {
    ReadingsBuilder told(1min);
    told.rows(30, {{outlet_pressure, 210},
                   {shaft_speed, 1480},
                   {case_drain_flow, 3},
                   {fluid_temperature, 50},
                   {case_pressure, 0.4},
                   {inlet_pressure, -0.1}});
    told.rows(1, {{outlet_pressure, 210},
                  {shaft_speed, 1480},
                  {case_drain_flow, 3},
                  {fluid_temperature, 51},
                  {case_pressure, 2.2},
                  {inlet_pressure, -0.4}});
    told.rows(29, loaded);
    const auto summaries = hours_of(told, 1min, midnight, midnight + 1h);
    EXPECT_EQ(summaries[0].highest_temperature_c, 51.0);
    EXPECT_EQ(summaries[0].highest_case_bar, 2.2);
    EXPECT_EQ(summaries[0].lowest_inlet_bar, -0.4);
}

// A day as plants have them: shifts, stops, swings, gaps, sensors at rates of their own.
SectionReadings troubled_day(unsigned seed) {
    std::mt19937 random(seed);
    std::uniform_real_distribution<double> share(0.0, 1.0);
    std::normal_distribution<double> noise(0.0, 1.0);
    SectionReadings readings;
    const auto put = [&](Quantity quantity, Instant time, double value) {
        readings[index_of(quantity)].times.push_back(time);
        readings[index_of(quantity)].values.push_back(value);
    };
    double pressure = 150.0;
    bool runs = true;
    bool silent = false;
    for (Instant time = midnight - 6h; time < midnight + 24h; time += 5s) {
        if (share(random) < 0.01) pressure = 60.0 + 200.0 * share(random);
        if (share(random) < 0.001) runs = !runs;
        if (share(random) < (silent ? 0.004 : 0.0004)) silent = !silent;
        if (silent) continue;
        const double bar = runs ? std::min(pressure, 250.0) + noise(random) : 0.0;
        put(outlet_pressure, time, bar);
        if (share(random) < 0.9) put(case_drain_flow, time, runs ? 0.5 + 0.012 * bar + 0.1 * noise(random) : 0.02);
        if (share(random) < 0.3) put(shaft_speed, time, runs ? 1480.0 + noise(random) : 0.0);
        if (share(random) < 0.05) put(fluid_temperature, time, 50.0 + noise(random));
    }
    return readings;
}

SectionReadings from_instant_on(const SectionReadings& readings, Instant from, Instant to) {
    SectionReadings cut;
    for (std::size_t i = 0; i < quantity_count; ++i)
        for (std::size_t k = 0; k < readings[i].times.size(); ++k)
            if (readings[i].times[k] >= from && readings[i].times[k] < to) {
                cut[i].times.push_back(readings[i].times[k]);
                cut[i].values.push_back(readings[i].values[k]);
            }
    return cut;
}

bool same_bits(const Summary& one, const Summary& other) {
    const auto bits = [](const Summary& s) {
        std::vector<double> values{s.running_h,
                                   s.judged_h,
                                   s.stop_flow_lpm,
                                   s.drain_share,
                                   s.highest_temperature_c,
                                   s.mean_pressure_bar,
                                   s.mean_flow_lpm,
                                   s.mean_speed_rpm,
                                   s.mean_temperature_c,
                                   s.flow_lpm.low,
                                   s.flow_lpm.high,
                                   s.pressure_bar.low,
                                   s.pressure_bar.high,
                                   s.speed_rpm.low,
                                   s.speed_rpm.high,
                                   s.temperature_c.low,
                                   s.temperature_c.high,
                                   static_cast<double>(s.stop_count),
                                   static_cast<double>(s.start.time_since_epoch().count())};
        values.insert(values.end(), s.counts.begin(), s.counts.end());
        for (const Moments& m : s.judged) {
            values.insert(values.end(), m.covariance.begin(), m.covariance.end());
            values.insert(values.end(), m.feature.begin(), m.feature.end());
            values.insert(values.end(), {static_cast<double>(m.count), m.leakage_lpm, m.standard_error_lpm, m.dp_bar,
                                         m.temperature_c, m.viscosity_cst, m.theoretical_lpm});
        }
        return values;
    };
    const std::vector<double> a = bits(one);
    const std::vector<double> b = bits(other);
    return std::memcmp(a.data(), b.data(), a.size() * sizeof(double)) == 0;
}

TEST(Summary, IsTheSameToTheBitWhateverSpanItIsMadeWith) {
    for (const unsigned seed : {1u, 2u, 3u}) {
        SCOPED_TRACE(seed);
        const SectionReadings readings = troubled_day(seed);
        Usual usual = usual_of(1min);
        usual.hold[index_of(fluid_temperature)] = 5h;  // longer than any reading stands
        const SectionSpec spec = compensated_pump();
        const auto whole = summarise(readings, spec, usual, Basis::case_drain, 1, midnight - 4h, midnight + 24h, 1h);
        ASSERT_GT(whole.size(), 15u);
        std::uint32_t judged = 0;
        std::uint32_t stops = 0;
        for (const Summary& summary : whole) {
            judged += summary.judged[0].count + summary.judged[1].count;
            stops += summary.stop_count;
            const Instant from = summary.start;
            const auto alone = summarise(from_instant_on(readings, from - summary_lead_in, from + 1h), spec, usual,
                                         Basis::case_drain, 1, from, from + 1h, 1h);
            ASSERT_EQ(alone.size(), 1u);
            EXPECT_TRUE(same_bits(alone[0], summary)) << (from - midnight).count() << " ms";
        }
        EXPECT_GT(judged, 1000u);
        EXPECT_GT(stops, 100u);
    }
}

}  // namespace
}  // namespace slipledger::analytics
