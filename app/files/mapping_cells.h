// SPDX-License-Identifier: GPL-3.0-or-later
// One row of theirs turned into the cells of one row of ours.
#pragma once

#include "mapping_numbers.h"

#include <array>
#include <map>
#include <span>
#include <unordered_map>

namespace rungwright
{

/// Finds the columns that a mapping names in a header row.
class HeaderPlaces
{
public:
    explicit HeaderPlaces(const QStringList& headers);
    /// Index of the column, or -1. Headers are compared as foldedText has them.
    int placeOf(const TheirColumn& column) const;

private:
    std::vector<QString> m_folded;
};

/// Looks words up in any case of letters, quickly when they come again.
class WordTable
{
public:
    void add(const QString& word, int value) { m_folded.emplace(foldedText(word), value); }
    std::optional<int> find(std::string_view text) const;

private:
    struct Hash {
        using is_transparent = void;
        std::size_t operator()(std::string_view text) const { return std::hash<std::string_view>()(text); }
    };
    std::map<QString, int> m_folded;
    mutable std::unordered_map<std::string, int, Hash, std::equal_to<>> m_seen; ///< As they were spelled.
};

/// A mapping made ready for one header row.
class CellMapper
{
public:
    CellMapper(const ImportMapping& mapping, const QStringList& headers);

    /// What the mapping names and the header row lacks: nothing can be read then.
    const QStringList& missing() const { return m_missing; }
    /// Index of the rule that passes the row over, or -1. Cells the row does not have count as empty.
    int ruleFor(std::span<const std::string_view> cells) const;
    /// Empty, or what is wrong with the number of cells. Empty cells behind the last column do no harm.
    std::optional<Complaint> countTrouble(std::span<const std::string_view> cells) const;
    /// The row's currency code in our spelling: its currency cell, the constant, or what stands beside its price or floor; empty for none.
    std::string_view currencyOf(std::span<const std::string_view> cells) const;
    /// False when no row can have one.
    bool mayTellCurrency() const { return m_mayTellCurrency; }

    /// Fills texts() and troubles(). The number of cells is right. Prices are looked at as amounts of `currency`.
    void take(std::span<const std::string_view> cells, const Currency& currency);
    /// Our spelling, by column of ours; empty where there is a trouble. Good until the next row.
    const std::array<std::string, kColumnNames.size()>& texts() const { return m_texts; }
    const std::array<std::optional<Complaint>, kColumnNames.size()>& troubles() const { return m_troubles; }
    bool anyTrouble() const { return m_anyTrouble; }

    /// Their cell, trimmed, for a column of ours; empty when it is no column.
    std::string_view theirs(Column column, std::span<const std::string_view> cells) const;
    int place(Column column) const { return m_places[static_cast<std::size_t>(column)]; }
    /// What messages call the column: its header, or for a constant our own name.
    const QString& shownName(Column column) const { return m_names[static_cast<std::size_t>(column)]; }
    qsizetype columns() const { return m_columns; }

private:
    using Answer = std::optional<Complaint>;

    std::string& textOf(Column column) { return m_texts[static_cast<std::size_t>(column)]; }
    Answer number(Column column, std::string_view text, ReadNumber& out) const;
    Answer price(Column column, std::string_view text, const Currency& currency, std::string& out);
    Answer status(std::string_view text, std::string& out) const;
    Answer yesNo(std::string_view text, std::string& out) const;
    Answer plain(Column column, std::string_view text, std::string& out) const;
    Answer translate(Column column, std::string_view text, const Currency& currency, std::string& out);
    Answer currencyTrouble() const;

    ImportMapping m_mapping;
    NumberReader m_numbers;
    qsizetype m_columns = 0;
    QStringList m_missing;
    std::array<int, kColumnNames.size()> m_places{};
    std::array<QString, kColumnNames.size()> m_names;
    std::array<std::string, kColumnNames.size()> m_constants;
    std::vector<int> m_rulePlaces;
    WordTable m_statuses, m_yesNo;
    bool m_mayTellCurrency = false;
    std::array<std::string, kColumnNames.size()> m_texts;
    std::array<std::optional<Complaint>, kColumnNames.size()> m_troubles;
    bool m_anyTrouble = false;
    std::string_view m_priceCurrency; ///< What stood beside this row's prices.
    bool m_twoCurrencies = false;
};

} // namespace rungwright
