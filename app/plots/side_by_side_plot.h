// SPDX-License-Identifier: GPL-3.0-or-later
// Two to six ladders of one tier on one price axis, each with its curtain beside it.
#pragma once

#include "axis_ticks.h"
#include "curtain_shape.h"
#include "gap/measure.h"
#include "paper_plot.h"

#include <QString>

#include <span>
#include <vector>

namespace rungwright
{

/// One ladder to compare: "current" or a candidate's name, its figures, its prices by unit index.
struct SideLadder {
    QString name;
    Measurement measurement;
    std::vector<Price> prices;
};

/// Columns: each ladder with its gap and its curtain in a column of its own. Overlay: all ladders in one, all curtains in another; told
/// apart by colour, line style and mark, with their names and gaps above.
class SideBySidePlot : public PaperPlot
{
    Q_OBJECT
public:
    enum class Arrangement { columns, overlay };
    static constexpr std::size_t kMost = 6;

    explicit SideBySidePlot(QWidget* parent = nullptr);

    /// Takes copies of what it draws. Ladders beyond the sixth are not shown.
    void setLadders(const Tier& tier, const Currency& currency, std::span<const SideLadder> ladders);
    void setArrangement(Arrangement arrangement);
    Arrangement arrangement() const { return m_arrangement; }

    /// The column of a ladder, heading included, for tables that line up with it; null in an overlay.
    QRectF column(std::size_t ladder) const;

protected:
    void paintFrame(QPainter& painter) override;
    void paintMarks(QPainter& painter) override;
    void areaChanged() override;
    void lookChanged() override;

private:
    struct Side {
        QString name;
        Measurement measurement;
        std::vector<Rung> rungs; ///< Rentable units in order of price.
        QRectF heading, ladder, curtain;
        CurtainShape shape;
    };
    QString gapText(const Side& side) const;
    void describe();
    void placeSides();
    CurtainFrame frame(const QRectF& area) const { return {area, yAxis->range().lower, yAxis->range().upper}; }
    void paintColumn(QPainter& painter, const Side& side);
    void paintColumnLabels(QPainter& painter, const Side& side, std::span<const QPointF> rungs, double reach);
    void paintOverlay(QPainter& painter);
    void paintOverlayLegend(QPainter& painter);
    int legendRows(double width) const;

    Arrangement m_arrangement = Arrangement::columns;
    Currency m_currency;
    Price m_floor;
    std::vector<Unit> m_units;
    std::vector<Side> m_sides;
    QSharedPointer<MoneyTicks> m_priceTicks;
};

} // namespace rungwright
