// How a webhook's request travels. Behind an interface so that what the webhook makes of answers can be tested without a
// network.
#pragma once

#include <chrono>
#include <functional>
#include <string>

namespace slipledger::notify {

// Threads: a value, share freely.
struct PostRequest {
    std::string url;
    std::string content_type;
    std::string body;
    std::chrono::milliseconds timeout{10000};  // for all of it, resolving included
};

// Threads: a value, share freely.
struct PostOutcome {
    int status = 0;     // of the answer; 0: there was none
    std::string text;   // the answer's body (cut), or what went wrong
    bool possible = true;  // false: can never work (an address that cannot be understood)
};

// Threads: any thread may call.
class Transport {
public:
    virtual ~Transport() = default;

    // `done` is called once, on whatever thread, unless the transport is closed first.
    virtual void post(PostRequest request, std::function<void(PostOutcome)> done) = 0;
};

}  // namespace slipledger::notify
