// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

#include <array>

namespace rungwright
{

namespace
{

constexpr std::array kMeasureTakes{"site",     "tier", "candidate",        "model",   "left",  "load",
                                   "currency", "json", "without-bad-rows", "mapping", "floors"};
constexpr std::array kScanTakes{"model", "currency", "out", "threads", "without-bad-rows", "mapping", "floors"};
constexpr std::array kOneLadder{"site", "tier", "candidate", "out", "currency", "without-bad-rows", "mapping", "floors"};
constexpr std::array kReshapeTakes{"site",         "tier",       "rules", "gap",        "gap-share", "floor-met", "hold-total",
                                   "total-change", "free-total", "order", "taken-stay", "model",     "left",      "load",
                                   "candidate",    "out",        "sheet", "currency",   "mapping",   "floors",    "without-bad-rows"};
constexpr std::array kSheetNeeds{"site", "tier", "candidate", "out"};
constexpr std::array kPictureNeeds{"site", "tier", "out"};

constexpr std::array kCommands{
    Command{"measure",
            "Measure the ladders of a scenario or a unit list: a readable table, or JSON with --json.",
            kMeasureTakes,
            {},
            false,
            measure},
    Command{"scan", "Write the worklist as CSV: one row a tier, the greatest gap share first.", kScanTakes, {}, false, scan},
    Command{"sheet", "Write the price sheet of one candidate as CSV, then read it again and compare.", kOneLadder, kSheetNeeds, false,
            sheet},
    Command{"picture", "Draw the bench of one tier: PNG, SVG or PDF, by the ending of --out.", kOneLadder, kPictureNeeds, true, picture},
    Command{"reshape",
            "Change ladders least for a target, under price rules: candidates in a scenario, or a price sheet.",
            kReshapeTakes,
            {},
            false,
            reshape},
};

} // namespace

std::span<const Command> commands() { return kCommands; }

const Command* findCommand(const QString& word)
{
    for (const Command& command : kCommands) {
        if (word == QLatin1String(command.word))
            return &command;
    }
    return nullptr;
}

} // namespace rungwright
