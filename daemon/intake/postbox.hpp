// The way back from the writer's thread to the network thread. The writer may outlive the network and still finish what
// is queued; once the box is closed what it says is dropped instead of being posted to an executor that is gone.
#pragma once

#include <mutex>
#include <utility>

#include <boost/asio/any_io_executor.hpp>
#include <boost/asio/post.hpp>

namespace slipledger::intake {

// Threads: any thread may post; the network thread closes it.
class Postbox {
public:
    explicit Postbox(boost::asio::any_io_executor executor) : executor_(std::move(executor)) {}

    template <class Work>
    void post(Work work) {
        const std::lock_guard lock(mutex_);
        if (open_) boost::asio::post(executor_, std::move(work));
    }
    void close() {
        const std::lock_guard lock(mutex_);
        open_ = false;
    }

private:
    std::mutex mutex_;
    bool open_ = true;
    boost::asio::any_io_executor executor_;
};

}  // namespace slipledger::intake
