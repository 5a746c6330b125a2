#include "daemon/intake/drop_file.hpp"

#include <fcntl.h>
#include <unistd.h>

#include <cerrno>
#include <system_error>

namespace slipledger::intake {
namespace {

namespace fs = std::filesystem;

[[noreturn]] void fail(const fs::path& path, const char* what) {
    throw std::system_error(errno, std::generic_category(), path.string() + " " + what);
}

// Threads: one at a time.
class OpenFile {
public:
    OpenFile(const fs::path& path, int flags) : path_(path), file_(::open(path.c_str(), flags | O_CLOEXEC, 0644)) {
        if (file_ < 0) fail(path_, "cannot be opened");
    }
    ~OpenFile() { ::close(file_); }
    OpenFile(const OpenFile&) = delete;
    OpenFile& operator=(const OpenFile&) = delete;

    void write(std::string_view text) {
        while (!text.empty()) {
            const ssize_t written = ::write(file_, text.data(), text.size());
            if (written < 0 && errno == EINTR) continue;
            if (written < 0) fail(path_, "cannot be written");
            text.remove_prefix(static_cast<std::size_t>(written));
        }
    }
    void sync() {
        if (::fsync(file_) != 0) fail(path_, "cannot be brought to disk");
    }

private:
    fs::path path_;
    int file_;
};

void sync_folder(const fs::path& folder) { OpenFile(folder, O_RDONLY | O_DIRECTORY).sync(); }

// NAME, or NAME.2, NAME.3 ... where a file of that name was moved there before.
fs::path free_name(const fs::path& folder, const std::string& name) {
    fs::path path = folder / name;
    for (int number = 2; fs::exists(path); ++number) path = folder / (name + "." + std::to_string(number));
    return path;
}

// The receipt is this very file's, and a kill came before the move: its content is in the ledger under this name, and no
// file of the name has been moved.
bool is_unfinished_move(const fs::path& taken, const std::string& name, const LoadOutcome& load) {
    return load.end == LoadEnd::already_taken && load.receipt.file == name && !fs::exists(taken / name);
}

}  // namespace

void write_whole(const fs::path& path, const std::string& text) {
    const fs::path temporary = path.string() + ".tmp";
    {
        OpenFile file(temporary, O_WRONLY | O_CREAT | O_TRUNC);
        file.write(text);
        file.sync();
    }
    fs::rename(temporary, path);
    sync_folder(path.parent_path());
}

DropOutcome take_drop_file(const fs::path& folder, const std::string& name, const LoadWorld& world) {
    DropOutcome outcome;
    outcome.load = load_path(folder / name, world);
    LoadOutcome& load = outcome.load;
    if (load.end == LoadEnd::stopped || load.end == LoadEnd::failed) return outcome;
    if (is_unfinished_move(folder / "taken", name, load)) load.end = LoadEnd::taken;
    const bool refused = load.receipt.stored + load.receipt.repeated == 0;
    const fs::path target = folder / (refused ? "refused" : "taken");
    fs::create_directories(target);
    outcome.moved_to = free_name(target, name);
    write_whole(outcome.moved_to.string() + ".receipt.json", receipt_json(load, world.mapping.feed().id));
    fs::rename(folder / name, outcome.moved_to);
    sync_folder(target);
    sync_folder(folder);
    return outcome;
}

}  // namespace slipledger::intake
