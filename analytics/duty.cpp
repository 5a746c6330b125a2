#include "analytics/duty.hpp"

namespace slipledger::analytics {

void DutyWindow::add(std::int32_t date, const DutyDay& day) {
    const std::int32_t place = ((date % days) + days) % days;
    days_[static_cast<std::size_t>(place)] = {.date = date, .known = 1, .day = day};
}

DutyDay DutyWindow::total(std::int32_t date, const DutyDay& so_far) const {
    DutyDay sum = so_far;
    for (const Entry& entry : days_) {
        if (!entry.inside(date)) continue;
        sum.running_h += entry.day.running_h;
        sum.judged_h += entry.day.judged_h;
    }
    return sum;
}

double DutyWindow::running_h_per_day(std::int32_t date) const {
    double running_h = 0.0;
    int watched = 0;
    for (const Entry& entry : days_) {
        if (!entry.inside(date)) continue;
        running_h += entry.day.running_h;
        ++watched;
    }
    return watched > 0 ? running_h / watched : unknown;
}

}  // namespace slipledger::analytics
