// Watches the folder of one feed and has finished files taken, one after the other in order of name. inotify says when to
// look; a look every few seconds finds what a network share does not tell.
#pragma once

#include <atomic>
#include <map>
#include <set>
#include <string>

#include <boost/asio/io_context.hpp>
#include <boost/asio/posix/stream_descriptor.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/thread_pool.hpp>

#include "daemon/intake/as_values.hpp"
#include "daemon/intake/drop_file.hpp"
#include "daemon/intake/feed_counters.hpp"
#include "daemon/intake/stable_files.hpp"

namespace slipledger::intake {

// Threads: network thread only; files are read on `readers`, which has to outlive the io_context's run.
class DropFolder {
public:
    // std::runtime_error where the folder cannot be used.
    DropFolder(net::io_context& io, net::thread_pool& readers, const LoadWorld& world, FeedCounters& counters);

    void start();
    void stop();  // leaves a file half read where it is; the next start takes it
    bool idle() const { return !running_; }

private:
    net::awaitable<void> watch();
    net::awaitable<void> look();
    net::awaitable<void> take(std::string name);
    net::awaitable<DropOutcome> take_on_reader(std::string name);
    net::awaitable<void> wait();
    FolderListing listing() const;
    void count(const std::string& name, const DropOutcome& outcome);
    void complain(const std::string& name, const std::string& what);

    LoadWorld world_;
    FeedCounters& counters_;
    net::thread_pool& readers_;
    std::filesystem::path folder_;
    StableFiles stable_;
    net::posix::stream_descriptor events_;
    std::set<std::string> complained_;  // each file is complained of once
    std::atomic<bool> stop_{false};
    bool running_ = false;
};

}  // namespace slipledger::intake
