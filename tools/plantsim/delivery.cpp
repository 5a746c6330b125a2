#include "tools/plantsim/delivery.hpp"

#include <fmt/format.h>

#include <functional>
#include <mutex>
#include <thread>

#include "tools/plantsim/files.hpp"

namespace slipledger::plantsim {
namespace {

std::size_t send_rows(const Mill& mill, std::size_t pump, const Span& span, const Pace& pace, TcpLogger& logger) {
    std::size_t count = 0;
    std::vector<Row> rows;
    std::string line;
    for (Millis time = span.from; time < span.to; time += span.interval) {
        pace.wait_until(time);
        rows.clear();
        mill.sample(pump, time, rows);
        for (const Row& row : rows) {
            line.clear();
            append_ndjson(line, row);
            logger.send(line);
        }
        count += rows.size();
        // At full speed lines travel in blocks; at a slower pace each one goes at once, as a live logger's would.
        if (!pace.at_full_speed()) logger.flush();
    }
    logger.finish();
    return count;
}

void add(Answered& sum, const Answered& part) {
    sum.stored += part.stored;
    sum.repeated += part.repeated;
    sum.refused += part.refused;
    sum.reconnects += part.reconnects;
    sum.faults.insert(sum.faults.end(), part.faults.begin(), part.faults.end());
}

}  // namespace

Delivered deliver(const Mill& mill, const Span& span, const Delivery& delivery) {
    const Pace pace(span.from, delivery.speedup);
    std::mutex guard;  // of `sum`
    Delivered sum;
    std::vector<std::thread> threads;
    const auto start = [&](std::size_t pump, std::function<void(std::size_t)> work) {
        threads.emplace_back([&mill, &guard, &sum, pump, work = std::move(work)] {
            try {
                work(pump);
            } catch (const std::exception& e) {
                const std::lock_guard lock(guard);
                sum.failures.push_back(fmt::format("{}: {}", mill.plant().pumps[pump].id, e.what()));
            }
        });
    };
    for (const std::size_t tcp_pump : delivery.tcp_pumps)
        start(tcp_pump, [&](std::size_t pump) {
            TcpLogger logger(*delivery.tcp, delivery.patience);
            const std::size_t rows = send_rows(mill, pump, span, pace, logger);
            const std::lock_guard lock(guard);
            sum.tcp_rows += rows;
            add(sum.answered, logger.answered());
        });
    for (const std::size_t drop_pump : delivery.drop_pumps)
        start(drop_pump, [&](std::size_t pump) {
            const std::size_t rows = drop_files(mill, pump, span, delivery.drop_days, pace, delivery.drop_folder);
            const std::lock_guard lock(guard);
            sum.drop_rows += rows;
        });
    for (std::thread& thread : threads) thread.join();
    return sum;
}

}  // namespace slipledger::plantsim
