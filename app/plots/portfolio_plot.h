// SPDX-License-Identifier: GPL-3.0-or-later
// The portfolio picture: every tier as a point, lean against gap share.
#pragma once

#include "paper_plot.h"
#include "portfolio_shape.h"
#include "workbench.h"

#include <QPointer>

#include <vector>

namespace rungwright
{

/// x = lean (g1), y = gap share; the larger a point, the more units on offer. Filled: flagged as leaning left or for a wide gap; hollow:
/// neither. Of many tiers, cells that hold several are shaded by their number and only scattered ones are drawn one by one. Thresholds
/// are drawn and named; tiers that cannot be placed are counted in words.
/// Pointing names a tier and a click chooses it; a box drawn over tiers picks them in the worklist, Esc gives them back. Keys: Up and Down
/// walk by gap share, Left and Right by lean, Home to the greatest gap share, Enter chooses; Space picks the tier under the cursor or
/// lets it go, a step with Shift adds where it leads.
class PortfolioPlot : public PaperPlot
{
    Q_OBJECT
public:
    explicit PortfolioPlot(QWidget* parent = nullptr);

    /// Both outlive the plot; the bench says which tier to mark.
    void setSources(Worklist* list, Workbench* bench);

    /// From this many on, density is shaded.
    static constexpr std::size_t kDense = 1'500;
    bool dense() const { return m_all.points.size() > kDense; }
    const PortfolioPoints& points() const { return m_all; }
    const PortfolioShape& shape() const { return m_shape; }
    /// The place of a tier in widget pixels; null when it is not in the picture.
    QPointF placeOf(int tier) const;
    /// "Not in the picture: ..."; empty when every tier is.
    QString leftOutText() const;
    QString summaryText() const;

signals:
    void tierChosen(int tier);

protected:
    void paintFrame(QPainter& painter) override;
    void paintMarks(QPainter& painter) override;
    void paintAbove(QPainter& painter) override;
    void areaChanged() override;
    void lookChanged() override;

    void mousePressEvent(QMouseEvent* event) override;
    void mouseMoveEvent(QMouseEvent* event) override;
    void mouseReleaseEvent(QMouseEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;
    void leaveEvent(QEvent* event) override;
    void focusInEvent(QFocusEvent* event) override;
    void focusOutEvent(QFocusEvent* event) override;

private:
    static constexpr int kLegendGap = 4; ///< Between two of its lines.
    enum class Tiers { others, same };
    void takeRows(Tiers tiers);
    void showHeading();
    void describe();
    void setMargins();
    int noteHeight() const;
    double radius(int point) const;
    static double radiusFor(double onOffer);
    static QString shareTitle();
    const PortfolioPoint& point(int index) const { return m_all.points[static_cast<std::size_t>(index)]; }
    QString pointText(int index) const;
    void setHover(int index, const QPoint& at);
    void moveCursor(int key);
    void pickAtCursor(bool toggle, int before);
    void finishBox(const QRectF& box);
    void tellPicked(std::size_t tiers);
    void paintThresholds(QPainter& painter);
    void paintDensity(QPainter& painter);
    void paintPoint(QPainter& painter, int index, bool picked);
    void paintBeyond(QPainter& painter);
    /// A piece of the legend: a mark with its words behind it, or words alone.
    struct LegendPiece {
        enum class Mark { none, filled, open, shade };
        Mark mark = Mark::none;
        double size = 0;       ///< A dot's radius.
        std::size_t level = 0; ///< A shade's.
        QString said;
        bool onNewLine = false;
        QRectF place = {}; ///< Once laid out.
    };
    /// The title of the upright axis first. Pieces run on over as many lines as the font and the width ask for.
    std::vector<LegendPiece> legend() const;
    int legendLines() const;
    void paintLegend(QPainter& painter);
    void paintRing(QPainter& painter, int index, const QColor& colour, double width);
    QColor shade(std::size_t level) const;

    QPointer<Worklist> m_list;
    QPointer<Workbench> m_bench;
    PortfolioPoints m_all;
    PortfolioShape m_shape;
    ShownRange m_leanRange;
    ShownRange m_shareRange;
    std::vector<int> m_pointOf; ///< By tier: index of its point, -1 when it has none.
    int m_hover = -1;           ///< Indices of points.
    int m_cursor = -1;          ///< Where the keys are.
    bool m_pressed = false;
    bool m_boxing = false;
    QPointF m_pressedAt;
    QPointF m_pointer;
};

} // namespace rungwright
