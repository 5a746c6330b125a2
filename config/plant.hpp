// The whole plant file as plain values, one type per room so that a room is handed its slice and never the plant: pumps
// and reservoirs to watch and report, feeds to intake, store to the ledger, alerts to notify, http to http.
// plant_reader.hpp makes them from text; whatever is in them has been checked, with defaults filled in and references
// resolved.
#pragma once

#include <chrono>
#include <functional>
#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "analytics/instant.hpp"
#include "config/feed.hpp"
#include "config/fluid.hpp"
#include "config/pump.hpp"

namespace slipledger::config {

// Where the ledger lies and how long raw readings stay. Threads: a value, share freely.
struct Store {
    std::string path = "/var/lib/slipledger/ledger.db";
    int raw_days = 400;                              // counted back from the pump's newest data time
    std::optional<double> max_gb;                    // whichever comes first
    std::chrono::milliseconds commit_interval{200};  // group commit: the longest a row waits for company

    bool operator==(const Store&) const = default;
};

// Threads: a value, share freely.
struct Reservoir {
    std::string id;
    std::string name;
    Fluid fluid;
    std::optional<double> volume_l;

    bool operator==(const Reservoir&) const = default;
};

// A shutdown in the calendar; no areas means the whole plant. Threads: a value, share freely.
struct PlannedStop {
    analytics::Instant from{};
    analytics::Instant to{};
    std::vector<std::string> areas;

    bool operator==(const PlannedStop&) const = default;
};

// Threads: a value, share freely.
struct Webhook {
    std::string name;
    std::string url;
    std::chrono::seconds timeout{10};
    std::chrono::hours retry_for{72};

    bool operator==(const Webhook&) const = default;
};

// Where notices go. Limits, delays and deadbands of the rules stand resolved in each section's `limits`.
// Threads: a value, share freely.
struct Alerts {
    std::string log;  // path of the alert log; empty: none is written
    std::vector<Webhook> webhooks;

    bool operator==(const Alerts&) const = default;
};

// Threads: a value, share freely.
struct Http {
    std::optional<Endpoint> listen;  // not given: no pages, no API

    bool operator==(const Http&) const = default;
};

// Threads: a value, share freely.
struct Economics {
    double energy_price_per_kwh = 0.0;
    std::string currency;
    double motor_efficiency = 0.93;
    double downtime_cost_per_h = 0.0;  // what an hour costs in which a replacement stops the machine

    bool operator==(const Economics&) const = default;
};

enum class DisplayUnits { metric, us };

// Threads: a value, share freely.
struct Plant {
    std::string name;
    std::string time_zone = "UTC";  // known to the tz database
    DisplayUnits display_units = DisplayUnits::metric;
    int summary_minutes = 60;  // divides 60
    std::chrono::seconds lateness{600};
    std::chrono::seconds stop_grace{10};  // how long a stopping daemon lets loggers finish
    Store store;
    std::map<std::string, Fluid, std::less<>> fluids;  // every oil that can be named: built in, and the plant's own
    std::vector<Reservoir> reservoirs;
    std::vector<PlannedStop> planned_stops;  // in order of `from`
    std::optional<double> duty_h_per_week;
    std::vector<Pump> pumps;
    std::vector<Feed> feeds;
    Alerts alerts;
    Http http;
    std::optional<Economics> economics;

    bool operator==(const Plant&) const = default;

    // The pump or reservoir of that id, or null.
    const Pump* find_pump(std::string_view pump_id) const;
    const Reservoir* find_reservoir(std::string_view reservoir_id) const;
};

}  // namespace slipledger::config
