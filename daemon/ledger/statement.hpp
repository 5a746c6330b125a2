// Binding and reading wide rows in the order of their columns, with NaN as NULL both ways. Thin on purpose: SQLiteCpp does
// the work, this only counts columns and knows our types.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <cmath>
#include <cstdint>
#include <limits>
#include <optional>
#include <string>
#include <string_view>
#include <type_traits>

#include "analytics/instant.hpp"

namespace slipledger::ledger {

using analytics::Instant;

constexpr std::int64_t ms_of(Instant instant) { return instant.time_since_epoch().count(); }
constexpr Instant instant_of(std::int64_t ms) { return Instant(analytics::Milliseconds(ms)); }

// Threads: one at a time, like the statement under it. A std::string is not copied: it must outlive the execution.
class Binder {
public:
    explicit Binder(SQLite::Statement& statement) : statement_(statement) {}

    Binder& operator<<(double value) {
        if (std::isnan(value))
            statement_.bind(++column_);
        else
            statement_.bind(++column_, value);
        return *this;
    }
    Binder& operator<<(Instant value) { return *this << ms_of(value); }
    Binder& operator<<(const std::optional<Instant>& value) {
        if (value) return *this << *value;
        statement_.bind(++column_);
        return *this;
    }
    Binder& operator<<(const std::string& value) {
        statement_.bindNoCopy(++column_, value);
        return *this;
    }
    Binder& operator<<(std::string_view value) {  // copied
        statement_.bind(++column_, std::string(value));
        return *this;
    }
    Binder& operator<<(analytics::Milliseconds value) { return *this << value.count(); }
    template <typename Whole>
        requires(std::is_integral_v<Whole> || std::is_enum_v<Whole>)
    Binder& operator<<(Whole value) {
        statement_.bind(++column_, static_cast<std::int64_t>(value));
        return *this;
    }

    // The same list of fields can bind and read: `io & a & b`.
    template <typename Value>
    Binder& operator&(const Value& value) {
        return *this << value;
    }

private:
    SQLite::Statement& statement_;
    int column_ = 0;
};

// Threads: one at a time, like the statement under it.
class ColumnReader {
public:
    explicit ColumnReader(SQLite::Statement& statement) : statement_(statement) {}

    ColumnReader& operator>>(double& value) {
        const SQLite::Column column = statement_.getColumn(next_++);
        value = column.isNull() ? std::numeric_limits<double>::quiet_NaN() : column.getDouble();
        return *this;
    }
    ColumnReader& operator>>(Instant& value) {
        value = instant_of(statement_.getColumn(next_++).getInt64());
        return *this;
    }
    ColumnReader& operator>>(std::optional<Instant>& value) {
        const SQLite::Column column = statement_.getColumn(next_++);
        value = column.isNull() ? std::nullopt : std::optional(instant_of(column.getInt64()));
        return *this;
    }
    ColumnReader& operator>>(std::string& value) {
        value = statement_.getColumn(next_++).getString();
        return *this;
    }
    template <typename Whole>
        requires(std::is_integral_v<Whole> || std::is_enum_v<Whole>)
    ColumnReader& operator>>(Whole& value) {
        value = static_cast<Whole>(statement_.getColumn(next_++).getInt64());
        return *this;
    }

    ColumnReader& operator>>(analytics::Milliseconds& value) {
        value = analytics::Milliseconds(statement_.getColumn(next_++).getInt64());
        return *this;
    }
    template <typename Value>
    ColumnReader& operator&(Value& value) {
        return *this >> value;
    }

private:
    SQLite::Statement& statement_;
    int next_ = 0;
};

// Runs a bound statement that gives no rows and makes it ready for the next.
inline void run(SQLite::Statement& statement) {
    statement.exec();
    statement.reset();
}

// A statement that was taken from a cache, put back ready whatever happens. Threads: one at a time.
class Resetting {
public:
    explicit Resetting(SQLite::Statement& statement) : statement_(statement) {}
    ~Resetting() { statement_.tryReset(); }
    Resetting(const Resetting&) = delete;
    Resetting& operator=(const Resetting&) = delete;

private:
    SQLite::Statement& statement_;
};

}  // namespace slipledger::ledger
