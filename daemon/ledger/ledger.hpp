// The seam to the store, writing side: what a ledger must do, whatever keeps it. SQLite behind it today; a wrapper that fails at
// call n in the tests; later a shared PostgreSQL ledger. Every call is one transaction: all of it is durable when the
// call returns, or an exception says that nothing is.
#pragma once

#include <functional>
#include <span>
#include <stdexcept>
#include <string>
#include <vector>

#include "config/plant.hpp"
#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// Cannot open, migrate or store; the message says what to do. Thrown by this room only.
class LedgerFailure : public std::runtime_error {
public:
    using std::runtime_error::runtime_error;
};

// Copies a few pages more; false: the copy is whole. Throws LedgerFailure. Destroyed before that, nothing of the copy is left.
using CopyStep = std::function<bool()>;

// Threads: one at a time (the writer's, once it runs).
class Ledger {
public:
    virtual ~Ledger() = default;

    virtual const Directory& directory() const = 0;

    // Stores readings, refusals and receipts of several batches in one transaction and raises the marks they cause.
    // Returns one outcome per batch, in order.
    virtual std::vector<IntakeOutcome> store(std::span<const IntakeBatch> batches) = 0;

    // Moves hours that have closed from `recent` into blocks: at most one bounded step; false: nothing was left to do.
    virtual bool close_hours() = 0;

    // Stores a pump's judgement and its notices if its mark still has that generation; false: it moved on, judge again.
    virtual bool store(const AnalysisResult& result) = 0;

    // Appends an event, raises the mark of its pump from `event.at` where it changes what is judged. Returns its id.
    virtual std::int64_t store(const Event& event) = 0;

    // Notices that no judgement causes (a silent feed). Ids already told are passed over.
    virtual void store(std::span<const Notice> notices) = 0;

    virtual void store(std::span<const DeliveryUpdate> updates) = 0;

    // Begins a consistent copy in a file that does not exist yet. Commits may go in between two steps; what they change is
    // copied too. The ledger must outlive what is returned.
    virtual CopyStep begin_backup(const std::string& path) = 0;
};

}  // namespace slipledger::ledger
