#include "daemon/notify/webhook.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <optional>

#include "daemon/notify/cloud_event.hpp"

namespace slipledger::notify {

struct Webhook::Wait {
    std::mutex mutex;
    std::condition_variable answered;
    std::optional<DeliveryOutcome> outcome;

    void settle(DeliveryOutcome result) {
        const std::lock_guard lock(mutex);
        if (!outcome) outcome = std::move(result);
        answered.notify_all();
    }
};

DeliveryOutcome judge_answer(const PostOutcome& answer) {
    if (answer.status >= 200 && answer.status < 300) return {};
    if (answer.status == 0) return {answer.possible ? Delivery::try_again : Delivery::refused, answer.text};
    constexpr std::array<int, 7> at_fault{400, 401, 403, 404, 410, 413, 422};
    const bool redirect = answer.status >= 300 && answer.status < 400;
    const bool never = redirect || std::ranges::find(at_fault, answer.status) != at_fault.end();
    return {never ? Delivery::refused : Delivery::try_again, fmt::format("answered {}: {}", answer.status, answer.text)};
}

Webhook::Webhook(config::Webhook hook, std::string plant, Transport& transport)
    : hook_(std::move(hook)), plant_(std::move(plant)), transport_(transport) {}

DeliveryOutcome Webhook::deliver(const ledger::Notice& notice) {
    const auto wait = std::make_shared<Wait>();
    {
        const std::lock_guard lock(mutex_);
        if (abandoned_) return {Delivery::abandoned, {}};
        under_way_ = wait;
    }
    PostRequest request{hook_.url, cloud_event_content_type, cloud_event(plant_, notice), hook_.timeout};
    transport_.post(std::move(request), [wait](PostOutcome answer) { wait->settle(judge_answer(answer)); });
    std::unique_lock lock(wait->mutex);
    wait->answered.wait(lock, [&] { return wait->outcome.has_value(); });
    return *wait->outcome;
}

void Webhook::abandon() {
    const std::lock_guard lock(mutex_);
    abandoned_ = true;
    if (under_way_) under_way_->settle({Delivery::abandoned, {}});
}

}  // namespace slipledger::notify
