// SPDX-License-Identifier: GPL-3.0-or-later
// Invented sign-offs.
#pragma once

#include "sign_off.h"

#include <string>

namespace rungwright::tests
{

/// 2026-03-02T08:00:00Z.
inline constexpr std::int64_t kFirstInstant = 1'772'438'400'000;
inline constexpr std::int64_t kHour = 3'600'000;

/// The `number`-th of a series, one an hour: everything about it follows from its number.
inline SignOff inventedEntry(int number, int units)
{
    SignOff entry;
    entry.whenUtc = utcText(kFirstInstant + number * kHour);
    entry.who = "Ada Quill";
    entry.note = "Invented, number " + std::to_string(number);
    entry.site = "Quayside (invented)";
    entry.tier = "Small";
    entry.candidate = "Candidate " + std::to_string(number);
    entry.currency = {"EUR", 2};
    entry.advertisedFloor = Price{6'900};
    for (int i = 0; i < units; ++i) {
        const Price before{7'000 + 10 * i + 5 * number};
        entry.units.push_back(
            {"U" + std::to_string(i), i % 3 == 0 ? Status::occupied : Status::vacant, before, i % 2 == 0 ? before + Price{5} : before});
    }
    entry.modelWords = "Perceived range";
    entry.modelStored = R"({"kind": "perceived"})";
    entry.figures = {{"expected_cheapest", 9'000.25 + number, 8'500.5 + number},
                     {"gap", 2'100.25 + number, 1'600.5 + number},
                     {"skew.moment", {}, -0.25}};
    entry.checks = {{"The floor is on sale", CheckOutcome::holds, "2 units on offer at or below it."},
                    {"Changes within the rule", CheckOutcome::lookAtThis, "U3 changes by 12 %."},
                    {"How long the floor lasts", CheckOutcome::notChecked, "No turnover is known."}};
    entry.sheetSha256 = std::string(63, 'a') + static_cast<char>('0' + number % 10);
    return entry;
}

} // namespace rungwright::tests
