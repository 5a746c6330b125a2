// One file of a drop folder, from its reading to its place in taken/ or refused/. Each step can be the last before a kill; the
// next start completes what is unfinished:
//   rows, the last ones with the receipt, in the ledger  ->  NAME.receipt.json in taken/ or refused/  ->  the file moved there
#pragma once

#include <filesystem>
#include <string>

#include "daemon/intake/file_load.hpp"

namespace slipledger::intake {

struct DropOutcome {
    LoadOutcome load;
    std::filesystem::path moved_to;  // empty: it stays where it is, and is tried again later
};

// Blocks until done. Throws std::filesystem::filesystem_error or std::system_error where the receipt cannot be written or
// the file not moved.
DropOutcome take_drop_file(const std::filesystem::path& folder, const std::string& name, const LoadWorld& world);

// Writes a file so that it is there whole or not at all, also after a power cut.
void write_whole(const std::filesystem::path& path, const std::string& text);

}  // namespace slipledger::intake
