// SPDX-License-Identifier: GPL-3.0-or-later
#include "figures_model.h"

#include "wording.h"

#include <QFont>

namespace rungwright
{

namespace
{

bool isHeadline(const FigureRow& row) { return qstrcmp(row.key, "gap") == 0; }

bool isLean(const FigureRow& row) { return qstrncmp(row.key, "skew.", 5) == 0; }

} // namespace

FiguresModel::FiguresModel(Workbench& bench, QObject* parent) : QAbstractTableModel(parent), m_bench(bench)
{
    connect(&bench, &Workbench::reset, this, [this] {
        refresh(currentColumn);
        emit headerDataChanged(Qt::Horizontal, workedColumn, workedColumn);
    });
    connect(&bench, &Workbench::moving, this, [this] {
        // Only the number left changes what is said of the current ladder too.
        refresh(m_bench.gesture() == Workbench::Gesture::left ? currentColumn : workedColumn);
    });
}

void FiguresModel::refresh(int firstColumn)
{
    emit dataChanged(index(0, firstColumn), index(rowCount() - 1, changeColumn), {Qt::DisplayRole});
}

int FiguresModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(figureRows().size()); }

int FiguresModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : columnCount_; }

QVariant FiguresModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const FigureRow& row = figureRows()[static_cast<std::size_t>(index.row())];
    switch (role) {
    case Qt::DisplayRole: {
        if (index.column() == nameColumn) {
            const QString name = tr(row.label);
            return isLean(row) && row.indent == 0 && leansDisagree() ? tr("%1 – signs disagree").arg(name) : name;
        }
        if (!m_bench.tierCase())
            return {};
        const Currency& currency = m_bench.currency();
        const auto was = row.value(m_bench.current());
        const auto is = row.value(m_bench.worked());
        if (index.column() == currentColumn)
            return figureText(row, was, currency);
        // With the current ladder on the bench there is nothing to compare it with.
        if (m_bench.candidate() < 0 && m_bench.gesture() == Workbench::Gesture::none)
            return {};
        return index.column() == workedColumn ? figureText(row, is, currency) : figureChangeText(row, was, is, currency);
    }
    case Qt::TextAlignmentRole:
        return index.column() == nameColumn ? QVariant(Qt::AlignLeft | Qt::AlignVCenter) : QVariant(Qt::AlignRight | Qt::AlignVCenter);
    case Qt::FontRole: {
        QFont font;
        font.setBold(isHeadline(row));
        return font;
    }
    case Qt::ToolTipRole:
        return explanation(index.row());
    case Qt::UserRole:
        return row.indent;
    default:
        return {};
    }
}

QVariant FiguresModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal)
        return {};
    if (role == Qt::TextAlignmentRole)
        return section == nameColumn ? QVariant(Qt::AlignLeft | Qt::AlignVCenter) : QVariant(Qt::AlignRight | Qt::AlignVCenter);
    if (role == Qt::ToolTipRole && section == workedColumn && m_bench.candidate() >= 0)
        return m_bench.candidateName();
    if (role != Qt::DisplayRole)
        return {};
    switch (section) {
    case nameColumn:
        return tr("Figure");
    case currentColumn:
        return tr("Current");
    case workedColumn:
        return tr("Candidate");
    default:
        return tr("Change");
    }
}

QString FiguresModel::explanation(int index) const
{
    const FigureRow& row = figureRows()[static_cast<std::size_t>(index)];
    return QStringLiteral("<p><b>%1</b></p><p>%2</p><p>%3: %4<br>%5: %6</p>")
        .arg(tr(row.label).toHtmlEscaped(), tr(row.formula).toHtmlEscaped(), tr("Unit"), tr(row.unit).toHtmlEscaped(), tr("Source"),
             tr(row.source).toHtmlEscaped());
}

} // namespace rungwright
