// SPDX-License-Identifier: GPL-3.0-or-later
// The ladder: a rung for each unit, the advertised floor, the expected cheapest, and the gap between them.
#pragma once

#include "axis_ticks.h"
#include "label_layout.h"
#include "ladder_legend.h"
#include "paper_plot.h"
#include "rung_painter.h"
#include "workbench.h"

#include <QPointer>
#include <QRubberBand>

#include <cstdint>
#include <vector>

namespace rungwright
{

/// x = place on the ladder, y = asking price (coordinates in minor units). One column for each unit of Workbench::columns(); closed units
/// keep their column and show as a small cross, so that a place here is a place in every list.
///
/// Gestures: drag a rung, or the selection it belongs to; drag over empty space to select; Ctrl-click adds and takes away; drag the bend
/// handle. Keys: Up/Down and Page Up/Down nudge; Left/Right, Home/End go along the ladder; Ctrl+A all on offer; L locks; Enter asks for a
/// price; Alt+Up/Down bend; Esc gives up a gesture or the selection. Ctrl+wheel zooms the price axis, a double click on empty space or
/// Ctrl+0 resets it.
class LadderPlot : public PaperPlot
{
    Q_OBJECT
public:
    explicit LadderPlot(QWidget* parent = nullptr);

    void setWorkbench(Workbench* bench);

    /// Rows of text above the area at a widget of that width, and the room the price axis's numbers want on its left.
    int headingRows(int width) const;
    int numbersWidth() const;
    QCPRange priceRange() const { return yAxis->range(); }
    void resetZoom();

    /// The unit whose rung is within reach of a widget position, or -1; where a unit's rung is.
    int unitAt(QPointF pos) const;
    QPointF rungPosition(std::uint32_t unit) const;
    /// Where the bend handle is; null when there is nothing to bend.
    QPointF bendHandle() const { return m_scene.handle; }
    const BandLayout& bandLayout() const { return m_scene.band; }
    /// The box beside a dragged rung; null when none is shown.
    QRectF dragBox() const { return m_scene.dragBox; }

signals:
    void priceRangeChanged(const QCPRange& range);
    /// The unit under the pointer, or -1.
    void hovered(int unit);
    /// The user wants to type a price for a unit.
    void priceEditRequested(std::uint32_t unit);

protected:
    void paintFrame(QPainter& painter) override;
    void paintBelow(QPainter& painter) override;
    void paintMarks(QPainter& painter) override;
    void paintAbove(QPainter& painter) override;
    void areaChanged() override;
    void lookChanged() override;

    bool event(QEvent* event) override;
    void mousePressEvent(QMouseEvent* event) override;
    void mouseMoveEvent(QMouseEvent* event) override;
    void mouseReleaseEvent(QMouseEvent* event) override;
    void mouseDoubleClickEvent(QMouseEvent* event) override;
    void wheelEvent(QWheelEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;
    void leaveEvent(QEvent* event) override;
    void focusInEvent(QFocusEvent* event) override;
    void focusOutEvent(QFocusEvent* event) override;

private:
    /// Everything that moves, in pixels.
    struct Scene {
        BandLayout band;
        double expectedY = 0;
        QPointF handle;
        QRectF movers;  ///< Around the rungs that move, with their ghosts and stems.
        QRectF dragBox; ///< Beside the dragged rung; null for none.
        QStringList dragLines;
    };
    enum class Hand { empty, maybeMove, move, maybeBend, bend, rubber };

    // Following the workbench.
    void onReset();
    void onMoving();
    void onGestureChanged();
    void markMovers();
    void nameLadders();
    void onSelectionChanged();
    void describe();

    // Geometry.
    bool shows() const { return m_bench && m_bench->tierCase(); }
    double xOf(std::size_t place) const { return m_x0 + m_dx * (static_cast<double>(place) + 1.0); }
    double yOf(double price) const { return m_y0 + m_dy * price; }
    double priceAt(double y) const { return (y - m_y0) / m_dy; }
    double columnPixels() const { return m_dx; }
    QCPRange wantedRange() const;
    void setRange(const QCPRange& range);
    void fitRange();
    bool stretchRange();
    void updateTransform();
    void placeRungs();
    void placeMovers();
    void arrange(Scene& scene);
    void layOutBandLabels(Scene& scene, LabelRoom& room);
    void layOutDragBox(Scene& scene, LabelRoom& room) const;
    QStringList dragText(std::uint32_t unit) const;
    QRect changedRect(const Scene& from, const Scene& to) const;
    std::size_t placeOf(std::uint32_t unit) const { return m_placeOf[unit]; }
    /// The unit the drag box speaks of, or -1.
    int unitInHand() const;

    // Bending.
    void chooseBendUnit();
    /// The exponent that brings the bend unit to `price`.
    double exponentFor(double price) const;
    void bendByKey(int steps);

    // Painting.
    void paintTrace(QPainter& painter) const;
    void paintGhosts(QPainter& painter) const;
    void paintHandle(QPainter& painter) const;
    void paintDragBox(QPainter& painter) const;

    // Hands and keys.
    void setHover(int unit, bool handle);
    void startMoving();
    void dragTo(QPointF pos);
    void rubberTo(QPointF pos);
    bool onHandle(QPointF pos) const;
    void goAlong(int steps, bool extend);
    void zoom(double factor, double aroundPrice);

    QPointer<Workbench> m_bench;
    QSharedPointer<MoneyTicks> m_priceTicks;
    QSharedPointer<CountTicks> m_placeTicks;
    LadderLegend m_legend;
    RungPainter m_rungs;
    bool m_zoomed = false;

    double m_x0 = 0, m_dx = 1, m_y0 = 0, m_dy = -1;
    RungSize m_size;
    std::vector<std::uint32_t> m_placeOf; ///< By unit.
    std::vector<char> m_moves;            ///< By unit: drawn with the moving parts.
    std::vector<QPointF> m_points;        ///< By place: where every rung is.
    std::vector<RungMark> m_still;
    std::vector<RungMark> m_movers;
    std::vector<std::uint32_t> m_moverPlaces;
    std::vector<Rung> m_behind; ///< The current ladder, sorted, while a candidate is worked on.
    Scene m_scene;
    Scene m_nextScene;

    int m_bendUnit = -1;
    double m_bendLow = 0, m_bendHigh = 0, m_bendStart = 0;

    Hand m_hand = Hand::empty;
    int m_hover = -1;
    bool m_hoverHandle = false;
    int m_pressed = -1;
    QPointF m_pressPos;
    double m_pressPrice = 0;
    Price m_lastBy;
    QRectF m_rubber;
    std::vector<std::uint32_t> m_selectedBefore;
};

} // namespace rungwright
