#include "config/nearest.hpp"

#include <algorithm>
#include <numeric>
#include <vector>

namespace slipledger::config {
namespace {

// Optimal string alignment distance by the usual table, of which three rows are kept.
std::size_t edits_between(std::string_view a, std::string_view b) {
    std::vector<std::size_t> before(b.size() + 1);
    std::vector<std::size_t> last(b.size() + 1);
    std::vector<std::size_t> row(b.size() + 1);
    std::iota(last.begin(), last.end(), std::size_t{0});
    for (std::size_t i = 1; i <= a.size(); ++i) {
        row[0] = i;
        for (std::size_t j = 1; j <= b.size(); ++j) {
            const std::size_t changed = last[j - 1] + (a[i - 1] == b[j - 1] ? 0 : 1);
            row[j] = std::min({last[j] + 1, row[j - 1] + 1, changed});
            const bool swapped = i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1];
            if (swapped) row[j] = std::min(row[j], before[j - 2] + 1);
        }
        std::swap(before, last);
        std::swap(last, row);
    }
    return last[b.size()];
}

}  // namespace

std::string_view nearest_name(std::string_view written, std::span<const std::string_view> names) {
    constexpr std::size_t longest = 64;  // nothing that long is a slip of the pen
    if (written.size() > longest) return {};
    std::size_t fewest = std::max<std::size_t>(2, written.size() / 3) + 1;
    std::string_view nearest;
    for (const std::string_view name : names) {
        const std::size_t edits = edits_between(written, name);
        if (edits >= fewest) continue;
        fewest = edits;
        nearest = name;
    }
    return nearest;
}

}  // namespace slipledger::config
