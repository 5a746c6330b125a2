#include "daemon/ledger/registry.hpp"

#include <array>

#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

// Threads: one at a time.
class Registrar {
public:
    explicit Registrar(SQLite::Database& database) : database_(database) {}

    void feed(const std::string& name, const std::string& corrects) {
        SQLite::Statement statement(database_,
                                    "INSERT INTO feed (name, corrects) VALUES (?, nullif(?, '')) "
                                    "ON CONFLICT (name) DO UPDATE SET corrects = excluded.corrects "
                                    "WHERE corrects IS NOT excluded.corrects");
        Binder(statement) << name << corrects;
        run(statement);
    }

    std::int64_t pump(const std::string& name) {
        insert("INSERT INTO pump (name) VALUES (?) ON CONFLICT DO NOTHING", name);
        const std::int64_t id = find("SELECT id FROM pump WHERE name = ?", name);
        database_.exec("INSERT INTO pump_state (pump) VALUES (" + std::to_string(id) + ") ON CONFLICT DO NOTHING");
        return id;
    }

    std::int64_t point(const std::string& kind, const std::string& name, const std::string& section) {
        insert("INSERT INTO point (kind, name, section) VALUES (?, ?, ?) ON CONFLICT DO NOTHING", kind, name, section);
        return find("SELECT id FROM point WHERE kind = ? AND name = ? AND section = ?", kind, name, section);
    }

    void name(std::int64_t pump, const std::string& section, std::int64_t point) {
        insert("INSERT INTO point_name (pump, section, point) VALUES (?, ?, ?) "
               "ON CONFLICT (pump, section) DO UPDATE SET point = excluded.point",
               pump, section, point);
    }

    void touches(std::int64_t point, std::int64_t pump) {
        insert("INSERT INTO point_pump (point, pump) VALUES (?, ?) ON CONFLICT DO NOTHING", point, pump);
    }

    void track(std::int64_t pump, const std::string& section, analytics::Basis basis) {
        const std::string word(name_of(basis));
        insert("INSERT INTO track (pump, section, basis) VALUES (?, ?, ?) ON CONFLICT DO NOTHING", pump, section, word);
    }

private:
    template <typename... Values>
    void insert(const char* sql, const Values&... values) {
        SQLite::Statement statement(database_, sql);
        Binder binder(statement);
        static_cast<void>((binder << ... << values));
        run(statement);
    }

    template <typename... Values>
    std::int64_t find(const char* sql, const Values&... values) {
        SQLite::Statement statement(database_, sql);
        Binder binder(statement);
        static_cast<void>((binder << ... << values));
        statement.executeStep();
        return statement.getColumn(0).getInt64();
    }

    SQLite::Database& database_;
};

void register_pump(Registrar& registrar, const config::Pump& pump) {
    const std::int64_t id = registrar.pump(pump.id);
    const std::int64_t own = registrar.point("pump", pump.id, "");
    registrar.name(id, "", own);
    registrar.touches(own, id);
    for (const config::Section& section : pump.sections) {
        const bool alone = pump.sections.size() == 1;
        const std::int64_t point = alone ? own : registrar.point("section", pump.id, section.id);
        registrar.name(id, section.id, point);
        registrar.touches(point, id);
        if (!section.drain_group.empty()) registrar.touches(registrar.point("drain-group", section.drain_group, ""), id);
        for (const auto basis : {analytics::Basis::case_drain, analytics::Basis::delivery})
            registrar.track(id, section.id, basis);
    }
    if (!pump.reservoir.empty()) registrar.touches(registrar.point("reservoir", pump.reservoir, ""), id);
}

void load_points(SQLite::Database& database, Directory& directory) {
    SQLite::Statement shared(database, "SELECT id, kind, name FROM point WHERE kind IN ('reservoir', 'drain-group')");
    while (shared.executeStep()) {
        PointId id{};
        std::string kind;
        std::string name;
        ColumnReader(shared) >> id >> kind >> name;
        (kind == "reservoir" ? directory.reservoirs : directory.drain_groups)[name] = id;
    }
    SQLite::Statement named(database, "SELECT p.name, n.section, n.point FROM point_name n JOIN pump p ON p.id = n.pump");
    while (named.executeStep()) {
        std::pair<std::string, std::string> name;
        PointId id{};
        ColumnReader(named) >> name.first >> name.second >> id;
        directory.points[name] = id;
    }
    SQLite::Statement touched(database, "SELECT point, pump FROM point_pump ORDER BY point, pump");
    while (touched.executeStep()) {
        PointId point{};
        PumpId pump{};
        ColumnReader(touched) >> point >> pump;
        directory.pumps_of_point[point].push_back(pump);
    }
}

void load_tracks(SQLite::Database& database, Directory& directory) {
    SQLite::Statement rows(database,
                           "SELECT t.id, t.pump, p.name, t.section, t.basis = 'delivery' "
                           "FROM track t JOIN pump p ON p.id = t.pump ORDER BY t.id");
    while (rows.executeStep()) {
        TrackEntry entry;
        ColumnReader(rows) >> entry.id >> entry.pump >> entry.pump_name >> entry.section >> entry.basis;
        directory.tracks.push_back(entry);
    }
}

template <typename Id>
void load_names(SQLite::Database& database, const char* sql, std::map<std::string, Id, std::less<>>& names) {
    SQLite::Statement rows(database, sql);
    while (rows.executeStep()) {
        Id id{};
        std::string name;
        ColumnReader(rows) >> id >> name;
        names[name] = id;
    }
}

}  // namespace

void register_plant(SQLite::Database& database, const config::Plant& plant) {
    SQLite::Transaction transaction(database, SQLite::TransactionBehavior::IMMEDIATE);
    Registrar registrar(database);
    for (const config::Feed& feed : plant.feeds) registrar.feed(feed.id, feed.corrects);
    registrar.feed("command", "");
    database.exec("DELETE FROM point_pump");
    for (const config::Reservoir& reservoir : plant.reservoirs) registrar.point("reservoir", reservoir.id, "");
    for (const config::Pump& pump : plant.pumps) register_pump(registrar, pump);
    transaction.commit();
}

Directory load_directory(SQLite::Database& database) {
    Directory directory;
    load_names(database, "SELECT id, name FROM pump", directory.pumps);
    load_names(database, "SELECT id, name FROM feed", directory.feeds);
    load_points(database, directory);
    load_tracks(database, directory);
    return directory;
}

}  // namespace slipledger::ledger
