#include "daemon/notify/retry_plan.hpp"

#include <algorithm>

namespace slipledger::notify {
namespace {

using std::chrono::milliseconds;

milliseconds pause_after(const RetryPlan& plan, std::int32_t attempts) {
    milliseconds pause = plan.first;
    for (std::int32_t i = 1; i < attempts && pause < plan.longest; ++i) pause *= 2;
    return std::min(pause, plan.longest);
}

// 0 to 1, spread evenly over ids and attempts (FNV-1a).
double share_of(std::string_view id, std::int32_t attempts) {
    std::uint64_t hash = 14695981039346656037ULL;
    const auto mix = [&](unsigned char byte) { hash = (hash ^ byte) * 1099511628211ULL; };
    for (const char letter : id) mix(static_cast<unsigned char>(letter));
    mix(static_cast<unsigned char>(attempts));
    return static_cast<double>(hash >> 40U) / static_cast<double>(1U << 24U);
}

}  // namespace

std::optional<analytics::Instant> next_try(const RetryPlan& plan, std::int32_t attempts, std::string_view id,
                                           analytics::Instant now) {
    milliseconds waited{0};
    for (std::int32_t i = 1; i < attempts; ++i) {
        waited += pause_after(plan, i);
        if (waited >= plan.give_up_after) return std::nullopt;
    }
    const double jitter = 0.8 + 0.4 * share_of(id, attempts);
    return now + milliseconds(static_cast<std::int64_t>(jitter * static_cast<double>(pause_after(plan, attempts).count())));
}

}  // namespace slipledger::notify
