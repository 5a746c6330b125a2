#include "tests/daemon/intake/live_mill.hpp"

#include <date/date.h>

#include <thread>

namespace slipledger::intake {

using namespace std::chrono_literals;

std::string csv_rows(int count) {
    std::string text = "time,pump,outlet_pressure\n";
    for (int i = 0; i < count; ++i)
        text += date::format("%FT%TZ", mill::noon() - 6h + std::chrono::seconds(i)) + ",press-1," +
                std::to_string(100 + i % 100) + "." + std::to_string(i / 100) + "\n";
    return text;
}

bool soon(const std::function<bool()>& done) {
    for (int i = 0; i < 2000; ++i) {
        if (done()) return true;
        std::this_thread::sleep_for(5ms);
    }
    return false;
}

}  // namespace slipledger::intake
