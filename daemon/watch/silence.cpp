#include "daemon/watch/silence.hpp"

#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "daemon/report/fingerprint.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::watch {
namespace {

using analytics::Instant;
using ledger::Notice;

Notice notice_of(const std::string& feed, const std::string& kind, Instant since, Instant at) {
    Notice notice;
    notice.kind = kind;
    notice.episode = report::fingerprint(fmt::format("feed-silent\n{}\n{}", feed, since.time_since_epoch().count()));
    notice.id = report::fingerprint(kind + "\n" + notice.episode);
    notice.level = "watch";
    notice.at = at;
    const bool silent = kind == "feed-silent";
    const nlohmann::ordered_json body{
        {"id", notice.id},
        {"kind", kind},
        {"rule", "feed-silent"},
        {"feed", feed},
        {"episode", notice.episode},
        {"level", notice.level},
        {"time", report::rfc3339(at)},
        {"since", report::rfc3339(since)},
        {"sentence", silent ? "Feed " + feed + " has been silent since " + report::rfc3339(since) + "."
                            : "Feed " + feed + " is heard again; it was silent since " + report::rfc3339(since) + "."},
        {"what_to_do", silent ? "Check the logger and its line." : "Nothing to do."}};
    notice.body = body.dump(-1, ' ', false, nlohmann::ordered_json::error_handler_t::replace);
    return notice;
}

}  // namespace

Silence::Silence(std::span<const config::Feed> feeds, std::span<const Notice> told, Instant now) {
    for (const config::Feed& feed : feeds)
        if (feed.silent_after) feeds_[feed.id] = {*feed.silent_after, now, now, false, false};
    for (const Notice& notice : told) {
        if (notice.kind != "feed-silent" && notice.kind != "feed-heard") continue;
        const auto body = nlohmann::json::parse(notice.body, nullptr, false);
        const auto feed = feeds_.find(body.is_object() ? body.value("feed", "") : "");
        if (feed == feeds_.end()) continue;
        feed->second.silent = notice.kind == "feed-silent";
        feed->second.silent_since = report::instant_of(body.value("since", "")).value_or(notice.at);
    }
}

void Silence::heard(const std::string& feed, Instant now) {
    const std::lock_guard lock(mutex_);
    const auto found = feeds_.find(feed);
    if (found == feeds_.end()) return;
    found->second.last_heard = now;
    found->second.heard_again = true;
}

std::vector<Notice> Silence::look(Instant now) {
    const std::lock_guard lock(mutex_);
    std::vector<Notice> notices;
    for (auto& [name, feed] : feeds_) {
        if (!feed.silent && now - feed.last_heard >= feed.silent_after) {
            feed.silent = true;
            feed.heard_again = false;
            feed.silent_since = feed.last_heard;
            notices.push_back(notice_of(name, "feed-silent", feed.silent_since, now));
        } else if (feed.silent && feed.heard_again) {
            feed.silent = false;
            notices.push_back(notice_of(name, "feed-heard", feed.silent_since, now));
        }
    }
    return notices;
}

}  // namespace slipledger::watch
