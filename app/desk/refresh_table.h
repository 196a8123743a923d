// SPDX-License-Identifier: GPL-3.0-or-later
// The lines of a refresh, one topic at a time.
#pragma once

#include "refresh_words.h"

#include <QAbstractTableModel>
#include <QByteArray>
#include <QStringList>

#include <vector>

namespace rungwright
{

/// Something to be looked at: a heading of its own, or what a table shows.
struct RefreshTopic {
    enum class What {
        heading,
        changes,    ///< `which` = a RefreshKind, or -1 for all.
        candidates, ///< Every candidate, and what becomes of its changes.
        fates,      ///< Changes of candidates; `which` = a ChangeFate.
        sheets,     ///< Sheets handed over against what is asked then.
    };
    What what = What::heading;
    int which = -1;
    QString text;
    std::int64_t count = 0; ///< Of all lines there are.
    std::int64_t kept = 0;  ///< Of those that can be looked at.
};

/// What there is to be looked at in a plan; what did not happen is left out.
std::vector<RefreshTopic> refreshTopics(const RefreshPlan& plan, const Currency& currency);

/// Texts are made when they are shown: a hundred thousand lines cost nothing until they are scrolled to.
class RefreshTable : public QAbstractTableModel
{
    Q_OBJECT
public:
    /// The plan outlives the model.
    RefreshTable(const RefreshPlan& plan, const Currency& currency, QObject* parent = nullptr);

    void show(const RefreshTopic& topic);
    /// The table shown as a file: headings, a row a line, amounts with a decimal point and no grouping.
    QByteArray csv() const;

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

private:
    struct SheetLine {
        int tier;       ///< Index into the plan's signedTiers.
        int difference; ///< -1 = the sheet as a whole.
    };

    QString text(int row, int column, bool forFile) const;
    QString changeText(int row, int column, bool forFile) const;
    QString candidateText(int row, int column, bool forFile) const;
    QString fateText(int row, int column, bool forFile) const;
    QString sheetText(int row, int column, bool forFile) const;
    const RefreshLine& changeAt(int row) const;
    QString money(Price price, bool forFile) const;
    QString counted(std::int64_t count, bool forFile) const;
    bool isNumber(int row, int column) const;

    const RefreshPlan& m_plan;
    Currency m_currency;
    RefreshTopic m_topic;
    QStringList m_headings;
    int m_firstNumber = 0; ///< Columns from here to m_lastNumber stand at the right.
    int m_lastNumber = -1;
    std::vector<SheetLine> m_sheetLines;
};

} // namespace rungwright
