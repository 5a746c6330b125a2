// The content of a file as a name for it: 64 hexadecimal digits.
#pragma once

#include <memory>
#include <span>
#include <string>

namespace slipledger::intake {

// Threads: one at a time.
class Sha256 {
public:
    Sha256();
    ~Sha256();
    Sha256(const Sha256&) = delete;
    Sha256& operator=(const Sha256&) = delete;

    void add(std::span<const char> bytes);
    std::string digest();  // once, at the end

private:
    struct Context;
    std::unique_ptr<Context> context_;
};

}  // namespace slipledger::intake
