// SPDX-License-Identifier: GPL-3.0-or-later
#include "candidates_model.h"

#include "wording.h"

namespace rungwright
{

CandidatesModel::CandidatesModel(Workbench& bench, QObject* parent) : QAbstractListModel(parent), m_bench(bench)
{
    connect(&bench, &Workbench::reset, this, &CandidatesModel::rebuild);
    connect(&bench, &Workbench::moving, this, &CandidatesModel::refreshWorked);
    rebuild();
}

void CandidatesModel::rebuild()
{
    const TierCase* tc = m_bench.tierCase();
    const std::size_t rows = tc ? tc->candidates.size() + 1 : 0;
    // Keeping the rows there are keeps the view's place: a reset would throw the focus and the scroll position away.
    const auto measureInto = [&](std::size_t row) {
        m_measured[row] =
            m_measurer.measure(tc->tier, pricesOf(*tc, static_cast<int>(row) - 1), m_bench.settings(), MeasureParts::figuresOnly);
    };
    if (rows != m_measured.size()) {
        beginResetModel();
        m_measured.resize(rows);
        for (std::size_t row = 0; row < rows; ++row)
            measureInto(row);
        endResetModel();
    } else if (rows > 0) {
        for (std::size_t row = 0; row < rows; ++row)
            measureInto(row);
        emit dataChanged(index(0), index(static_cast<int>(rows) - 1));
    }
}

void CandidatesModel::refreshWorked()
{
    // A moving number left concerns all rows; they follow when the gesture ends. A moving price concerns one.
    // What is tried becomes a candidate of its own: it is not the one worked on.
    if (m_bench.gesture() == Workbench::Gesture::left || m_bench.gesture() == Workbench::Gesture::trial || m_bench.candidate() < 0)
        return;
    const int row = rowOf(m_bench.candidate());
    m_measured[static_cast<std::size_t>(row)] = m_bench.worked();
    emit dataChanged(index(row), index(row));
}

int CandidatesModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_measured.size()); }

QVariant CandidatesModel::data(const QModelIndex& index, int role) const
{
    const TierCase* tc = m_bench.tierCase();
    if (!index.isValid() || index.row() >= rowCount() || !tc)
        return {};
    const int candidate = candidateOf(index.row());
    const Measurement& m = measurement(index.row());
    const Candidate* c = candidate >= 0 ? &tc->candidates[static_cast<std::size_t>(candidate)] : nullptr;
    switch (role) {
    case Qt::DisplayRole:
        return c ? QString::fromStdString(c->name) : tr("Current");
    case Qt::EditRole:
        return c ? QString::fromStdString(c->name) : QString();
    case gapTextRole:
        return m.gap.gap ? tr("gap %1 (%2)").arg(moneyText(*m.gap.gap, m_bench.currency()), percentText(*m.gap.gapShare))
                         : tr("no gap to show");
    case totalTextRole: {
        if (!c)
            return QString();
        const double change = static_cast<double>((m.figures.total - measurement(0).figures.total).minor);
        return change == 0 ? tr("total unchanged") : tr("total %1").arg(signedMoneyText(change, m_bench.currency()));
    }
    case chosenRole:
        return tc->chosen && *tc->chosen == candidate && candidate >= 0;
    case currentRole:
        return candidate < 0;
    case expectedRole:
        return m.gap.expectedCheapest ? QVariant(*m.gap.expectedCheapest) : QVariant();
    case Qt::ToolTipRole:
    case Qt::AccessibleTextRole: {
        const QString base = data(index, Qt::DisplayRole).toString() + QStringLiteral(", ") + data(index, gapTextRole).toString();
        const QString total = data(index, totalTextRole).toString();
        const QString note = c ? QString::fromStdString(c->note) : tr("what is asked today; it is never altered here");
        return base + (total.isEmpty() ? QString() : QStringLiteral(", ") + total) +
               (note.isEmpty() ? QString() : QLatin1Char('\n') + note);
    }
    default:
        return {};
    }
}

} // namespace rungwright
