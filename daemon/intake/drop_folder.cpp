#include "daemon/intake/drop_folder.hpp"

#include <sys/inotify.h>
#include <sys/stat.h>

#include <algorithm>
#include <array>
#include <stdexcept>
#include <system_error>
#include <utility>

#include <boost/asio/co_spawn.hpp>
#include <boost/asio/experimental/awaitable_operators.hpp>
#include <spdlog/spdlog.h>

#include "daemon/spawn.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using namespace net::experimental::awaitable_operators;
namespace fs = std::filesystem;

constexpr auto look_again_after = 3s;

}  // namespace

DropFolder::DropFolder(net::io_context& io, net::thread_pool& readers, const LoadWorld& world, FeedCounters& counters)
    : world_(world),
      counters_(counters),
      readers_(readers),
      folder_(world.mapping.feed().folder),
      stable_(world.mapping.feed().stable_for),
      events_(io) {
    world_.stop = &stop_;
    std::error_code error;
    fs::create_directories(folder_ / "taken", error);
    if (!error) fs::create_directories(folder_ / "refused", error);
    if (error) throw std::runtime_error("feed " + world.mapping.feed().id + ": folder " + folder_.string() + ": " + error.message());
    const int events = ::inotify_init1(IN_NONBLOCK | IN_CLOEXEC);
    if (events < 0) return;  // none left on this machine: looking every few seconds is enough
    events_.assign(events);
    if (::inotify_add_watch(events, folder_.c_str(), IN_CREATE | IN_CLOSE_WRITE | IN_MOVED_TO) < 0) events_.close();
}

void DropFolder::start() {
    running_ = true;
    spawn_vital(events_.get_executor(), "drop folder of feed " + world_.mapping.feed().id, watch());
}

void DropFolder::stop() {
    stop_ = true;
    boost::system::error_code ignored;
    events_.close(ignored);
}

net::awaitable<void> DropFolder::watch() {
    while (!stop_) {
        co_await look();
        if (!stop_) co_await wait();
    }
    running_ = false;
}

net::awaitable<void> DropFolder::look() {
    for (const std::string& name : stable_.finished(listing(), world_.clock.now())) {
        if (stop_) co_return;
        co_await take(name);
    }
}

net::awaitable<void> DropFolder::take(std::string name) {
    try {
        auto job = take_on_reader(name);
        const DropOutcome outcome = co_await net::co_spawn(readers_.get_executor(), std::move(job), net::use_awaitable);
        count(name, outcome);
    } catch (const std::system_error& error) {  // of the receipt or the move; the rows are safe
        complain(name, error.what());
    }
}

net::awaitable<DropOutcome> DropFolder::take_on_reader(std::string name) { co_return take_drop_file(folder_, name, world_); }

void DropFolder::count(const std::string& name, const DropOutcome& outcome) {
    const ledger::Receipt& receipt = outcome.load.receipt;
    if (outcome.load.end == LoadEnd::stopped) return;
    if (outcome.load.end == LoadEnd::failed) return complain(name, outcome.load.failure);
    complained_.erase(name);
    spdlog::info("feed {}: {} -> {}: {} rows stored, {} repeated, {} refused{}", world_.mapping.feed().id, name,
                 outcome.moved_to.string(), receipt.stored, receipt.repeated, receipt.refused,
                 outcome.load.end == LoadEnd::already_taken ? " when its content was taken before" : "");
    ++counters_.files;
    if (outcome.load.end == LoadEnd::already_taken) return;
    counters_.stored += receipt.stored;
    counters_.repeated += receipt.repeated;
    counters_.refused += receipt.refused;
    if (receipt.stored + receipt.repeated > 0) counters_.brought(outcome.load.newest, world_.clock.now());
}

void DropFolder::complain(const std::string& name, const std::string& what) {
    if (complained_.insert(name).second) spdlog::error("feed {}: {} {}; it is tried again", world_.mapping.feed().id, name, what);
}

FolderListing DropFolder::listing() const {
    FolderListing files;
    std::error_code error;
    for (fs::directory_iterator entry(folder_, error), end; !error && entry != end; entry.increment(error)) {
        const std::string name = entry->path().filename();
        struct stat facts {};
        // Not through links: whoever may write into the folder need not be one who may read what a link points at.
        if (!is_candidate(name) || ::lstat(entry->path().c_str(), &facts) != 0 || !S_ISREG(facts.st_mode)) continue;
        SeenFile file;
        file.size = static_cast<std::uint64_t>(facts.st_size);
        file.changed_ns = facts.st_mtim.tv_sec * 1'000'000'000 + facts.st_mtim.tv_nsec;
        file.inode = facts.st_ino;
        files.emplace(name, file);
    }
    if (error) spdlog::error("feed {}: folder {}: {}", world_.mapping.feed().id, folder_.string(), error.message());
    return files;
}

net::awaitable<void> DropFolder::wait() {
    const auto stable_for = std::chrono::milliseconds(world_.mapping.feed().stable_for);
    const auto pause = stable_.waiting() ? std::clamp<std::chrono::milliseconds>(stable_for / 2, 20ms, look_again_after)
                                         : std::chrono::milliseconds(look_again_after);
    net::steady_timer timer(events_.get_executor(), pause);
    if (!events_.is_open()) {
        co_await timer.async_wait(as_values);
        co_return;
    }
    std::array<char, 4096> told{};
    const auto space = net::buffer(told);
    co_await (events_.async_read_some(space, as_values) || timer.async_wait(as_values));
}

}  // namespace slipledger::intake
