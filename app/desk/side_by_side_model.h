// SPDX-License-Identifier: GPL-3.0-or-later
// The ladders compared: figures as rows, ladders as columns, the best of each row marked.
#pragma once

#include "gap/measure.h"
#include "ladder_change.h"
#include "wording.h"

#include <QAbstractTableModel>
#include <QByteArray>

#include <vector>

namespace rungwright
{

/// One ladder of the comparison, measured.
struct ComparedLadder {
    int candidate = -1; ///< -1 = the current ladder.
    QString name;
    bool chosen = false; ///< The one the user settled on.
    std::vector<Price> prices;
    Measurement measurement;
    LadderChange change;
};

/// Rows: the Figures, the most useful ones first, and what each ladder changes. Figures of which one end is better for the enquirer have
/// their best marked by a star and the word "best": all of several that show the same, none when all do.
class SideBySideModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    static constexpr int bestRole = Qt::UserRole; ///< bool

    explicit SideBySideModel(QObject* parent = nullptr);

    void show(std::vector<ComparedLadder> ladders, const Currency& currency);
    const std::vector<ComparedLadder>& ladders() const { return m_ladders; }
    /// The column of a candidate, -1 when it is not shown.
    int columnOf(int candidate) const;
    /// The row of a figure's key; "total_change", "units_changed", "greatest_change", "greatest_change_share" beside those of the Figures.
    int rowOf(const char* key) const;

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

    /// The table for a file: RFC 4180, CRLF, texts guarded against spreadsheets that would take them for formulas; decimal points, no
    /// grouping, money in major units, undefined figures empty. Columns: key, figure, unit, each ladder by name, and the names of the best.
    QByteArray csv() const;

private:
    struct Row {
        FigureRow figure;
        std::optional<double> (*change)(const LadderChange&) = nullptr; ///< Set for the rows that are not of the Figures.
    };

    std::optional<double> value(const Row& row, std::size_t column) const;
    QString text(const Row& row, std::optional<double> value) const;
    void findBest();
    bool isBest(int row, int column) const { return m_best[static_cast<std::size_t>(row)][static_cast<std::size_t>(column)]; }
    QString explanation(const Row& row) const;

    std::vector<Row> m_rows;
    std::vector<ComparedLadder> m_ladders;
    Currency m_currency;
    std::vector<std::vector<bool>> m_best; ///< By row and column.
};

} // namespace rungwright
