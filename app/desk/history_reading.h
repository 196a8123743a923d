// SPDX-License-Identifier: GPL-3.0-or-later
// What the history page shows, read from the ledger off the window's thread.
#pragma once

#include "ledger.h"

#include <optional>
#include <string>
#include <vector>

namespace rungwright
{

struct HistoryAsk {
    QString path; ///< Of the ledger; empty for a scenario without a file.
    std::string site;
    std::string tier;
    std::string unit; ///< Whose prices are wanted beside the tier's; empty for none.
    Currency currency;
    PriorWindow window;

    bool sameTier(const HistoryAsk& other) const { return path == other.path && site == other.site && tier == other.tier; }
};

struct HistoryRead {
    HistoryAsk ask;
    std::string trouble; ///< Why nothing could be read; empty when all went well.
    bool there = false;  ///< There is a ledger.
    std::vector<SignOffLine> lines;
    std::vector<std::string> units;
    std::vector<UnitLine> unit;
    LowestOfTier lowest;
    std::optional<SignOff> last;
};

/// Opens the ledger and reads it; to be called on any thread.
HistoryRead readHistory(const HistoryAsk& ask);

struct EntryRead {
    std::int64_t id = 0;
    std::string trouble;
    std::optional<SignOff> entry;
};
EntryRead readEntry(const QString& path, std::int64_t id);

} // namespace rungwright
