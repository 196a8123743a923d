// SPDX-License-Identifier: GPL-3.0-or-later
#include "sheet_model.h"

#include "table_text.h"
#include "wording.h"

#include <QFont>

#include <algorithm>

namespace rungwright
{

namespace
{

Price changeOf(const SheetRow& row) { return row.newPrice - row.currentPrice; }

double shareOf(const SheetRow& row) { return static_cast<double>(changeOf(row).minor) / static_cast<double>(row.currentPrice.minor); }

} // namespace

SheetModel::SheetModel(std::vector<SheetRow> rows, const Currency& currency, QObject* parent) :
    QAbstractTableModel(parent), m_rows(std::move(rows)), m_currency(currency)
{
    const auto firstUnchanged =
        std::stable_partition(m_rows.begin(), m_rows.end(), [](const SheetRow& row) { return changeOf(row) != Price{}; });
    m_changed = static_cast<int>(firstUnchanged - m_rows.begin());
}

SheetModel::SheetModel(std::vector<SheetRow> rows, const Currency& currency, Broken broken, QObject* parent) :
    SheetModel(std::move(rows), currency, parent)
{
    m_broken = std::move(broken);
}

int SheetModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_rows.size()); }

int SheetModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : m_broken ? ruleColumn + 1 : int(ruleColumn); }

QString SheetModel::text(const SheetRow& row, int column) const
{
    switch (column) {
    case unitColumn:
        return QString::fromStdString(row.unit);
    case statusColumn:
        switch (row.status) {
        case Status::vacant:
            return tr("vacant");
        case Status::occupied:
            return tr("occupied");
        case Status::reserved:
            return tr("reserved");
        case Status::closed:
            return tr("closed");
        }
        return {};
    case fromColumn:
        return moneyText(row.currentPrice, m_currency);
    case toColumn:
        return moneyText(row.newPrice, m_currency);
    case ruleColumn: {
        const auto found = m_broken->find(row.unit);
        return found == m_broken->end() ? QString() : found->second;
    }
    default:
        break;
    }
    if (changeOf(row) == Price{})
        return tr("no change");
    if (column == changeColumn)
        return signedMoneyText(static_cast<double>(changeOf(row).minor), m_currency);
    // As fine as the file has it.
    const QString percent = numberText(100.0 * shareOf(row)) + QStringLiteral("\u00a0%");
    return shareOf(row) > 0 ? u'+' + percent : percent;
}

QVariant SheetModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const SheetRow& row = m_rows[static_cast<std::size_t>(index.row())];
    const bool changed = index.row() < m_changed;
    switch (role) {
    case Qt::DisplayRole:
        // The change stands in words once a row, not twice.
        return !changed && index.column() == percentColumn ? QString() : text(row, index.column());
    case Qt::ToolTipRole:
        return index.column() == unitColumn ? QVariant(text(row, unitColumn)) : QVariant();
    case kValueRole:
        switch (index.column()) {
        case fromColumn:
            return qlonglong(row.currentPrice.minor);
        case toColumn:
            return qlonglong(row.newPrice.minor);
        case changeColumn:
            return qlonglong(changeOf(row).minor);
        case percentColumn:
            return shareOf(row);
        default:
            return text(row, index.column());
        }
    case Qt::TextAlignmentRole: {
        const bool figure = index.column() >= fromColumn && index.column() < ruleColumn;
        return QVariant((figure ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    }
    case Qt::FontRole: {
        QFont font;
        font.setBold(changed && index.column() == toColumn);
        return font;
    }
    default:
        return {};
    }
}

QVariant SheetModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal || section < 0 || section >= columnCount())
        return {};
    if (role == Qt::TextAlignmentRole)
        return QVariant((section >= fromColumn && section < ruleColumn ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    if (role != Qt::DisplayRole)
        return {};
    switch (section) {
    case unitColumn:
        return tr("Unit");
    case statusColumn:
        return tr("Status");
    case fromColumn:
        return tr("From");
    case toColumn:
        return tr("To");
    case changeColumn:
        return tr("Change");
    case ruleColumn:
        return tr("Rule broken");
    default:
        return tr("Percent");
    }
}

SheetFilter::SheetFilter(SheetModel& model, QObject* parent) : QSortFilterProxyModel(parent), m_model(model)
{
    setSourceModel(&model);
    setSortRole(kValueRole);
    setSortLocaleAware(true);
}

void SheetFilter::setChangedOnly(bool on)
{
    if (m_changedOnly == on)
        return;
    m_changedOnly = on;
    invalidateFilter();
}

bool SheetFilter::filterAcceptsRow(int sourceRow, const QModelIndex&) const { return !m_changedOnly || m_model.changes(sourceRow); }

} // namespace rungwright
