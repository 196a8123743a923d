// SPDX-License-Identifier: GPL-3.0-or-later
#include "unit_prices_model.h"

#include "ladder/ladder.h"
#include "plot_words.h"
#include "sheet_cells.h"
#include "table_text.h"
#include "words.h"

#include <QFont>

namespace rungwright
{

void UnitPricesModel::show(const Tier& tier, const std::vector<ComparedLadder>& ladders, const Currency& currency)
{
    beginResetModel();
    m_currency = currency;
    m_units.clear();
    m_ladders.clear();
    for (const ComparedLadder& ladder : ladders) {
        if (ladder.candidate >= 0)
            m_ladders.push_back({ladder.name, {}});
    }
    for (const Rung& rung : sortedLadder(tier.units, askingPrices(tier.units), Among::all)) {
        const Unit& unit = tier.units[rung.unit];
        m_units.push_back({unit.name, unit.status, unit.asking});
        std::size_t column = 0;
        for (const ComparedLadder& ladder : ladders) {
            if (ladder.candidate >= 0)
                m_ladders[column++].prices.push_back(ladder.prices[rung.unit]);
        }
    }
    endResetModel();
}

int UnitPricesModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_units.size()); }

int UnitPricesModel::columnCount(const QModelIndex& parent) const
{
    return parent.isValid() ? 0 : firstLadder + static_cast<int>(m_ladders.size());
}

Price UnitPricesModel::price(int row, int column) const
{
    const auto r = static_cast<std::size_t>(row);
    return column == todayColumn ? m_units[r].today : m_ladders[static_cast<std::size_t>(column - firstLadder)].prices[r];
}

QVariant UnitPricesModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const UnitRow& unit = m_units[static_cast<std::size_t>(index.row())];
    const int column = index.column();
    if (column < todayColumn) {
        const QString text = column == unitColumn ? shownText(unit.name) : statusText(unit.status);
        switch (role) {
        case Qt::DisplayRole:
        case Qt::ToolTipRole:
            return text;
        case kValueRole:
        case kCopyRole:
            return column == unitColumn ? QString::fromStdString(unit.name) : text;
        default:
            return {};
        }
    }
    const Price now = price(index.row(), column);
    const QString money = moneyText(now, m_currency);
    const bool changed = now != unit.today;
    switch (role) {
    case Qt::DisplayRole:
        return !changed ? money : money + (now > unit.today ? QStringLiteral(" ▲") : QStringLiteral(" ▼"));
    case kCopyRole:
        return money;
    case kValueRole:
        return qlonglong(now.minor);
    case Qt::TextAlignmentRole:
        return QVariant(Qt::AlignRight | Qt::AlignVCenter);
    case Qt::FontRole: {
        QFont font;
        font.setBold(changed);
        return font;
    }
    case Qt::ToolTipRole:
    case Qt::AccessibleTextRole:
        return changed ? tr("%1, %2 against today").arg(money, signedMoneyText(inMinor(now - unit.today), m_currency)) : money;
    default:
        return {};
    }
}

QVariant UnitPricesModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal || section < 0 || section >= columnCount())
        return {};
    if (role == Qt::TextAlignmentRole)
        return QVariant((section >= todayColumn ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    if (role != Qt::DisplayRole && role != Qt::ToolTipRole && role != kCopyRole)
        return {};
    switch (section) {
    case unitColumn:
        return tr("Unit");
    case statusColumn:
        return tr("Status");
    case todayColumn:
        return tr("Today");
    default:
        return m_ladders[static_cast<std::size_t>(section - firstLadder)].name;
    }
}

QByteArray UnitPricesModel::csv() const
{
    const auto cell = [](const std::string& text) { return csvCell(guarded(text)); };
    std::string out = "unit,status,current";
    for (const Ladder& ladder : m_ladders)
        out += ',' + cell(ladder.name.toStdString());
    out += "\r\n";
    for (std::size_t row = 0; row < m_units.size(); ++row) {
        out +=
            cell(m_units[row].name) + ',' + std::string(statusWord(m_units[row].status)) + ',' + plainText(m_units[row].today, m_currency);
        for (const Ladder& ladder : m_ladders)
            out += ',' + plainText(ladder.prices[row], m_currency);
        out += "\r\n";
    }
    return QByteArray::fromStdString(out);
}

} // namespace rungwright
