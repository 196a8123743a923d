// SPDX-License-Identifier: GPL-3.0-or-later
// The Figures of the tier on the bench: current, worked on, change.
#pragma once

#include "workbench.h"

#include <QAbstractTableModel>

namespace rungwright
{

class FiguresModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column { nameColumn, currentColumn, workedColumn, changeColumn, columnCount_ };

    explicit FiguresModel(Workbench& bench, QObject* parent = nullptr);

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role) const override;

    /// Formula, unit and source of a row, as rich text.
    QString explanation(int row) const;
    /// True when the lean coefficients of the worked-on ladder disagree in sign.
    bool leansDisagree() const { return m_bench.worked().figures.skew.signsDisagree(); }

private:
    void refresh(int firstColumn);

    Workbench& m_bench;
};

} // namespace rungwright
