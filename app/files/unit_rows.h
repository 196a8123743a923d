// SPDX-License-Identifier: GPL-3.0-or-later
// Rows of a unit list gathered into tiers; those that cannot be taken are set aside with their reasons.
#pragma once

#include "cell_values.h"
#include "unit_list.h"
#include "unit_list_header.h"

#include <deque>
#include <string>
#include <string_view>
#include <unordered_map>
#include <unordered_set>

namespace rungwright
{

/// Finds a tier's units by name without keeping a second copy of the names.
struct UnitByName {
    using is_transparent = void;
    const std::vector<Unit>* units = nullptr;
    std::string_view name(std::uint32_t i) const { return (*units)[i].name; }
    static std::string_view name(std::string_view text) { return text; }
    template <class A>
    std::size_t operator()(const A& a) const
    {
        return std::hash<std::string_view>()(name(a));
    }
    template <class A, class B>
    bool operator()(const A& a, const B& b) const
    {
        return name(a) == name(b);
    }
};
/// Takes one row after the other into `result`. Only rows that were taken count when a later one is compared with them: a refused row
/// neither makes another a duplicate nor fixes a tier's floor, so that going on without the refused rows gives a list that holds together.
class UnitRows
{
public:
    /// `currencyLine` is the line that named the currency first, 0 when the file names none.
    UnitRows(UnitListHeader header, Currency currency, qint64 currencyLine, UnitListResult& result);

    void take(qint64 line, std::span<const std::string_view> cells);
    /// Tiers without a floor are to be taken, with the floor 0.
    void takeTiersWithoutFloor() { m_floorsMayBeMissing = true; }
    /// After the last row: refuses tiers without a floor and moves the others into the result.
    void finish();

private:
    struct Gathered {
        TierCase tierCase;
        std::vector<qint64> lines; ///< Of each unit.
        qint64 floorLine = 0;      ///< 0: no floor yet.
        std::unordered_set<std::uint32_t, UnitByName, UnitByName> byName;
    };
    struct Row;

    bool readCells(qint64 line, std::span<const std::string_view> cells, Row& row);
    bool fitsTier(qint64 line, std::span<const std::string_view> cells, const Row& row);
    Gathered* tierOf(const Row& row);
    Gathered& newTier(const Row& row);
    QString shownName(Column column) const;
    void refuse(qint64 line, std::optional<Column> column, const Complaint& complaint, const QString& found);

    UnitListHeader m_header;
    Currency m_currency;
    qint64 m_currencyLine;
    bool m_floorsMayBeMissing = false;
    UnitListResult& m_result;
    std::deque<Gathered> m_tiers; ///< A deque: the name sets point into their tiers, which must not move.
    std::unordered_map<std::string, Gathered*> m_byKey;
    Gathered* m_last = nullptr; ///< The tier of the row before: most lists come tier by tier.
};

} // namespace rungwright
