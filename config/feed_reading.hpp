// One entry of `feeds`, checked against the pumps and reservoirs the file knows.
#pragma once

#include "config/feed.hpp"
#include "config/names.hpp"
#include "config/object_reader.hpp"
#include "config/plant.hpp"

namespace slipledger::config {

// What a feed may refer to. Threads: one thread; lives within read_plant.
struct FeedSurroundings {
    explicit FeedSurroundings(const Plant& read_so_far);

    const Plant& plant;  // pumps, reservoirs and time zone are already read
    Names pumps;
    Names reservoirs;
    Names drain_groups;
    Names taken;      // ids of the feeds read so far
    Names addresses;  // and where they listen
};

Feed read_feed(const ObjectReader& reader, FeedSurroundings& surroundings);

}  // namespace slipledger::config
