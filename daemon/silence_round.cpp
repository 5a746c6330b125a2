#include "daemon/silence_round.hpp"

#include <boost/asio/as_tuple.hpp>
#include <boost/asio/use_awaitable.hpp>
#include <chrono>
#include <utility>
#include <vector>

#include "daemon/ledger/reader.hpp"
#include "daemon/spawn.hpp"

namespace slipledger {

namespace net = boost::asio;

namespace {

constexpr std::chrono::seconds every{5};

std::vector<ledger::Notice> told_before(const std::string& ledger_path) {
    return ledger::Reader(ledger_path).notices("");
}

}  // namespace

SilenceRound::SilenceRound(net::io_context& network, const config::Plant& plant, const intake::Intake& intake,
                           ledger::Writer& writer, const Clock& clock)
    : intake_(intake),
      writer_(writer),
      clock_(clock),
      silence_(plant.feeds, told_before(plant.store.path), clock.now()),
      pause_(network) {
    spawn(network.get_executor(), "watch on silent feeds", go_round());
}

void SilenceRound::stop() {
    stopping_ = true;
    pause_.cancel();
}

net::awaitable<void> SilenceRound::go_round() {
    while (!stopping_) {
        pause_.expires_after(every);
        co_await pause_.async_wait(net::as_tuple(net::use_awaitable));
        if (!stopping_) look();
    }
}

void SilenceRound::look() {
    for (const intake::FeedStatus& feed : intake_.status())
        if (feed.last_received != analytics::Instant::min()) silence_.heard(feed.feed, feed.last_received);
    std::vector<ledger::Notice> notices = silence_.look(clock_.now());
    if (!notices.empty()) writer_.store(std::move(notices));
}

}  // namespace slipledger
