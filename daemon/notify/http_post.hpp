// The transport of the real world: one HTTP/1.1 POST per notice over plain TCP, by Beast on the network thread. Redirects are
// answers like any other; of an answer at most 64 KiB are read.
#pragma once

#include <memory>

#include <boost/asio/any_io_executor.hpp>

#include "daemon/notify/transport.hpp"

namespace slipledger::notify {

// Threads: any thread may call; the work is done on `executor`.
class HttpPost final : public Transport {
public:
    explicit HttpPost(boost::asio::any_io_executor executor);
    ~HttpPost() override;

    void post(PostRequest request, std::function<void(PostOutcome)> done) override;

    // Cuts what is under way; nothing is sent from here on, and no `done` is called that was not called before.
    void close();

private:
    struct Inside;
    std::shared_ptr<Inside> inside_;  // shared with requests under way
};

}  // namespace slipledger::notify
