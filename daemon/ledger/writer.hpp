// The one thread that writes. Group commit: what arrives while a transaction runs, or within `commit_interval`, shares the
// next one; analysis results come by a queue of their own that is served first, so the analyst is never kept waiting by a
// flood of readings. Callbacks run on the writer's thread after the commit is durable: keep them short (post elsewhere).
#pragma once

#include <chrono>
#include <functional>
#include <memory>
#include <optional>
#include <string>

#include "daemon/ledger/ledger.hpp"

namespace slipledger::ledger {

// Threads: any thread may call; owns the writing thread and, through it, the ledger.
class Writer {
public:
    using Stored = std::function<void(const IntakeOutcome&)>;

    Writer(std::unique_ptr<Ledger> ledger, std::chrono::milliseconds commit_interval);
    ~Writer();  // stores what is queued, then ends the thread

    const Directory& directory() const;

    // Queues the batch; false (and the batch untouched) when the queue is full: stop reading, try again shortly.
    bool try_submit(IntakeBatch& batch, Stored done);
    // The same, waiting for room. For `load` and other threads that may block.
    void submit(IntakeBatch batch, Stored done);

    bool store(const AnalysisResult& result);           // waits; false: the mark moved on
    std::int64_t store(const Event& event);             // waits
    void store(std::vector<Notice> notices);            // waits
    void store(std::vector<DeliveryUpdate> updates);    // waits
    // Waits; commits go on meanwhile. The file must not exist yet.
    void backup(const std::string& path);

    // Called on the writer's thread after a commit that raised or changed marks / put rows into the outbox.
    void on_marks(std::function<void()> wake);
    void on_outbox(std::function<void()> wake);

    // Waits until all queued batches are stored and all closed hours moved to blocks.
    void drain();

private:
    struct Inside;
    std::unique_ptr<Inside> inside_;
};

}  // namespace slipledger::ledger
