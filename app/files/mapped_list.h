// SPDX-License-Identifier: GPL-3.0-or-later
// A list of others' read through a mapping.
#pragma once

#include "mapping.h"
#include "unit_list.h"

namespace rungwright
{

/// How many rows one rule of the mapping passed over.
struct PassedOver {
    SkipRule rule;
    qint64 rows = 0;
    qint64 firstLine = 0; ///< 0 when rows is.
};

struct MappedListResult {
    UnitListResult list;                ///< As readUnitList gives it. Refused rows carry THEIR line, column number, column name and text.
    std::vector<PassedOver> passedOver; ///< One for each rule of the mapping, in its order.
    qint64 rowsPassedOver = 0;
    qint64 tiersWithoutFloor = 0; ///< Taken with floor 0 because the mapping says so.
    QStringList notes;            ///< In words: rows passed over, tiers taken without floor, floors that no tier of the list asks for.
};

/// Reads the list in pieces, in memory bounded by what it holds, and twice when a currency must be found first. `floors` is the path of the
/// file of floors, empty for none: needed when the mapping says floorsFromFile, refused when it gives floors otherwise. Everything that
/// readUnitList refuses is refused here too; an unusable mapping or floors file is a fileTrouble.
MappedListResult loadMappedList(const QString& path, const ImportMapping& mapping, const QString& floors = {},
                                const UnitListOptions& options = {}, const Progress& progress = {});
/// The same from memory. `floors` holds the bytes of the file of floors and `floorsName` its name for messages; an empty name means none.
MappedListResult readMappedList(const QByteArray& bytes, const QString& fileName, const ImportMapping& mapping,
                                const QByteArray& floors = {}, const QString& floorsName = {}, const UnitListOptions& options = {},
                                const Progress& progress = {});

/// Does the file seem to be one of our own unit lists: a comma-separated header row with every needed column?
bool isOwnFormat(const QByteArray& beginning);

} // namespace rungwright
