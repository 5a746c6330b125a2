// Reader's answers about what people and the outside world were told and have told.

#include <set>

#include "daemon/ledger/reader_connection.hpp"

namespace slipledger::ledger {
namespace {

constexpr const char* notice_columns = "n.id, n.pump, n.section, n.episode, n.kind, n.level, n.at, n.body";

void read_notice(ColumnReader& reader, Notice& notice) {
    reader >> notice.id >> notice.pump >> notice.section >> notice.episode >> notice.kind >> notice.level >> notice.at >>
        notice.body;
}

}  // namespace

bool Reader::has_notice(std::string_view id) const {
    bool found = false;
    connection_->each("SELECT 1 FROM notice WHERE id = ?", [&](SQLite::Statement&) { found = true; }, std::string(id));
    return found;
}

std::vector<Notice> Reader::notices(std::string_view pump) const {
    std::vector<Notice> notices;
    const auto read = [&](SQLite::Statement& row) {
        ColumnReader reader(row);
        read_notice(reader, notices.emplace_back());
    };
    const std::string select = std::string("SELECT ") + notice_columns + " FROM notice n ";
    if (pump.empty())
        connection_->each(select + "ORDER BY number", read);
    else
        connection_->each(select + "WHERE pump = ? ORDER BY number", read, std::string(pump));
    return notices;
}

std::vector<Event> Reader::events(std::string_view pump) const {
    std::vector<Event> events;
    const auto read = [&](SQLite::Statement& row) {
        Event& event = events.emplace_back();
        ColumnReader(row) >> event.id >> event.pump >> event.section >> event.kind >> event.at >> event.entered >>
            event.by >> event.user >> event.body;
    };
    const std::string select = "SELECT id, pump, section, kind, at, entered, \"by\", user, body FROM dated_event ";
    if (pump.empty())
        connection_->each(select + "ORDER BY at, id", read);
    else
        connection_->each(select + "WHERE pump IN (?, '') ORDER BY at, id", read, std::string(pump));
    return events;
}

std::vector<OutboxRow> Reader::due(std::string_view target, Instant now, std::size_t most) const {
    std::vector<OutboxRow> due;
    std::set<std::string> waiting;  // pumps whose first undelivered notice must wait: so must the rest
    SQLite::Statement& rows = connection_->prepared(
        std::string("SELECT o.id, o.target, o.attempts, o.next_try, ") + notice_columns +
        " FROM outbox o JOIN notice n ON n.number = o.notice WHERE o.target = ? AND o.state = 0 ORDER BY o.id");
    const Resetting reset(rows);
    Binder(rows) << target;
    while (due.size() < most && rows.executeStep()) {
        OutboxRow row;
        ColumnReader reader(rows);
        reader >> row.id >> row.target >> row.attempts >> row.next_try;
        read_notice(reader, row.notice);
        if (waiting.contains(row.notice.pump)) continue;
        if (row.next_try && *row.next_try > now)
            waiting.insert(row.notice.pump);
        else
            due.push_back(std::move(row));
    }
    return due;
}

std::vector<DeliveryCount> Reader::deliveries() const {
    std::vector<DeliveryCount> counts;
    connection_->each(
        "SELECT o.target, sum(o.state = 0), sum(o.state = 2), "
        "coalesce((SELECT last_error FROM outbox e WHERE e.target = o.target AND e.state <> 1 AND e.last_error <> '' "
        "ORDER BY e.id DESC LIMIT 1), '') FROM outbox o GROUP BY o.target ORDER BY o.target",
        [&](SQLite::Statement& row) {
            DeliveryCount& count = counts.emplace_back();
            ColumnReader(row) >> count.target >> count.pending >> count.failed >> count.last_error;
        });
    return counts;
}

std::vector<FeedState> Reader::feeds() const {
    std::vector<FeedState> feeds;
    connection_->each(
        "SELECT f.name, coalesce(r.code, ''), count(r.id) FROM feed f LEFT JOIN refused r ON r.feed = f.id "
        "GROUP BY f.id, r.code ORDER BY f.id, r.code",
        [&](SQLite::Statement& row) {
            std::string feed;
            std::string code;
            std::uint64_t count = 0;
            ColumnReader(row) >> feed >> code >> count;
            if (feeds.empty() || feeds.back().feed != feed) feeds.emplace_back().feed = feed;
            feeds.back().refused += count;
            if (count > 0) feeds.back().refused_by_code[code] = count;
        });
    return feeds;
}

std::vector<RefusedRow> Reader::refused(std::string_view feed, std::size_t most) const {
    std::vector<RefusedRow> rows;
    connection_->each(
        "SELECT r.feed, r.place, r.code, r.message, r.text, r.received FROM refused r JOIN feed f ON f.id = r.feed "
        "WHERE f.name = ? ORDER BY r.id DESC LIMIT ?",
        [&](SQLite::Statement& statement) {
            RefusedRow& row = rows.emplace_back();
            ColumnReader(statement) >> row.feed >> row.place >> row.code >> row.message >> row.text >> row.received;
        },
        std::string(feed), most);
    return rows;
}

std::optional<Receipt> Reader::receipt(std::string_view sha256) const {
    std::optional<Receipt> found;
    connection_->each(
        "SELECT sha256, feed, file, rows, stored, repeated, refused, taken FROM receipt WHERE sha256 = ?",
        [&](SQLite::Statement& row) {
            Receipt& receipt = found.emplace();
            ColumnReader(row) >> receipt.sha256 >> receipt.feed >> receipt.file >> receipt.rows >> receipt.stored >>
                receipt.repeated >> receipt.refused >> receipt.taken;
        },
        std::string(sha256));
    return found;
}

}  // namespace slipledger::ledger
