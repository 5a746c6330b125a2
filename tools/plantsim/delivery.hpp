// Brings the mill's readings to a daemon: a thread a pump, as if each had its own logger, some by TCP and some by drop
// folder.
#pragma once

#include <filesystem>
#include <optional>

#include "tools/plantsim/span.hpp"
#include "tools/plantsim/tcp_logger.hpp"

namespace slipledger::plantsim {

// Threads: a value, share freely.
struct Delivery {
    std::vector<std::size_t> tcp_pumps{};
    std::optional<Address> tcp{};
    Patience patience{};
    std::vector<std::size_t> drop_pumps{};
    std::filesystem::path drop_folder{};
    int drop_days = 7;  // in one file
    std::optional<double> speedup{};
};

struct Delivered {
    std::size_t tcp_rows = 0;
    std::size_t drop_rows = 0;
    Answered answered{};
    std::vector<std::string> failures{};  // one line a pump that could not be delivered
};

Delivered deliver(const Mill& mill, const Span& span, const Delivery& delivery);

}  // namespace slipledger::plantsim
