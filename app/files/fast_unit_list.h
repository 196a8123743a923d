// SPDX-License-Identifier: GPL-3.0-or-later
// The fast way to read a unit list: in pieces, by several threads, as long as everything is plainly fine. At the first thing that is not,
// it gives up, and the careful reader (unit_list.h) starts anew and finds the words for it.
#pragma once

#include "list_so_far.h"
#include "unit_columns.h"
#include "unit_list.h"

#include <QIODevice>

namespace rungwright
{

struct FastSettings {
    unsigned threads = 0;               ///< 0: as many as the machine has.
    std::size_t pieceSize = 128 * 1024; ///< Bytes read at a time. Tests take few.
    TellSoFar tell = {};                ///< Called by the calling thread.
    int tellWhenLeftMs = 100;           ///< Only while about so much time is left at least.
};

/// A list that was read: what a UnitListResult says of the file as a whole, and the units, grouped by tier.
struct FastUnitList {
    Currency currency;
    QStringList unknownColumns;
    QString encoding;
    UnitColumns units;
};

enum class FastEnd : unsigned char {
    done,
    careful,   ///< Not plainly fine: to be read the careful way.
    cancelled, ///< `progress` said so.
};

/// Reads the open device from its start. Memory: the columns kept, and a few pieces a thread. `progress` is called from the calling
/// thread only. That no two units of a tier have the same name is NOT yet known when this is done: ask UnitColumns::namesDiffer() of every
/// tier, and take the careful way when it is not so.
FastEnd readFast(QIODevice& device, const UnitListOptions& options, KeepUnits keep, const FastSettings& settings, const Progress& progress,
                 FastUnitList& out);

/// The whole way to what the careful reader would give, tiers, units and all. FastEnd::done only for a list without any trouble.
FastEnd readFastResult(QIODevice& device, const UnitListOptions& options, const FastSettings& settings, const Progress& progress,
                       UnitListResult& out);

} // namespace rungwright
