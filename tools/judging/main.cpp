#include <fmt/format.h>
#include <spdlog/spdlog.h>
#include <unistd.h>

#include <cstdio>
#include <fstream>
#include <stdexcept>

#include "tools/judging/details.hpp"
#include "tools/judging/floors.hpp"
#include "tools/judging/options.hpp"
#include "tools/judging/table.hpp"

namespace slipledger::judging {
namespace {

constexpr int fine = 0;
constexpr int fell = 1;
constexpr int could_not = 3;

// On a terminal one line that counts; else a line every tenth part.
void show_progress(std::size_t done, std::size_t of) {
    if (::isatty(STDERR_FILENO) == 1) {
        fmt::print(stderr, "\rjudge: {} of {} plants{}", done, of, done == of ? "\n" : "");
    } else if (done * 10 / of != (done - 1) * 10 / of) {
        fmt::print(stderr, "judge: {} of {} plants\n", done, of);
    }
    std::fflush(stderr);
}

int tell_one(const Options& options) {
    const Story story = tell(options.order.fleets.front().fleet, *options.number, options.order.telling);
    if (options.show_plant_file) {
        fmt::print("{}\n", story.plant_file);
        return fine;
    }
    const std::filesystem::path folder = options.order.folder / fmt::format("judge-{}", ::getpid());
    std::filesystem::create_directories(folder);
    const std::string trace = trace_csv(story, options.order.spoil, folder);
    std::filesystem::remove_all(folder);
    fmt::print("{}", trace);
    return fine;
}

void write(const std::filesystem::path& file, const std::string& text) {
    std::ofstream out(file);
    out << text;
    if (!out.flush()) throw std::runtime_error(fmt::format("{}: cannot write", file.string()));
}

int run(const Options& options) {
    spdlog::set_level(spdlog::level::warn);
    if (options.number) return tell_one(options);
    const BenchResult result = run_bench(options.order, show_progress);
    if (!options.details.empty()) write(options.details, details_csv(result));
    fmt::print("{}", options.json ? json_of(result) : table_of(result));
    if (!options.holds_floors) return fine;
    const std::vector<std::string> sentences = fallen(figures_of(result.sections));
    for (const std::string& sentence : sentences) fmt::print(stderr, "judge: {}\n", sentence);
    return sentences.empty() ? fine : fell;
}

}  // namespace
}  // namespace slipledger::judging

int main(int argc, char** argv) try {
    return slipledger::judging::run(slipledger::judging::parse_options(argc, argv));
} catch (const slipledger::judging::EndNow& end) {
    return end.status;
} catch (const std::exception& e) {
    fmt::print(stderr, "judge: {}\n", e.what());
    return slipledger::judging::could_not;
}
