#include "tools/judging/bench.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>
#include <exception>
#include <mutex>
#include <thread>

#include "config/plant_reader.hpp"
#include "tools/judging/pipeline.hpp"
#include "tools/judging/yardsticks.hpp"

namespace slipledger::judging {
namespace {

// Threads: one at a time. Gone with the run, ledger and all.
class OwnFolder {
public:
    OwnFolder(const std::filesystem::path& parent, std::size_t number)
        : path_(parent / fmt::format("judge-{}-{}", ::getpid(), number)) {
        std::filesystem::create_directories(path_);
    }
    ~OwnFolder() {
        std::error_code ignored;
        std::filesystem::remove_all(path_, ignored);
    }
    OwnFolder(const OwnFolder&) = delete;
    OwnFolder& operator=(const OwnFolder&) = delete;

    const std::filesystem::path& path() const { return path_; }

private:
    std::filesystem::path path_;
};

const config::Section& section_of(const config::Plant& plant, const Story& story, const SectionStory& section) {
    const plantsim::PumpDrawing& pump = story.plant.pumps[section.pump];
    return *plant.find_pump(pump.id)->find_section(pump.sections[section.section].id);
}

// The notebook starts from what the plant's people know, so from the plant file, spoilt or not.
std::vector<Notes> notes_for(const Story& story, const config::Plant& plant) {
    std::vector<Notes> notes;
    for (const SectionStory& section : story.sections) {
        const plantsim::PumpDrawing& pump = story.plant.pumps[section.pump];
        notes.emplace_back(*plant.find_pump(pump.id), section_of(plant, story, section),
                           pump.sections[section.section].fitted.drain, pump.sections.size() == 1,
                           story.plant.year_begins, story.plant.year_ends);
    }
    return notes;
}

// Numbers of the stories of each fleet, until it has its pumps.
std::vector<std::pair<Fleet, std::size_t>> numbers_of(const BenchOrder& order) {
    std::vector<std::pair<Fleet, std::size_t>> all;
    for (const FleetOrder& fleet : order.fleets) {
        std::size_t pumps = 0;
        for (std::size_t number = 0; pumps < fleet.pumps; ++number) {
            pumps += tell(fleet.fleet, number, order.telling).plant.pumps.size();
            all.emplace_back(fleet.fleet, number);
        }
    }
    return all;
}

// Hands out stories to threads and keeps what became of them, in order. Threads: `next` and `keep` any.
class Counter {
public:
    Counter(std::size_t count, const std::function<void(std::size_t, std::size_t)>& progress)
        : outcomes_(count), progress_(progress) {}

    std::optional<std::size_t> next() {
        const std::lock_guard lock(guard_);
        if (failure_ || next_ == outcomes_.size()) return std::nullopt;
        return next_++;
    }
    void keep(std::size_t index, StoryOutcome outcome) {
        const std::lock_guard lock(guard_);
        outcomes_[index] = std::move(outcome);
        progress_(++done_, outcomes_.size());
    }
    void fail(std::exception_ptr failure) {
        const std::lock_guard lock(guard_);
        failure_ = std::move(failure);
    }
    std::vector<StoryOutcome> take() {
        if (failure_) std::rethrow_exception(failure_);
        return std::move(outcomes_);
    }

private:
    std::mutex guard_;
    std::vector<StoryOutcome> outcomes_;
    const std::function<void(std::size_t, std::size_t)>& progress_;
    std::size_t next_ = 0;
    std::size_t done_ = 0;
    std::exception_ptr failure_;
};

}  // namespace

StoryOutcome run_story(const Story& story, Spoil spoil, const std::filesystem::path& folder) {
    const plantsim::Mill mill(story.plant, story.seed);
    const config::PlantReading as_written = config::read_plant(story.plant_file);
    if (!as_written) throw std::runtime_error(config::format_fault(as_written.faults.front()));
    std::vector<Notes> notes = notes_for(story, *as_written.plant);
    const PipelineResult result = run_pipeline(story, mill, spoil, folder, [&](std::span<const plantsim::Row> rows) {
        for (Notes& of_section : notes) of_section.see(rows);
    });
    StoryOutcome outcome{.rows = result.rows};
    const auto span = static_cast<double>(story.plant.year_ends - story.plant.year_begins);
    outcome.pump_years = static_cast<double>(story.plant.pumps.size()) * span / (365.25 * plantsim::day_ms);
    for (std::size_t i = 0; i < story.sections.size(); ++i) {
        const SectionStory& section = story.sections[i];
        const Truth truth(mill, section);
        const config::Section& papers = section_of(result.plant, story, section);
        const ActLimits limits = act_limits_of(papers);
        const double share_limit = papers.limits.drain_share_percent.watch.value_or(8.0);
        outcome.sections.push_back({.fleet = story.fleet,
                                    .number = story.number,
                                    .story = section,
                                    .marks = {mark(section, truth, limits, result.told[i]),
                                              mark(section, truth, limits, by_fixed_limit(notes[i], share_limit)),
                                              mark(section, truth, limits, by_notebook(notes[i]))}});
    }
    return outcome;
}

BenchResult run_bench(const BenchOrder& order, const std::function<void(std::size_t, std::size_t)>& progress) {
    const auto numbers = numbers_of(order);
    Counter counter(numbers.size(), progress);
    const auto work = [&] {
        try {
            while (const auto index = counter.next()) {
                const OwnFolder folder(order.folder, *index);
                const auto [fleet, number] = numbers[*index];
                const Story story = tell(fleet, number, order.telling);
                counter.keep(*index, run_story(story, order.spoil, folder.path()));
            }
        } catch (...) {
            counter.fail(std::current_exception());
        }
    };
    std::vector<std::thread> threads;
    for (int i = 0; i < order.jobs; ++i) threads.emplace_back(work);
    for (std::thread& thread : threads) thread.join();
    BenchResult result;
    for (StoryOutcome& outcome : counter.take()) {
        result.pump_years += outcome.pump_years;
        result.rows += outcome.rows;
        std::ranges::move(outcome.sections, std::back_inserter(result.sections));
    }
    return result;
}

}  // namespace slipledger::judging
