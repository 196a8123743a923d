// SPDX-License-Identifier: GPL-3.0-or-later
// The first rows of a unit list that is still being read, in the worklist's place.
#pragma once

#include "list_so_far.h"

#include <QAbstractTableModel>
#include <QWidget>

class QLabel;
class QTableView;

namespace rungwright
{

/// Tiers as far as they have been read. Nothing of them is on the desk yet.
class ReadingModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column { tierColumn, unitsColumn, floorColumn, columnCount_ };

    using QAbstractTableModel::QAbstractTableModel;
    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role) const override;

    const ListSoFar& list() const { return m_list; }
    /// Of one list tiers come, never go.
    void take(ListSoFar list);
    void clear();

private:
    QString text(const TierSoFar& tier, int column) const;
    ListSoFar m_list;
};

/// Lies over the whole of `over` while there is something to show. It takes no focus: there is nothing to do but to look.
class ReadingRows : public QWidget
{
    Q_OBJECT
public:
    explicit ReadingRows(QWidget& over);

    /// `name` of the list that is being read.
    void showRows(const QString& name, const ListSoFar& list);
    /// Shows what lies below again.
    void end();

protected:
    bool eventFilter(QObject* watched, QEvent* event) override;

private:
    QLabel* m_said = nullptr;
    QTableView* m_table = nullptr;
    ReadingModel m_model;
};

} // namespace rungwright
