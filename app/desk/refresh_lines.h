// SPDX-License-Identifier: GPL-3.0-or-later
// What there is to be looked at in a refresh, and the texts of its lines; of no window's thread.
#pragma once

#include "refresh_words.h"

#include <QByteArray>
#include <QCoreApplication>
#include <QStringList>

#include <optional>
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

/// The lines of one topic as a table. Texts are made when they are asked for.
class RefreshLines
{
    Q_DECLARE_TR_FUNCTIONS(RefreshLines)
public:
    /// The plan outlives the lines.
    RefreshLines(const RefreshPlan& plan, const Currency& currency, const RefreshTopic& topic);

    int rows() const;
    const QStringList& headings() const { return m_headings; }
    /// All cells of a row; for a file amounts have a decimal point and no grouping.
    QStringList texts(int row, bool forFile) const;
    /// Figures stand at the right in a column like that.
    bool isNumberColumn(int column) const { return column >= m_firstNumber && column <= m_lastNumber; }
    /// Whether the cell of that text holds a figure.
    bool isNumber(int row, int column, const QString& text) const;
    /// The table as a file: headings, a row a line. Nothing when `progress` said to stop.
    std::optional<QByteArray> csv(const Progress& progress = {}) const;

private:
    struct SheetLine {
        int tier;       ///< Index into the plan's signedTiers.
        int difference; ///< -1 = the sheet as a whole.
    };

    QStringList changeTexts(int row, bool forFile) const;
    QString candidateText(int row, int column, bool forFile) const;
    QString fateText(int row, int column, bool forFile) const;
    QString sheetText(int row, int column, bool forFile) const;
    const RefreshLine& changeAt(int row) const;
    QString money(Price price, bool forFile) const;
    QString counted(std::int64_t count, bool forFile) const;

    const RefreshPlan* m_plan;
    Currency m_currency;
    RefreshTopic m_topic;
    QStringList m_headings;
    int m_firstNumber = 0; ///< Columns from here to m_lastNumber hold figures.
    int m_lastNumber = -1;
    std::vector<SheetLine> m_sheetLines;
};

} // namespace rungwright
