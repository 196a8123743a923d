// SPDX-License-Identifier: GPL-3.0-or-later
// The lines of a refresh on screen, one topic at a time.
#pragma once

#include "refresh_lines.h"

#include <QAbstractTableModel>

#include <array>

namespace rungwright
{

/// A hundred thousand lines cost nothing until they are scrolled to.
class RefreshTable : public QAbstractTableModel
{
    Q_OBJECT
public:
    /// The plan outlives the model.
    RefreshTable(const RefreshPlan& plan, const Currency& currency, QObject* parent = nullptr);

    void show(const RefreshTopic& topic);
    const RefreshLines& lines() const { return m_lines; }

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

private:
    const QStringList& texts(int row, bool forFile) const;

    const RefreshPlan& m_plan;
    Currency m_currency;
    RefreshLines m_lines;
    // The row asked for last, as shown and as in a file: its cells are asked for one after the other.
    mutable std::array<int, 2> m_lastRow{-1, -1};
    mutable std::array<QStringList, 2> m_lastTexts;
};

} // namespace rungwright
