#include "daemon/spawn.hpp"

#include <cstdlib>
#include <exception>
#include <utility>

#include <boost/asio/co_spawn.hpp>
#include <spdlog/spdlog.h>

namespace slipledger {
namespace {

std::string what_happened(const std::exception_ptr& thrown) {
    try {
        std::rethrow_exception(thrown);
    } catch (const std::exception& e) {
        return e.what();
    }
}

}  // namespace

void spawn(const boost::asio::any_io_executor& executor, std::string name, boost::asio::awaitable<void> task) {
    boost::asio::co_spawn(executor, std::move(task), [name = std::move(name)](const std::exception_ptr& thrown) {
        if (thrown) spdlog::error("{} ended: {}", name, what_happened(thrown));
    });
}

void spawn_vital(const boost::asio::any_io_executor& executor, std::string name, boost::asio::awaitable<void> task) {
    boost::asio::co_spawn(executor, std::move(task), [name = std::move(name)](const std::exception_ptr& thrown) {
        if (!thrown) return;
        spdlog::critical("{} ended, and nothing works without it: {}", name, what_happened(thrown));
        spdlog::shutdown();
        std::_Exit(3);
    });
}

}  // namespace slipledger
