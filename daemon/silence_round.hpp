// Looks every few seconds whether a feed has gone silent: the one alarm that goes by the wall clock.
#pragma once

#include <boost/asio/awaitable.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/steady_timer.hpp>

#include "config/plant.hpp"
#include "daemon/clock.hpp"
#include "daemon/intake/intake.hpp"
#include "daemon/ledger/writer.hpp"
#include "daemon/watch/silence.hpp"

namespace slipledger {

// Threads: network thread only.
class SilenceRound {
public:
    SilenceRound(boost::asio::io_context& network, const config::Plant& plant, const intake::Intake& intake,
                 ledger::Writer& writer, const Clock& clock);

    void stop();

private:
    boost::asio::awaitable<void> go_round();
    void look();

    const intake::Intake& intake_;
    ledger::Writer& writer_;
    const Clock& clock_;
    watch::Silence silence_;
    boost::asio::steady_timer pause_;
    bool stopping_ = false;
};

}  // namespace slipledger
