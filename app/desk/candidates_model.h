// SPDX-License-Identifier: GPL-3.0-or-later
// The candidates of the tier on the bench, the current ladder first.
#pragma once

#include "workbench.h"

#include <QAbstractListModel>

#include <vector>

namespace rungwright
{

class CandidatesModel : public QAbstractListModel
{
    Q_OBJECT
public:
    enum Role {
        gapTextRole = Qt::UserRole, ///< "gap 29.19 (42 %)"
        totalTextRole,              ///< "total −6.00", empty for the current ladder
        chosenRole,                 ///< bool
        currentRole,                ///< bool: the current ladder
        expectedRole,               ///< expected cheapest in minor units; invalid when undefined
    };

    explicit CandidatesModel(Workbench& bench, QObject* parent = nullptr);

    int rowCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role) const override;

    /// Row of a candidate (-1: the current ladder) and back.
    static int rowOf(int candidate) { return candidate + 1; }
    static int candidateOf(int row) { return row - 1; }
    const Measurement& measurement(int row) const { return m_measured[static_cast<std::size_t>(row)]; }

private:
    void rebuild();
    void refreshWorked();

    Workbench& m_bench;
    Measurer m_measurer;
    std::vector<Measurement> m_measured;
};

} // namespace rungwright
