// Outside values: seven_digits.csv, made by make_seven_digits.py beside it (Python's '%.7g').
#include "daemon/intake/seven_digits.hpp"

#include <cmath>
#include <cstdlib>
#include <fstream>
#include <limits>
#include <string>

#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

TEST(SevenDigits, RoundAsPythonDoes) {
    std::ifstream file(SLIPLEDGER_SOURCE_DIR "/tests/daemon/intake/seven_digits.csv");
    std::string line;
    std::getline(file, line);
    int count = 0;
    while (std::getline(file, line)) {
        const std::size_t comma = line.find(',');
        const double value = std::strtod(line.c_str(), nullptr);
        const double wanted = std::strtod(line.c_str() + comma + 1, nullptr);
        EXPECT_EQ(seven_digits(value), wanted) << line;
        ++count;
    }
    EXPECT_GT(count, 600);
}

TEST(SevenDigits, ChangeNothingTheSecondTime) {
    for (double value = 1e-9; value < 1e12; value *= 1.37) {
        const double once = seven_digits(value);
        EXPECT_EQ(seven_digits(once), once) << value;
    }
}

TEST(SevenDigits, KeepNoMinusZeroAndLeaveWhatIsNotFinite) {
    EXPECT_FALSE(std::signbit(seven_digits(-0.0)));
    EXPECT_TRUE(std::isnan(seven_digits(std::numeric_limits<double>::quiet_NaN())));
    EXPECT_EQ(seven_digits(std::numeric_limits<double>::infinity()), std::numeric_limits<double>::infinity());
}

}  // namespace
}  // namespace slipledger::intake
