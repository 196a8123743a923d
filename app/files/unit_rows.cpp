// SPDX-License-Identifier: GPL-3.0-or-later
#include "unit_rows.h"

#include "words.h"

namespace rungwright
{

namespace
{

QString columnName(Column column)
{
    const std::string_view name = kColumnNames[static_cast<std::size_t>(column)];
    return QString::fromUtf8(name.data(), qsizetype(name.size()));
}

// No text holds a NUL (the decoder refuses it), so it keeps ("ab", "c") and ("a", "bc") apart.
std::string keyOf(std::string_view site, std::string_view tier)
{
    std::string key;
    key.reserve(site.size() + tier.size() + 1);
    key.append(site).push_back('\0');
    key.append(tier);
    return key;
}

} // namespace

struct UnitRows::Row {
    std::string_view site, tier, unit;
    Unit values;
    std::optional<Price> floor;
};

UnitRows::UnitRows(UnitListHeader header, Currency currency, qint64 currencyLine, UnitListResult& result) :
    m_header(std::move(header)), m_currency(std::move(currency)), m_currencyLine(currencyLine), m_result(result)
{
}

void UnitRows::take(qint64 line, std::span<const std::string_view> cells)
{
    if (cells.size() != m_header.cells) {
        const bool more = cells.size() > m_header.cells;
        refuse(line, {},
               {more ? Words::tr("too many cells") : Words::tr("too few cells"),
                Words::tr("%1, as in the header row%2")
                    .arg(QString::number(m_header.cells),
                         more ? Words::tr(" (a comma inside a cell needs quotation marks around the cell)") : QString())},
               QString::number(cells.size()));
        return;
    }
    Row row;
    if (!readCells(line, cells, row) || !fitsTier(line, cells, row))
        return;
    Gathered* known = tierOf(row);
    Gathered& tier = known != nullptr ? *known : newTier(row);
    if (row.floor && tier.floorLine == 0) {
        tier.tierCase.tier.advertisedFloor = *row.floor;
        tier.floorLine = line;
    }
    row.values.name = row.unit;
    tier.tierCase.tier.units.push_back(std::move(row.values));
    tier.lines.push_back(line);
    tier.byName.insert(static_cast<std::uint32_t>(tier.lines.size() - 1));
    m_last = &tier;
    ++m_result.rowsTaken;
}

// Reads every cell even after a bad one, so that a row with several troubles names them all at once.
bool UnitRows::readCells(qint64 line, std::span<const std::string_view> cells, Row& row)
{
    std::optional<Column> firstBad;
    Complaint firstComplaint;
    std::string_view firstFound;
    QStringList others;
    const auto cell = [&](Column column) {
        const int place = m_header.at(column);
        return place < 0 ? std::string_view() : trimmedText(cells[static_cast<std::size_t>(place)]);
    };
    const auto check = [&](Column column, const std::optional<Complaint>& complaint) {
        if (!complaint)
            return;
        if (firstBad) {
            others << shownName(column);
            return;
        }
        firstBad = column;
        firstComplaint = *complaint;
        firstFound = cell(column);
    };
    const auto need = [&](Column column, std::string_view& out) {
        out = cell(column);
        if (out.empty())
            check(column, Complaint{Words::tr("nothing in it"), Words::tr("a name")});
    };
    need(Column::site, row.site);
    need(Column::tier, row.tier);
    need(Column::unit, row.unit);
    check(Column::askingPrice, readPrice(cell(Column::askingPrice), m_currency, row.values.asking));
    check(Column::status, readStatus(cell(Column::status), row.values.status));
    if (const auto text = cell(Column::advertisedFloor); !text.empty()) {
        Price floor;
        check(Column::advertisedFloor, readPrice(text, m_currency, floor));
        row.floor = floor;
    }
    if (const auto text = cell(Column::currency); !text.empty()) {
        Currency currency = m_currency;
        const auto complaint = readCurrency(text, currency);
        check(Column::currency, complaint);
        if (!complaint && currency.code != m_currency.code)
            check(Column::currency, Complaint{Words::tr("another currency than on line %1").arg(m_currencyLine),
                                              Words::tr("%1: a unit list has one currency").arg(QString::fromStdString(m_currency.code))});
    }
    if (const auto text = cell(Column::grade); !text.empty())
        check(Column::grade, readGrade(text, row.values.grade.emplace()));
    if (const auto text = cell(Column::area); !text.empty())
        check(Column::area, readArea(text, row.values.areaM2.emplace()));
    if (const auto text = cell(Column::vacancyChance); !text.empty())
        check(Column::vacancyChance, readChance(text, row.values.vacancyChance.emplace()));
    if (const auto text = cell(Column::locked); !text.empty())
        check(Column::locked, readYesNo(text, row.values.locked));
    if (!firstBad)
        return true;
    if (!others.isEmpty())
        firstComplaint.wrong += Words::tr(" (wrong in this row too: %1)").arg(others.join(QStringLiteral(", ")));
    refuse(line, firstBad, firstComplaint, shownText(firstFound));
    return false;
}

bool UnitRows::fitsTier(qint64 line, std::span<const std::string_view> cells, const Row& row)
{
    const Gathered* tier = tierOf(row);
    if (tier == nullptr)
        return true;
    if (const auto same = tier->byName.find(row.unit); same != tier->byName.end()) {
        refuse(line, Column::unit,
               {Words::tr("the unit is there already, on line %1").arg(tier->lines[*same]),
                Words::tr("each unit once in its site and tier: remove or rename one of the two")},
               shownText(row.unit));
        return false;
    }
    if (row.floor && tier->floorLine > 0 && *row.floor != tier->tierCase.tier.advertisedFloor) {
        const auto place = static_cast<std::size_t>(m_header.at(Column::advertisedFloor));
        refuse(line, Column::advertisedFloor,
               {Words::tr("another floor than on line %1").arg(tier->floorLine),
                Words::tr("%1 as on line %2, or nothing: a tier has one advertised floor")
                    .arg(QString::fromStdString(plainText(tier->tierCase.tier.advertisedFloor, m_currency)),
                         QString::number(tier->floorLine))},
               shownText(trimmedText(cells[place])));
        return false;
    }
    return true;
}

UnitRows::Gathered* UnitRows::tierOf(const Row& row)
{
    if (m_last != nullptr && m_last->tierCase.tier.name == row.tier && m_last->tierCase.tier.site == row.site)
        return m_last;
    const auto known = m_byKey.find(keyOf(row.site, row.tier));
    return known == m_byKey.end() ? nullptr : known->second;
}

UnitRows::Gathered& UnitRows::newTier(const Row& row)
{
    Gathered& tier = m_tiers.emplace_back();
    tier.tierCase.tier.site = row.site;
    tier.tierCase.tier.name = row.tier;
    const UnitByName named{&tier.tierCase.tier.units};
    tier.byName = std::unordered_set<std::uint32_t, UnitByName, UnitByName>(16, named, named);
    m_byKey.emplace(keyOf(row.site, row.tier), &tier);
    return tier;
}

void UnitRows::finish()
{
    for (Gathered& gathered : m_tiers) {
        Tier& tier = gathered.tierCase.tier;
        if (gathered.floorLine == 0 && !m_floorsMayBeMissing) {
            refuse(gathered.lines.front(), Column::advertisedFloor,
                   {Words::tr("no row that can be taken gives the floor of the tier '%1' at '%2'")
                        .arg(shownText(tier.name), shownText(tier.site)),
                    Words::tr("the advertised floor on at least one row of the tier")},
                   {});
            m_result.rowsTaken -= static_cast<qint64>(gathered.lines.size());
            continue;
        }
        m_result.tiers.push_back(std::move(gathered.tierCase));
    }
}

QString UnitRows::shownName(Column column) const
{
    return m_header.mapped ? m_header.theirName[static_cast<std::size_t>(column)] : columnName(column);
}

void UnitRows::refuse(qint64 line, std::optional<Column> column, const Complaint& complaint, const QString& found)
{
    ++m_result.refusedCount;
    if (m_result.refused.size() >= kRefusedRowsKept)
        return;
    RefusedRow refused;
    refused.line = line;
    if (column) {
        refused.column = m_header.mapped ? m_header.theirPlace[static_cast<std::size_t>(*column)] : m_header.at(*column) + 1;
        refused.columnName = shownName(*column);
    }
    refused.wrong = complaint.wrong;
    refused.found = found;
    refused.wanted = complaint.wanted;
    m_result.refused.push_back(std::move(refused));
}

} // namespace rungwright
