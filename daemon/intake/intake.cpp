#include "daemon/intake/intake.hpp"

#include <utility>

#include <spdlog/spdlog.h>

#include "daemon/spawn.hpp"

namespace slipledger::intake {

using namespace std::chrono_literals;

Intake::Intake(net::io_context& io, const std::vector<config::Feed>& feeds, std::span<const config::Pump> pumps,
               ledger::Writer& writer, const Clock& clock, FindReceipt find_receipt)
    : io_(io), postbox_(std::make_shared<Postbox>(io.get_executor())) {
    for (const config::Feed& feed : feeds) {
        Way& way = ways_[feed.id];
        way.mapping = std::make_unique<const Mapping>(feed, writer.directory(), pumps);
        way.counters = std::make_unique<FeedCounters>();
        if (feed.kind == config::FeedKind::tcp) {
            const SessionWorld world{*way.mapping, writer, clock, *way.counters, postbox_};
            way.listener = std::make_unique<TcpListener>(io, world);
            spdlog::info("feed {}: listening on {}:{}", feed.id, feed.listen.host, way.listener->port());
        } else {
            const LoadWorld world{*way.mapping, writer, clock, find_receipt, nullptr, {}, false};
            way.folder = std::make_unique<DropFolder>(io, readers_, world, *way.counters);
            spdlog::info("feed {}: watching {}", feed.id, feed.folder);
        }
    }
}

Intake::~Intake() {
    for (const auto& [id, way] : ways_)
        if (way.folder) way.folder->stop();
    cut();
    readers_.join();
    postbox_->close();
}

void Intake::start() {
    for (const auto& [id, way] : ways_) {
        if (way.listener) way.listener->start();
        if (way.folder) way.folder->start();
    }
}

void Intake::stop(std::chrono::milliseconds grace) {
    for (const auto& [id, way] : ways_) {
        if (way.listener) way.listener->stop();
        if (way.folder) way.folder->stop();
    }
    spawn(io_.get_executor(), "end of intake", cut_after(grace));
}

void Intake::cut() {
    for (const auto& [id, way] : ways_)
        if (way.listener) way.listener->cut();
}

net::awaitable<void> Intake::cut_after(std::chrono::milliseconds grace) {
    net::steady_timer tick(io_);
    for (auto left = grace; left > 0ms && !idle(); left -= 20ms) {
        tick.expires_after(20ms);
        co_await tick.async_wait(as_values);
    }
    if (!idle()) spdlog::warn("some loggers are still sending after the grace of {} ms; they are cut off", grace.count());
    cut();
}

bool Intake::idle() const {
    for (const auto& [id, way] : ways_)
        if ((way.listener && !way.listener->idle()) || (way.folder && !way.folder->idle())) return false;
    return true;
}

std::map<std::string, std::uint16_t> Intake::ports() const {
    std::map<std::string, std::uint16_t> ports;
    for (const auto& [id, way] : ways_)
        if (way.listener) ports[id] = way.listener->port();
    return ports;
}

std::vector<FeedStatus> Intake::status() const {
    std::vector<FeedStatus> all;
    for (const auto& [id, way] : ways_) all.push_back(way.counters->read(id));
    return all;
}

}  // namespace slipledger::intake
