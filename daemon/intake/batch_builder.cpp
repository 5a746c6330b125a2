#include "daemon/intake/batch_builder.hpp"

#include <algorithm>
#include <utility>

namespace slipledger::intake {
namespace {

constexpr std::size_t kept_of_line = 1024;

}  // namespace

BatchBuilder::BatchBuilder(ledger::FeedId feed, std::string place, std::size_t most_rows)
    : feed_(feed), place_(std::move(place)), most_rows_(most_rows) {}

void BatchBuilder::line(std::uint64_t number, std::string_view text, ledger::Instant now) {
    line_ = number;
    text_ = text;
    now_ = now;
    batch_.account.through = number;
    first_of_row_ = batch_.batch.rows.size();
    refused_cells_ = 0;
}

void BatchBuilder::open_row(ledger::Instant time) { time_ = time; }

void BatchBuilder::add(ledger::PointId point, analytics::Quantity quantity, double value) {
    auto& rows = batch_.batch.rows;
    const auto bit = static_cast<std::uint16_t>(1U << analytics::index_of(quantity));
    std::size_t i = first_of_row_;
    // Two columns for one cell are two values of it: each has a row, and the ledger sees the dispute.
    while (i < rows.size() && (rows[i].point != point || (rows[i].present & bit) != 0)) ++i;
    if (i == rows.size()) {
        ledger::Row& row = rows.emplace_back();
        row.time = time_;
        row.point = point;
        row.feed = feed_;
        row.source = batch_.batch.sources;
    }
    rows[i].present = static_cast<std::uint16_t>(rows[i].present | bit);
    rows[i].value[analytics::index_of(quantity)] = value;
}

void BatchBuilder::refuse_cell(const Refusal& refusal) {
    if (refused_cells_++ < most_refused_cells) keep(refusal, refused_cells_ == 1);
    else ++batch_.account.more_faults;
}

void BatchBuilder::close_row() {
    if (batch_.batch.rows.size() > first_of_row_) {
        ++batch_.batch.sources;
        batch_.account.newest = std::max(batch_.account.newest, time_);
    } else if (refused_cells_ > 0) {
        ++batch_.account.refused;  // its cells say why
    } else {
        refuse_row(Refusal(Reason::no_value, {}, "the row holds no reading", "at least one value"));
    }
}

void BatchBuilder::refuse_row(const Refusal& refusal) {
    batch_.batch.rows.resize(first_of_row_);
    ++batch_.account.refused;
    keep(refusal, true);
}

void BatchBuilder::refuse_unfinished(const Refusal& refusal) {
    refuse_row(refusal);
    batch_.account.through = line_ - 1;
}

void BatchBuilder::remark(const Refusal& refusal) { keep(refusal, true); }

void BatchBuilder::keep(const Refusal& refusal, bool with_text) {
    ledger::RefusedRow row;
    row.feed = feed_;
    row.place = place_ + "line " + std::to_string(line_);
    row.code = code_of(refusal.reason);
    row.message = refusal.message();
    if (with_text) row.text = text_.substr(0, kept_of_line);
    row.received = now_;
    auto& account = batch_.account;
    if (account.faults.size() < most_faults) account.faults.push_back(LineFault{line_, row.message});
    else ++account.more_faults;
    batch_.batch.refused.push_back(std::move(row));
}

bool BatchBuilder::full() const {
    return batch_.batch.rows.size() >= most_rows_ || batch_.batch.refused.size() >= most_refused_of_batch;
}

ReadBatch BatchBuilder::take() {
    ReadBatch taken = std::move(batch_);
    batch_ = ReadBatch{};
    batch_.account.through = taken.account.through;
    return taken;
}

}  // namespace slipledger::intake
