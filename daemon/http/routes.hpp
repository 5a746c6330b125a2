// What can be asked for, as a table: path, handler. A new page or endpoint is one row in routes.cpp and one handler.
#pragma once

#include <string>
#include <string_view>

#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"

namespace slipledger::http {

// Threads: a value, share freely.
struct Answer {
    unsigned status = 200;
    std::string content_type = "application/json";
    std::string body;
};

// Answers a GET of `target` (path and query, as sent). Never throws for what a client sends: unknown paths and pumps are
// 404, foul targets 400, each as RFC 9457 problem details. `reader` failing is the caller's to catch.
Answer answer(std::string_view target, const ledger::Reader& reader, const config::Plant& plant);

// A problem as RFC 9457 details.
Answer problem(unsigned status, std::string_view title, std::string_view detail);

}  // namespace slipledger::http
