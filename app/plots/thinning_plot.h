// SPDX-License-Identifier: GPL-3.0-or-later
// Thinning: the gap against the number of units left on offer.
#pragma once

#include "axis_ticks.h"
#include "paper_plot.h"
#include "workbench.h"

#include <QPointer>

#include <utility>
#include <vector>

namespace rungwright
{

/// x = number left, y = gap (coordinates in minor units). The marker stands at the number left in force and can be dragged, or moved by
/// Left/Right (one), Page Up/Down (five), Home/End; Esc gives up a drag. For models without a number left it shows the present state and
/// cannot be moved.
class ThinningPlot : public PaperPlot
{
    Q_OBJECT
public:
    explicit ThinningPlot(QWidget* parent = nullptr);

    void setWorkbench(Workbench* bench);
    int numbersWidth() const;
    /// Where the marker's knob is; null when there is none.
    QPointF knob() const { return m_knob; }
    /// Where a number left is on the axis.
    double xOf(double left) const { return xAxis->coordToPixel(left); }

protected:
    void paintFrame(QPainter& painter) override;
    void paintBelow(QPainter& painter) override;
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
    bool shows() const { return m_bench && m_bench->tierCase(); }
    bool movable() const;
    void onReset();
    void onMoving();
    void describe();
    void fitRange();
    /// The curve in pixels, as stretches between undefined values; fills `line`, starts of stretches in `starts`.
    void build(const std::vector<double>& gaps, QPolygonF& line, std::vector<qsizetype>& starts) const;
    void placeMarker();
    /// Least and greatest pixel height of the curves drawn between two pixels of x.
    std::pair<double, double> heightsBetween(double from, double to) const;
    int leftAt(double x) const;
    void setLeft(int left);
    /// Whether the marker may be taken; where something is tried on the bench, says what has to be done first.
    bool markerFree();
    void paintStretches(QPainter& painter, const QPolygonF& line, const std::vector<qsizetype>& starts, const QPen& pen) const;

    QPointer<Workbench> m_bench;
    QSharedPointer<MoneyTicks> m_gapTicks;
    QSharedPointer<CountTicks> m_leftTicks;
    QPolygonF m_worked;
    std::vector<qsizetype> m_workedStarts;
    QPolygonF m_current;
    std::vector<qsizetype> m_currentStarts;
    std::vector<QRectF> m_fill;
    QPointF m_knob;
    QRectF m_label;
    QString m_labelText;
    bool m_dragging = false;
    bool m_hover = false;
};

} // namespace rungwright
