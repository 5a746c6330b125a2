#include "tools/plantsim/files.hpp"

#include <date/tz.h>
#include <fmt/format.h>

#include <algorithm>
#include <cstring>
#include <fstream>
#include <stdexcept>

namespace slipledger::plantsim {
namespace {

constexpr std::size_t write_at = 1U << 20U;

// Threads: one at a time.
class TextFile {
public:
    explicit TextFile(const std::filesystem::path& path) : path_(path), out_(path, std::ios::binary) { check(); }

    std::string& text() { return text_; }

    void write_if_full() {
        if (text_.size() >= write_at) write();
    }

    void close() {
        write();
        out_.close();
        check();
    }

private:
    void write() {
        out_.write(text_.data(), static_cast<std::streamsize>(text_.size()));
        text_.clear();
        check();
    }

    void check() const {
        if (!out_) throw std::runtime_error(fmt::format("{}: cannot write: {}", path_.string(), std::strerror(errno)));
    }

    std::filesystem::path path_;
    std::ofstream out_;
    std::string text_;
};

// The ends of the plant's calendar days that lie in the span, 23 and 25 hours apart twice a year.
std::vector<Millis> day_ends(const PlantDrawing& plant, const Span& span) {
    const auto* zone = date::locate_zone(plant.time_zone);
    const date::sys_time<std::chrono::milliseconds> from{std::chrono::milliseconds{span.from}};
    std::vector<Millis> ends;
    for (auto day = date::floor<date::days>(zone->to_local(from)) + date::days{1};; day += date::days{1}) {
        const Millis end = std::chrono::milliseconds{zone->to_sys(day).time_since_epoch()}.count();
        if (end > span.to) return ends;
        ends.push_back(end);
    }
}

}  // namespace

std::size_t write_csv(const Mill& mill, const std::vector<std::size_t>& pumps, const Span& span,
                      const std::filesystem::path& file) {
    const CsvLayout layout = layout_for(mill.plant(), pumps);
    TextFile out(file);
    out.text() = csv_header(layout);
    std::size_t count = 0;
    std::vector<Row> rows;
    for (Millis time = span.from; time < span.to; time += span.interval) {
        rows.clear();
        for (const std::size_t pump : pumps) mill.sample(pump, time, rows);
        for (const Row& row : rows) append_csv(out.text(), row, layout);
        count += rows.size();
        out.write_if_full();
    }
    out.close();
    return count;
}

std::size_t write_truth(const Mill& mill, const std::vector<std::size_t>& pumps, const Span& span,
                        const std::filesystem::path& file) {
    TextFile out(file);
    out.text() = "time,pump,section,running_h,leakage_ratio\n";
    std::size_t count = 0;
    for (const Millis end : day_ends(mill.plant(), span))
        for (const std::size_t p : pumps) {
            const PumpDrawing& pump = mill.plant().pumps[p];
            for (std::size_t s = 0; s < pump.sections.size(); ++s, ++count)
                out.text() += fmt::format("{},{},{},{:.1f},{:.4f}\n", rfc3339(end), pump.id, pump.sections[s].id,
                                          mill.running_hours(p, end), mill.ratio(p, s, end - 1));
        }
    out.close();
    return count;
}

std::size_t drop_files(const Mill& mill, std::size_t pump, const Span& span, int days, const Pace& pace,
                       const std::filesystem::path& folder) {
    const CsvLayout layout = layout_for(mill.plant(), {pump});
    std::size_t count = 0;
    std::vector<Row> rows;
    for (Millis begin = span.from; begin < span.to; begin += days * day_ms) {
        const Millis end = std::min(span.to, begin + days * day_ms);
        pace.wait_until(end);
        rows.clear();
        for (Millis time = begin; time < end; time += span.interval) mill.sample(pump, time, rows);
        if (rows.empty()) continue;
        const std::string name = fmt::format("{}_{}.csv", mill.plant().pumps[pump].id, rfc3339(begin).substr(0, 10));
        TextFile out(folder / (name + ".part"));
        out.text() = csv_header(layout);
        for (const Row& row : rows) append_csv(out.text(), row, layout);
        out.close();
        std::filesystem::rename(folder / (name + ".part"), folder / name);
        count += rows.size();
    }
    return count;
}

}  // namespace slipledger::plantsim
