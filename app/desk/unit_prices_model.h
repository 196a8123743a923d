// SPDX-License-Identifier: GPL-3.0-or-later
// The prices of every unit across the ladders compared.
#pragma once

#include "side_by_side_model.h"

#include <QAbstractTableModel>

#include <vector>

namespace rungwright
{

/// One row a unit, in order of today's price; today's price, then a column for each candidate. A price that differs from today's stands
/// with an arrow up or down.
class UnitPricesModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column { unitColumn, statusColumn, todayColumn, firstLadder };

    explicit UnitPricesModel(QObject* parent = nullptr) : QAbstractTableModel(parent) {}
    /// Takes what it shows from the ladders; the current one is the "today" column wherever it stands among them.
    void show(const Tier& tier, const std::vector<ComparedLadder>& ladders, const Currency& currency);

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

    /// As SideBySideModel::csv() writes cells: unit, status, current, then each candidate's price under its name.
    QByteArray csv() const;

private:
    struct Ladder {
        QString name;
        std::vector<Price> prices; ///< By row.
    };
    struct UnitRow {
        std::string name;
        Status status = Status::vacant;
        Price today;
    };
    Price price(int row, int column) const;

    Currency m_currency;
    std::vector<UnitRow> m_units;
    std::vector<Ladder> m_ladders;
};

} // namespace rungwright
