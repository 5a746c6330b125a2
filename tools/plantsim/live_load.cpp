#include <algorithm>
#include <chrono>
#include <memory>
#include <thread>

#include "tools/plantsim/load.hpp"

namespace slipledger::plantsim {
namespace {

using Wall = std::chrono::system_clock;

Millis wall_ms(Wall::time_point at) {
    return std::chrono::duration_cast<std::chrono::milliseconds>(at.time_since_epoch()).count();
}

}  // namespace

LiveLoad run_live_load(const LoadPlan& plan, const Address& address, std::size_t connections, int seconds) {
    std::vector<std::unique_ptr<TcpLogger>> loggers;
    for (std::size_t i = 0; i < connections; ++i) loggers.push_back(std::make_unique<TcpLogger>(address, Patience{}));

    // In 20 portions a second: 500 loggers do not speak in chorus, nor does each need a timer of its own.
    constexpr std::size_t portions = 20;
    const auto begun = std::chrono::ceil<std::chrono::seconds>(Wall::now());
    LiveLoad load;
    std::string line;
    for (int second = 0; second < seconds; ++second)
        for (std::size_t portion = 0; portion < portions; ++portion) {
            const auto due =
                begun + std::chrono::seconds{second} + std::chrono::milliseconds{1000 / portions * portion};
            std::this_thread::sleep_until(due);
            for (std::size_t pump = portion; pump < plan.pumps(); pump += portions) {
                line.clear();
                append_ndjson(line, plan.row(pump, wall_ms(due)));
                loggers[pump % connections]->send(line);
                ++load.rows;
            }
            for (const auto& logger : loggers) {
                logger->flush();
                load.worst_owed = std::max(load.worst_owed, logger->owed());
            }
        }
    for (const auto& logger : loggers) {
        logger->finish();
        load.answered.stored += logger->answered().stored;
        load.answered.repeated += logger->answered().repeated;
        load.answered.refused += logger->answered().refused;
        load.answered.reconnects += logger->answered().reconnects;
        for (const std::string& fault : logger->answered().faults) load.answered.faults.push_back(fault);
    }
    return load;
}

}  // namespace slipledger::plantsim
