// Reads the particulars of an event. A body may come from anybody who may write to the command socket, so what is
// missing or of another kind counts as not told.
#pragma once

#include <nlohmann/json.hpp>
#include <optional>
#include <string>

#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// An object, empty where the body is none.
nlohmann::json body_of(const Event& event);

std::string text_in(const nlohmann::json& body, const char* key);  // empty: not told
std::optional<double> number_in(const nlohmann::json& body, const char* key);
nlohmann::json object_in(const nlohmann::json& body, const char* key);  // empty: not told

// The reservoir of which an event without a pump tells; empty: of the whole plant.
std::string reservoir_of(const Event& event);

}  // namespace slipledger::ledger
