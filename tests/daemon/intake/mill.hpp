// A small invented plant for intake's tests: press-1 with one section, a double pump press-2 with sections A and B, a
// reservoir and a drain group, with ids as a ledger gives them.
#pragma once

#include <string>
#include <vector>

#include "config/feed.hpp"
#include "config/pump.hpp"
#include "daemon/intake/mapping.hpp"
#include "daemon/intake/row_reader.hpp"
#include "daemon/ledger/directory.hpp"

namespace slipledger::intake::mill {

inline constexpr ledger::PointId press_1{1};  // pump and section A
inline constexpr ledger::PointId press_2{2};
inline constexpr ledger::PointId press_2_a{3};
inline constexpr ledger::PointId press_2_b{4};
inline constexpr ledger::PointId tank{5};
inline constexpr ledger::PointId shared_drain{6};

ledger::Directory directory();
std::vector<config::Pump> pumps();
config::Feed ndjson_feed();  // id "hall"
config::Feed csv_feed();     // id "files"
config::Target target(analytics::Quantity quantity, std::string unit = {});

ledger::Instant noon();  // 2026-03-01T12:00:00Z, when the receiving clock stands in these tests

// Reads all of `text` as one stream of the feed, ended.
ReadBatch read_all(const config::Feed& feed, std::string_view text);

}  // namespace slipledger::intake::mill
