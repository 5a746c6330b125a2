#include "daemon/ledger/writer.hpp"

#include <algorithm>
#include <condition_variable>
#include <deque>
#include <exception>
#include <future>
#include <mutex>
#include <thread>
#include <vector>

namespace slipledger::ledger {
namespace {

constexpr std::size_t most_queued = 131'072;     // rows: about 20 MB
constexpr std::size_t rows_a_commit = 65'536;    // enough to spread a commit's cost, little enough to stay short
constexpr std::size_t rows_in_a_hurry = 16'384;  // so many do not wait for the interval: a bulk load is running
constexpr int jobs_before_rows = 8;              // jobs are served first, but readings wait for no more than these

std::size_t weight_of(const IntakeBatch& batch) { return 1 + batch.rows.size() + 8 * batch.refused.size(); }

}  // namespace

// Threads: `mutex` guards everything but `ledger`, which is the writing thread's alone.
struct Writer::Inside {
    struct Waiting {
        IntakeBatch batch;
        Stored done;
    };
    using Job = std::function<void(Ledger&)>;

    Inside(std::unique_ptr<Ledger> given, std::chrono::milliseconds interval)
        : ledger(std::move(given)), commit_interval(interval), thread([this] { work(); }) {}

    void work();
    bool wait_for_work(std::unique_lock<std::mutex>& lock);
    bool a_file_ends() const;
    void run_job(std::unique_lock<std::mutex>& lock);
    void commit(std::unique_lock<std::mutex>& lock);
    void close_step(std::unique_lock<std::mutex>& lock);
    std::vector<Waiting> take_batches();
    std::vector<IntakeOutcome> store(std::span<const IntakeBatch> batches);
    void put(IntakeBatch&& batch, Stored&& done);
    void tell_marks();
    void tell_outbox();

    template <typename Work>
    auto wait_for(Work work_on_ledger) {
        using Result = decltype(work_on_ledger(std::declval<Ledger&>()));
        auto task = std::make_shared<std::packaged_task<Result(Ledger&)>>(std::move(work_on_ledger));
        auto result = task->get_future();
        {
            const std::lock_guard lock(mutex);
            jobs.emplace_back([task](Ledger& on) { (*task)(on); });
        }
        wake.notify_all();
        return result.get();
    }

    std::unique_ptr<Ledger> ledger;
    const std::chrono::milliseconds commit_interval;
    std::mutex mutex;
    std::condition_variable wake;  // for the writing thread
    std::condition_variable room;  // for those who wait for the queue or for rest
    std::deque<Waiting> batches;
    std::size_t queued = 0;
    std::deque<Job> jobs;
    std::function<void()> marks_raised;
    std::function<void()> outbox_filled;
    bool quiet_over = true;        // a commit_interval has passed since the last commit
    int jobs_in_quiet = 0;
    bool may_close = true;         // some hour may want to be moved to its block
    bool marks_untold = false;
    bool busy = false;             // the thread is in the ledger
    bool stopping = false;
    std::thread thread;            // last: it uses all of the above
};

// One turn: a job first, then readings, then, with nothing else to do, an hour's move.
void Writer::Inside::work() {
    std::unique_lock lock(mutex);
    while (wait_for_work(lock)) {
        busy = true;
        if (!jobs.empty() && (batches.empty() || jobs_in_quiet < jobs_before_rows))
            run_job(lock);
        else if (!batches.empty())
            commit(lock);
        if (jobs.empty()) close_step(lock);
        busy = false;
        room.notify_all();
    }
}

// False: time to end. Returns with something to do: a job, rows whose time has come, or a move.
bool Writer::Inside::wait_for_work(std::unique_lock<std::mutex>& lock) {
    for (;;) {
        if (stopping && batches.empty() && jobs.empty()) return false;
        if (!jobs.empty() || may_close) return true;
        const auto rows_may_go = [this] {
            return !batches.empty() && (stopping || quiet_over || queued >= rows_in_a_hurry || a_file_ends());
        };
        if (rows_may_go()) return true;
        const auto something = [&] { return stopping || !jobs.empty() || rows_may_go(); };
        if (quiet_over)
            wake.wait(lock, something);
        else
            quiet_over = !wake.wait_for(lock, commit_interval, something);
    }
}

// Whoever reads a folder of files waits for each one's receipt before taking the next.
bool Writer::Inside::a_file_ends() const {
    return std::ranges::any_of(batches, [](const Waiting& waiting) { return waiting.batch.receipt.has_value(); });
}

void Writer::Inside::run_job(std::unique_lock<std::mutex>& lock) {
    Job job = std::move(jobs.front());
    jobs.pop_front();
    if (++jobs_in_quiet >= jobs_before_rows) quiet_over = true;
    lock.unlock();
    job(*ledger);
    lock.lock();
}

std::vector<Writer::Inside::Waiting> Writer::Inside::take_batches() {
    std::vector<Waiting> taken;
    std::size_t weight = 0;
    while (!batches.empty() && (taken.empty() || weight + weight_of(batches.front().batch) <= rows_a_commit)) {
        weight += weight_of(batches.front().batch);
        taken.push_back(std::move(batches.front()));
        batches.pop_front();
    }
    queued -= weight;
    return taken;
}

std::vector<IntakeOutcome> Writer::Inside::store(std::span<const IntakeBatch> given) try {
    return ledger->store(given);
} catch (const std::exception& fault) {  // the daemon lives on: whoever sent the rows is told, and sends them again
    IntakeOutcome failed;
    failed.failed = true;
    failed.failure = fault.what();
    return std::vector<IntakeOutcome>(given.size(), failed);
}

void Writer::Inside::commit(std::unique_lock<std::mutex>& lock) {
    std::vector<Waiting> taken = take_batches();
    room.notify_all();
    lock.unlock();
    std::vector<IntakeBatch> given;
    for (Waiting& waiting : taken) given.push_back(std::move(waiting.batch));
    const std::vector<IntakeOutcome> outcomes = store(given);
    for (std::size_t i = 0; i < taken.size(); ++i)
        if (taken[i].done) taken[i].done(outcomes[i]);
    lock.lock();
    marks_untold = marks_untold || outcomes.front().marked;
    may_close = !outcomes.front().failed;
    quiet_over = false;
    jobs_in_quiet = 0;
}

// Marks are told when the hours they are about lie in blocks, where reading them is quick.
void Writer::Inside::close_step(std::unique_lock<std::mutex>& lock) {
    if (may_close) {
        lock.unlock();
        bool more = false;
        try {
            more = ledger->close_hours();
        } catch (const std::exception&) {
            more = false;  // the readings are safe in `recent`; the next commit tries again
        }
        lock.lock();
        may_close = more;
    }
    if (may_close || !marks_untold) return;
    marks_untold = false;
    const auto tell = marks_raised;
    lock.unlock();
    if (tell) tell();
    lock.lock();
}

void Writer::Inside::put(IntakeBatch&& batch, Stored&& done) {
    queued += weight_of(batch);
    batches.push_back({std::move(batch), std::move(done)});
    wake.notify_all();
}

void Writer::Inside::tell_marks() {
    {
        const std::lock_guard lock(mutex);
        marks_untold = true;
    }
    wake.notify_all();
}

void Writer::Inside::tell_outbox() {
    std::function<void()> tell;
    {
        const std::lock_guard lock(mutex);
        tell = outbox_filled;
    }
    if (tell) tell();
}

Writer::Writer(std::unique_ptr<Ledger> ledger, std::chrono::milliseconds commit_interval)
    : inside_(std::make_unique<Inside>(std::move(ledger), commit_interval)) {}

Writer::~Writer() {
    {
        const std::lock_guard lock(inside_->mutex);
        inside_->stopping = true;
    }
    inside_->wake.notify_all();
    inside_->thread.join();
}

const Directory& Writer::directory() const { return inside_->ledger->directory(); }

bool Writer::try_submit(IntakeBatch& batch, Stored done) {
    const std::lock_guard lock(inside_->mutex);
    if (!inside_->batches.empty() && inside_->queued + weight_of(batch) > most_queued) return false;
    inside_->put(std::move(batch), std::move(done));
    return true;
}

void Writer::submit(IntakeBatch batch, Stored done) {
    std::unique_lock lock(inside_->mutex);
    inside_->room.wait(lock, [&] {
        return inside_->batches.empty() || inside_->queued + weight_of(batch) <= most_queued;
    });
    inside_->put(std::move(batch), std::move(done));
}

// The jobs below run on the writing thread while their caller waits, so they may refer to what the caller holds.

bool Writer::store(const AnalysisResult& result) {
    return inside_->wait_for([&](Ledger& ledger) {
        const bool stored = ledger.store(result);
        if (stored && !result.notices.empty()) inside_->tell_outbox();
        if (!stored || result.mark_again_from) inside_->tell_marks();
        return stored;
    });
}

std::int64_t Writer::store(const Event& event) {
    return inside_->wait_for([&](Ledger& ledger) {
        const std::int64_t id = ledger.store(event);
        inside_->tell_marks();
        return id;
    });
}

void Writer::store(std::vector<Notice> notices) {
    inside_->wait_for([&](Ledger& ledger) {
        ledger.store(notices);
        inside_->tell_outbox();
    });
}

void Writer::store(std::vector<DeliveryUpdate> updates) {
    inside_->wait_for([&](Ledger& ledger) { ledger.store(updates); });
}

void Writer::backup(const std::string& path) {
    CopyStep copy_more = inside_->wait_for([&](Ledger& ledger) { return ledger.begin_backup(path); });
    const auto step = [&](Ledger&) {
        try {
            if (copy_more()) return true;
        } catch (...) {
            copy_more = nullptr;  // here, since it belongs to this thread
            throw;
        }
        copy_more = nullptr;
        return false;
    };
    while (inside_->wait_for(step)) {
    }
}

void Writer::on_marks(std::function<void()> wake) {
    const std::lock_guard lock(inside_->mutex);
    inside_->marks_raised = std::move(wake);
}

void Writer::on_outbox(std::function<void()> wake) {
    const std::lock_guard lock(inside_->mutex);
    inside_->outbox_filled = std::move(wake);
}

void Writer::drain() {
    Inside& in = *inside_;
    std::unique_lock lock(in.mutex);
    in.room.wait(lock, [&] { return in.batches.empty() && in.jobs.empty() && !in.busy && !in.may_close; });
}

}  // namespace slipledger::ledger
