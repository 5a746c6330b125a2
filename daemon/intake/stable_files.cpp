#include "daemon/intake/stable_files.hpp"

namespace slipledger::intake {

bool is_candidate(std::string_view name) {
    return !name.starts_with('.') && !name.ends_with(".part") && !name.ends_with(".tmp") && !name.ends_with(".receipt.json");
}

std::vector<std::string> StableFiles::finished(const FolderListing& listing, analytics::Instant now) {
    std::erase_if(watched_, [&](const auto& known) { return !listing.contains(known.first); });
    std::vector<std::string> names;
    waiting_ = false;
    for (const auto& [name, file] : listing) {
        const auto [known, is_new] = watched_.try_emplace(name, Watched{file, now});
        if (known->second.file != file) known->second = Watched{file, now};
        if (now - known->second.since >= stable_for_) names.push_back(name);
        else waiting_ = true;
    }
    return names;
}

}  // namespace slipledger::intake
