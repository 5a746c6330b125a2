// Where writing commands are done: by the daemon that holds the ledger, asked over its socket; or, where none runs, here,
// by the same writer and analyst. One process writes a ledger, so the lock decides.
#pragma once

#include <functional>
#include <nlohmann/json.hpp>
#include <string>

#include "config/plant.hpp"
#include "daemon/intake/file_load.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::command {

// What a load came to, whoever did it. `receipt` as in intake::receipt_json. Threads: a value, share freely.
struct Loaded {
    bool fine = false;
    nlohmann::ordered_json receipt;
    std::string failure;
};

using Progress = std::function<void(const intake::LoadProgress&)>;

// Threads: one at a time.
class Desk {
public:
    virtual ~Desk() = default;

    // Keeps the event; returns its id. std::runtime_error where it is not taken. A daemon judges by it in its own time; our
    // own desk does so before it returns.
    virtual std::int64_t keep(const ledger::Event& event) = 0;
    virtual Loaded load(const std::string& file, const std::string& feed, bool again, const Progress& progress) = 0;
    // Waits until everything stored is judged. std::runtime_error where that does not come about.
    virtual void wait_until_judged() = 0;
    virtual void backup(const std::string& path) = 0;
};

// The daemon's desk where one runs on this plant's ledger, else our own.
std::unique_ptr<Desk> open_desk(const config::Plant& plant);

}  // namespace slipledger::command
