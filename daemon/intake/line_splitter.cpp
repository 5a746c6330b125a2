#include "daemon/intake/line_splitter.hpp"

namespace slipledger::intake {
namespace {

constexpr std::string_view byte_order_mark = "\xEF\xBB\xBF";
constexpr std::size_t shown_of_too_long = 1024;

}  // namespace

Line LineSplitter::line(std::string_view text) {
    ++lines_;
    if (lines_ == 1 && text.starts_with(byte_order_mark)) text.remove_prefix(byte_order_mark.size());
    if (text.ends_with('\r')) text.remove_suffix(1);
    const bool too_long = overflown_ || text.size() > longest_line;
    overflown_ = false;
    return Line{too_long ? text.substr(0, shown_of_too_long) : text, lines_, too_long};
}

void LineSplitter::keep(std::string_view piece) {
    if (overflown_) return;
    kept_.append(piece);
    if (kept_.size() <= longest_line + byte_order_mark.size() + 1) return;  // mark and CR do not count
    overflown_ = true;
    kept_.resize(shown_of_too_long);
    kept_.shrink_to_fit();
}

std::optional<Line> LineSplitter::next(std::string_view& bytes) {
    if (used_) kept_.clear();
    used_ = false;
    const std::size_t end = bytes.find('\n');
    const std::string_view piece = bytes.substr(0, end);
    bytes.remove_prefix(end == std::string_view::npos ? bytes.size() : end + 1);
    if (end == std::string_view::npos) {
        keep(piece);
        return std::nullopt;
    }
    if (kept_.empty()) return line(piece);
    keep(piece);
    used_ = true;
    return line(kept_);
}

std::optional<Line> LineSplitter::rest() {
    if (used_) kept_.clear();
    if (kept_.empty()) return std::nullopt;
    used_ = true;
    return line(kept_);
}

}  // namespace slipledger::intake
