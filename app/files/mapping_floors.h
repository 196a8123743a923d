// SPDX-License-Identifier: GPL-3.0-or-later
// Floors from a second file: site, tier, advertised_floor.
#pragma once

#include "mapping_numbers.h"
#include "outcome.h"

#include <QByteArray>

#include <string>
#include <unordered_map>

namespace rungwright
{

/// The floors, by site and tier.
class FloorTable
{
public:
    /// The floor in our spelling; empty when the table has none. Marks it as asked for.
    std::string_view floorOf(std::string_view site, std::string_view tier);
    /// Rows that floorOf was never asked for, "site / tier", the first `most` of them.
    QStringList unused(int most) const;
    qint64 unusedCount() const;

private:
    friend class FloorReader;
    struct Floor {
        std::string site, tier, text;
        qint64 line = 0;
        bool used = false;
    };
    std::vector<Floor> m_floors; ///< In file order.
    std::unordered_map<std::string, std::size_t> m_byKey;
};

/// A header row with the columns `site`, `tier` and `advertised_floor`, in any order, and one row a tier; other columns are not looked at.
/// Encoding and delimiter are told from the file. Between commas numbers are in our spelling, between other signs in that of `style` (a
/// spreadsheet that writes semicolons writes its own decimals). Refused, naming file and line: a column missing, a tier twice, a floor that
/// is none.
Outcome<FloorTable> readFloors(const QByteArray& bytes, const QString& fileName, const NumberStyle& style, const Currency& currency);

} // namespace rungwright
