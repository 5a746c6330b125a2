#include "tools/slipledger/desk.hpp"

#include <fmt/format.h>
#include <pwd.h>
#include <unistd.h>

#include <chrono>
#include <filesystem>
#include <stdexcept>
#include <utility>

#include "daemon/clock.hpp"
#include "daemon/intake/command_client.hpp"
#include "daemon/intake/command_socket.hpp"
#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/watch/analyst.hpp"
#include "daemon/watch/plant_changes.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

constexpr std::chrono::hours longest_judging{24};

std::string user_name() {
    const passwd* entry = ::getpwuid(::getuid());
    return entry == nullptr ? std::to_string(::getuid()) : std::string(entry->pw_name);
}

// Asks the running daemon. Threads: one at a time.
class DaemonDesk final : public Desk {
public:
    explicit DaemonDesk(intake::CommandClient client) : client_(std::move(client)) {}

    std::int64_t keep(const ledger::Event& event) override {
        intake::CommandRequest request;
        request.kind = intake::CommandRequest::Kind::event;
        request.event = event;
        return expect_ok(client_.ask(request)).at("id").get<std::int64_t>();
    }

    Loaded load(const std::string& file, const std::string& feed, bool again, const Progress& progress) override {
        intake::CommandRequest request;
        request.kind = intake::CommandRequest::Kind::load;
        request.feed = feed;
        request.file = std::filesystem::path(file).filename();
        request.again = again;
        const nlohmann::json answer = client_.load(file, request, progress);
        if (!answer.value("ok", false)) return Loaded{false, {}, answer.value("reason", "the daemon did not say why")};
        return Loaded{true, answer.at("receipt"), {}};
    }

    void wait_until_judged() override {
        intake::CommandRequest request;
        request.kind = intake::CommandRequest::Kind::drain;
        expect_ok(client_.ask(request));
    }

    void backup(const std::string& path) override {
        intake::CommandRequest request;
        request.kind = intake::CommandRequest::Kind::backup;
        request.file = std::filesystem::absolute(path);
        expect_ok(client_.ask(request));
    }

private:
    static nlohmann::json expect_ok(nlohmann::json answer) {
        if (!answer.value("ok", false)) throw std::runtime_error(answer.value("reason", "the daemon did not say why"));
        return answer;
    }

    intake::CommandClient client_;
};

// Does it here, with the ledger's lock. Threads: one at a time.
class OwnDesk final : public Desk {
public:
    explicit OwnDesk(const config::Plant& plant)
        : plant_(plant), writer_(ledger::open_ledger(plant), plant.store.commit_interval) {
        watch::store_plant_changes(plant_, writer_, clock_);
    }

    std::int64_t keep(const ledger::Event& event) override {
        ledger::Event signed_event = event;
        signed_event.user = user_name();
        signed_event.entered = clock_.now();
        const std::int64_t id = writer_.store(signed_event);
        wait_until_judged();
        return id;
    }

    Loaded load(const std::string& file, const std::string& feed, bool again, const Progress& progress) override {
        const auto how = intake::feed_for_load(plant_.feeds, feed, file, plant_.time_zone);
        if (!how) throw WrongUse(fmt::format("no feed \"{}\" in the plant file", feed));
        const intake::Mapping mapping(*how, writer_.directory(), plant_.pumps);
        intake::LoadWorld world{mapping, writer_, clock_, find_receipt(), nullptr, progress, again};
        const intake::LoadOutcome outcome = intake::load_path(file, world);
        if (outcome.end == intake::LoadEnd::failed) return Loaded{false, {}, outcome.failure};
        return Loaded{true, nlohmann::ordered_json::parse(intake::receipt_json(outcome, how->id)), {}};
    }

    void wait_until_judged() override {
        writer_.drain();
        watch::Analyst analyst(plant_, writer_, plant_.store.path);
        if (!analyst.wait_until_judged(longest_judging)) throw std::runtime_error("not everything could be judged");
    }

    void backup(const std::string& path) override {
        if (std::filesystem::exists(path))
            throw std::runtime_error(path + " exists already; a copy goes into a file of its own");
        writer_.backup(path);
    }

private:
    intake::FindReceipt find_receipt() const {
        return [path = plant_.store.path](std::string_view sha256) { return ledger::Reader(path).receipt(sha256); };
    }

    const config::Plant& plant_;
    SystemClock clock_;
    ledger::Writer writer_;
};

}  // namespace

std::unique_ptr<Desk> open_desk(const config::Plant& plant) {
    const std::string path = intake::command_socket_path(plant.store.path);
    if (auto client = intake::CommandClient::connect(path)) return std::make_unique<DaemonDesk>(std::move(*client));
    return std::make_unique<OwnDesk>(plant);
}

}  // namespace slipledger::command
