// SPDX-License-Identifier: GPL-3.0-or-later
// The first rows of somebody else's list, as understood and as they stand, cell over cell.
#pragma once

#include "mapping_preview.h"

#include <QAbstractTableModel>
#include <QStyledItemDelegate>

#include <vector>

namespace rungwright
{

/// Our columns that have a source, in our order, then the columns of theirs that nothing is taken from.
class ImportPreviewModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Role {
        theirsRole = Qt::UserRole + 1, ///< The cell as it stands in the file.
        troubleRole,                   ///< What is wrong with it, or nothing.
        quietRole,                     ///< True where nothing is taken from: rows passed over, columns not used.
    };

    using QAbstractTableModel::QAbstractTableModel;

    void show(MappingPreview preview, const ImportMapping& mapping);
    const MappingPreview& preview() const { return m_preview; }
    /// Where that row and column of ours stand; an invalid index when the column is not shown.
    QModelIndex cellOf(int row, Column column) const;

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

private:
    /// A column shown: ours and the place of theirs it comes from, or theirs alone.
    struct Shown {
        int ours = -1;
        qsizetype theirs = -1;
        QString under; ///< Second line of its heading.
    };

    QString theirText(const PreviewRow& row, const Shown& shown) const;

    MappingPreview m_preview;
    std::vector<Shown> m_columns;
};

/// Two lines a cell: as understood, and below it, quieter, as it stands in the file.
class ImportPreviewDelegate : public QStyledItemDelegate
{
    Q_OBJECT
public:
    using QStyledItemDelegate::QStyledItemDelegate;
    void paint(QPainter* painter, const QStyleOptionViewItem& option, const QModelIndex& index) const override;
    QSize sizeHint(const QStyleOptionViewItem& option, const QModelIndex& index) const override;
};

} // namespace rungwright
