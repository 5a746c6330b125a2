// `slipledger load FILE...`: takes files now, shows how far it is, and ends when everything is judged.
#include <fmt/format.h>
#include <unistd.h>

#include <cstdio>
#include <nlohmann/json.hpp>

#include "tools/slipledger/command.hpp"
#include "tools/slipledger/desk.hpp"

namespace slipledger::command {

namespace {

constexpr int bar_width = 30;

// Threads: one.
struct Options {
    std::vector<std::string> files;
    std::string feed;
    bool again = false;
};

// A bar on standard error, where that is a terminal.
Progress progress_bar(const std::string& file) {
    if (::isatty(STDERR_FILENO) != 1) return [](const intake::LoadProgress&) {};
    return [file](const intake::LoadProgress& now) {
        const double share = now.of_bytes == 0 ? 1.0 : static_cast<double>(now.bytes) / static_cast<double>(now.of_bytes);
        const auto full = static_cast<std::size_t>(share * bar_width);
        fmt::print(stderr, "\r{} [{}{}] {:3.0f} %  {} rows", report::cell(report::printable(file), 24),
                   std::string(full, '#'), std::string(bar_width - full, '.'), share * 100.0, now.rows);
        std::fflush(stderr);
    };
}

// True where the file held no row that could be taken.
bool nothing_in(const nlohmann::ordered_json& receipt) {
    return receipt.value("stored", 0) == 0 && receipt.value("repeated", 0) == 0;
}

std::string line_of(const nlohmann::ordered_json& receipt) {
    if (receipt.value("already_taken", false))
        return fmt::format("{}: taken before ({} rows), nothing read; --again reads it all the same",
                           receipt.value("file", ""), receipt.value("rows", 0));
    if (nothing_in(receipt) && receipt.value("refused", 0) == 0)
        return fmt::format("{}: nothing taken, there are no rows in it", receipt.value("file", ""));
    return fmt::format("{}: {}{} rows, {} stored, {} repeated, {} refused", receipt.value("file", ""),
                       nothing_in(receipt) ? "nothing taken: " : "", receipt.value("rows", 0), receipt.value("stored", 0),
                       receipt.value("repeated", 0), receipt.value("refused", 0));
}

void print_faults(const nlohmann::ordered_json& receipt) {
    for (const auto& fault : receipt.value("faults", nlohmann::ordered_json::array()))
        fmt::print(stderr, "  line {}: {}\n", fault.value("line", 0), report::printable(fault.value("reason", "")));
    if (receipt.contains("more_faults")) fmt::print(stderr, "  and {} more\n", receipt["more_faults"].get<std::uint64_t>());
}

int run(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const std::unique_ptr<Desk> desk = open_desk(plant);
    nlohmann::ordered_json receipts = nlohmann::ordered_json::array();
    bool all_fine = true;
    bool all_held_something = true;
    for (const std::string& file : options.files) {
        const Loaded loaded = desk->load(file, options.feed, options.again, progress_bar(file));
        if (::isatty(STDERR_FILENO) == 1) fmt::print(stderr, "\n");
        all_fine = all_fine && loaded.fine;
        if (!loaded.fine) {
            fmt::print(stderr, "slipledger: {}: {}\n", report::printable(file), report::printable(loaded.failure));
            continue;
        }
        receipts.push_back(loaded.receipt);
        all_held_something = all_held_something && !nothing_in(loaded.receipt);
        if (!shared.json) fmt::print("{}\n", report::printable(line_of(loaded.receipt)));
        print_faults(loaded.receipt);
    }
    desk->wait_until_judged();
    if (shared.json) fmt::print("{}\n", receipts.dump(2));
    if (!all_fine) return could_not;
    return all_held_something ? fine : answer_is_no;
}

}  // namespace

void add_load(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "load", "take files of readings now and judge them", true,
                                    [&shared, options] { return run(shared, *options); });
    command->add_option("files", options->files, "files of readings")->required()->type_name("FILE");
    command->add_option("--feed", options->feed, "read them as this feed does; else plain CSV or NDJSON by the file's ending")
        ->type_name("ID");
    command->add_flag("--again", options->again, "read files whose content was taken before");
}

}  // namespace slipledger::command
