// SPDX-License-Identifier: GPL-3.0-or-later
#include "refresh_table.h"

#include "table_text.h"

namespace rungwright
{

RefreshTable::RefreshTable(const RefreshPlan& plan, const Currency& currency, QObject* parent) :
    QAbstractTableModel(parent), m_plan(plan), m_currency(currency), m_lines(plan, currency, {})
{
}

void RefreshTable::show(const RefreshTopic& topic)
{
    beginResetModel();
    m_lines = RefreshLines(m_plan, m_currency, topic);
    m_lastRow = {-1, -1};
    endResetModel();
}

int RefreshTable::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : m_lines.rows(); }

int RefreshTable::columnCount(const QModelIndex& parent) const
{
    return parent.isValid() ? 0 : static_cast<int>(m_lines.headings().size());
}

QVariant RefreshTable::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal || section < 0 || section >= m_lines.headings().size())
        return {};
    if (role == Qt::TextAlignmentRole)
        return QVariant((m_lines.isNumberColumn(section) ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    return role == Qt::DisplayRole ? m_lines.headings()[section] : QVariant();
}

QVariant RefreshTable::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    switch (role) {
    case Qt::DisplayRole:
    case Qt::ToolTipRole: // what is too long for its column can be read whole
        return texts(index.row(), false)[index.column()];
    case Qt::TextAlignmentRole:
        return headerData(index.column(), Qt::Horizontal, role);
    case kValueRole: {
        const QString& shown = texts(index.row(), false)[index.column()];
        if (m_lines.isNumber(index.row(), index.column(), shown))
            return texts(index.row(), true)[index.column()].toDouble();
        return shown;
    }
    default:
        return {};
    }
}

const QStringList& RefreshTable::texts(int row, bool forFile) const
{
    const std::size_t which = forFile ? 1 : 0;
    if (m_lastRow[which] != row) {
        m_lastTexts[which] = m_lines.texts(row, forFile);
        m_lastRow[which] = row;
    }
    return m_lastTexts[which];
}

} // namespace rungwright
