// SPDX-License-Identifier: GPL-3.0-or-later
// The columns of a unit list and where its header row puts them.
#pragma once

#include "outcome.h"

#include <QString>
#include <QStringList>

#include <array>
#include <span>
#include <string_view>

namespace rungwright
{

/// The columns, in the order in which messages list them. The first six are needed.
enum class Column : unsigned char { site, tier, unit, askingPrice, status, advertisedFloor, currency, grade, area, vacancyChance, locked };

inline constexpr std::array<std::string_view, 11> kColumnNames{"site",     "tier",  "unit", "asking_price",   "status", "advertised_floor",
                                                               "currency", "grade", "area", "vacancy_chance", "locked"};
inline constexpr std::size_t kColumnsNeeded = 6;

/// A header row, understood.
struct UnitListHeader {
    std::array<int, kColumnNames.size()> place; ///< Index of the column's cell in a row; -1 = the file does not have it.
    std::size_t cells = 0;                      ///< Cells a row must have.
    QStringList unknown;                        ///< Columns the tool has no use for, in file order.
    /// Of a list read through a mapping: what its own header calls the column, and where it has it (from 1; 0 = nowhere). Messages tell
    /// these. Empty and unused for a list of our own format.
    std::array<QString, kColumnNames.size()> theirName;
    std::array<int, kColumnNames.size()> theirPlace{};
    bool mapped = false;

    int at(Column column) const { return place[static_cast<std::size_t>(column)]; }
};

/// Names are taken without surrounding white space and in any case of letters. Refused: a needed column missing, a known column twice.
Outcome<UnitListHeader> readUnitListHeader(std::span<const std::string_view> cells);

} // namespace rungwright
