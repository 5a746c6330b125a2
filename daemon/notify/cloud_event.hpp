// A notice as a CloudEvents 1.0 event in JSON, structured mode: the form that event receivers understand.
#pragma once

#include <string>

#include "daemon/ledger/records.hpp"

namespace slipledger::notify {

inline constexpr const char* cloud_event_content_type = "application/cloudevents+json";

// The same text whenever the same notice is told: no clock, no counter.
// Source: CloudEvents 1.0.2, JSON event format (from memory).
std::string cloud_event(const std::string& plant, const ledger::Notice& notice);

}  // namespace slipledger::notify
