// A folder of a test's own, gone with the test.
#pragma once

#include <filesystem>
#include <string>

namespace slipledger::testing {

// Threads: one at a time.
class TempFolder {
public:
    TempFolder();
    ~TempFolder();
    TempFolder(const TempFolder&) = delete;
    TempFolder& operator=(const TempFolder&) = delete;

    const std::filesystem::path& path() const { return path_; }
    std::string operator/(const std::string& name) const { return (path_ / name).string(); }

private:
    std::filesystem::path path_;
};

}  // namespace slipledger::testing
