#include "tests/daemon/intake/mill.hpp"

#include <utility>

namespace slipledger::intake::mill {

ledger::Directory directory() {
    ledger::Directory directory;
    directory.pumps = {{"press-1", ledger::PumpId{1}}, {"press-2", ledger::PumpId{2}}};
    directory.points = {{{"press-1", ""}, press_1},   {{"press-1", "A"}, press_1},   {{"press-2", ""}, press_2},
                        {{"press-2", "A"}, press_2_a}, {{"press-2", "B"}, press_2_b}};
    directory.reservoirs = {{"tank", tank}};
    directory.drain_groups = {{"shared", shared_drain}};
    directory.feeds = {{"hall", ledger::FeedId{7}}, {"files", ledger::FeedId{8}}, {"command", ledger::FeedId{9}}};
    return directory;
}

std::vector<config::Pump> pumps() {
    config::Pump one;
    one.id = "press-1";
    one.sections.emplace_back();
    config::Sensor gauge;
    gauge.range_low = 0.0;
    gauge.range_high = 250.0;
    one.sections[0].sensors[analytics::Quantity::outlet_pressure] = gauge;
    config::Pump two;
    two.id = "press-2";
    two.sections.resize(2);
    two.sections[1].id = "B";
    return {one, two};
}

config::Feed ndjson_feed() {
    config::Feed feed;
    feed.id = "hall";
    feed.listen.host = "127.0.0.1";
    feed.reply = true;
    return feed;
}

config::Feed csv_feed() {
    config::Feed feed;
    feed.id = "files";
    feed.kind = config::FeedKind::drop;
    feed.format = config::FeedFormat::csv;
    return feed;
}

config::Target target(analytics::Quantity quantity, std::string unit) {
    config::Target made;
    made.quantity = quantity;
    made.unit = std::move(unit);
    return made;
}

ledger::Instant noon() { return ledger::Instant{ledger::Instant::duration{1772366400000}}; }

ReadBatch read_all(const config::Feed& feed, std::string_view text) {
    const auto plant = pumps();
    const Mapping mapping(feed, directory(), plant);
    ReadOptions options;
    RowReader reader(mapping, options);
    reader.read(text, noon());
    reader.finish(noon());
    return reader.take();
}

}  // namespace slipledger::intake::mill
