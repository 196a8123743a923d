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
    double typicalChange = 0; ///< Of the units its model works on, minor units.
};

/// How much each thing counts in the ranking, 0 = not at all.
struct RankingWeights {
    int gap = 0;            ///< Smaller is better.
    int totalChange = 0;    ///< Of the asking total, up or down: smaller is better.
    int amountOfChange = 0; ///< Typical change a unit: smaller is better.
    int floorMet = 0;       ///< The chance that the floor is met: greater is better.

    bool any() const { return gap > 0 || totalChange > 0 || amountOfChange > 0 || floorMet > 0; }
    bool operator==(const RankingWeights&) const = default;
};

/// Rows: the Figures, the most useful ones first, and what each ladder changes. Figures of which one end is better for the enquirer have
/// their best marked by a star and the word "best": all of several that show the same, none when all do. With weights there is a row with
/// each ladder's place and points (see claims/ranking.h). Against one of the ladders, the others' cells show differences from it.
class SideBySideModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    static constexpr int bestRole = Qt::UserRole; ///< bool

    explicit SideBySideModel(QObject* parent = nullptr);

    void show(std::vector<ComparedLadder> ladders, const Currency& currency);
    const std::vector<ComparedLadder>& ladders() const { return m_ladders; }
    /// Both take effect with the next show(). Of a ladder that is not shown: as they are.
    void setWeights(const RankingWeights& weights) { m_weights = weights; }
    void setAgainst(std::optional<int> candidate) { m_against = candidate; }
    /// The ranking in one line, best first: "1. Lower end (92), 2. Steeper (40)". Empty without weights.
    QString rankingText() const;
    /// The column of a candidate, -1 when it is not shown.
    int columnOf(int candidate) const;
    /// The row of a figure's key; "total_change", "units_changed", "greatest_change", "greatest_change_share", "rms_change" and,
    /// with weights, "ranking" beside those of the Figures.
    int rowOf(const char* key) const;

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

    /// The table for a file: RFC 4180, CRLF, texts guarded against spreadsheets that would take them for formulas; decimal points, no
    /// grouping, money in major units, undefined figures empty. Columns: key, figure, unit, each ladder by name, and the names of the best;
    /// against a ladder, each other one's differences from it in columns of their own.
    QByteArray csv() const;

private:
    struct Row {
        FigureRow figure;
        std::optional<double> (*change)(const ComparedLadder&) = nullptr; ///< Set for the rows that are not of the Figures.
        bool ranking = false;
    };
    static Row rankingRow();
    void rank();
    /// What a cell shows: a figure, its difference, a place with its points.
    QString shownText(const Row& row, std::size_t column) const;
    std::optional<std::size_t> againstColumn() const;

    std::optional<double> value(const Row& row, std::size_t column) const;
    QString text(const Row& row, std::optional<double> value) const;
    void findBest();
    bool isBest(int row, int column) const { return m_best[static_cast<std::size_t>(row)][static_cast<std::size_t>(column)]; }
    QString explanation(const Row& row) const;

    std::vector<Row> m_rows;
    std::vector<ComparedLadder> m_ladders;
    Currency m_currency;
    std::vector<std::vector<bool>> m_best; ///< By row and column.
    RankingWeights m_weights;
    std::optional<int> m_against;
    std::vector<std::optional<double>> m_scores; ///< By column, 0 to 1.
    std::vector<int> m_places;
};

} // namespace rungwright
