// SPDX-License-Identifier: GPL-3.0-or-later
// The rows of a price sheet, as they will be written.
#pragma once

#include "price_sheet.h"

#include <QAbstractTableModel>
#include <QSortFilterProxyModel>

#include <map>
#include <optional>
#include <string>
#include <vector>

namespace rungwright
{

/// One row a unit: those that change first, each group in ladder order.
class SheetModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column { unitColumn, statusColumn, fromColumn, toColumn, changeColumn, percentColumn, ruleColumn };

    /// Rules broken by unit name, in words: with them comes a column more.
    using Broken = std::map<std::string, QString>;

    SheetModel(std::vector<SheetRow> rows, const Currency& currency, QObject* parent = nullptr);
    SheetModel(std::vector<SheetRow> rows, const Currency& currency, Broken broken, QObject* parent = nullptr);

    int changedCount() const { return m_changed; }
    bool changes(int row) const { return row < m_changed; }
    const SheetRow& row(int row) const { return m_rows[static_cast<std::size_t>(row)]; }

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

private:
    QString text(const SheetRow& row, int column) const;

    std::vector<SheetRow> m_rows;
    Currency m_currency;
    std::optional<Broken> m_broken;
    int m_changed = 0;
};

/// Sorts by value and can leave out the units that do not change.
class SheetFilter : public QSortFilterProxyModel
{
    Q_OBJECT
public:
    explicit SheetFilter(SheetModel& model, QObject* parent = nullptr);
    void setChangedOnly(bool on);

protected:
    bool filterAcceptsRow(int sourceRow, const QModelIndex& sourceParent) const override;

private:
    SheetModel& m_model;
    bool m_changedOnly = false;
};

} // namespace rungwright
