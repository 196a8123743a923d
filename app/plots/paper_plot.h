// SPDX-License-Identifier: GPL-3.0-or-later
// What all plots have in common: the paper and its look, four parts to draw, pictures of themselves.
#pragma once

#include "look.h"
#include "outcome.h"

#include <QFont>
#include <QMargins>

#include <qcustomplot.h>

#include <functional>

class QMenu;

namespace rungwright
{

/// Pixels between a plot's upper edge and the first row of its heading.
inline constexpr int kHeadingTop = 6;

/// A QCustomPlot drawn in four parts, bottom to top:
///   frame  axes, titles, legend            kept in a paint buffer until the next full replot
///   below  what moves, under the marks     painted straight to the widget
///   marks  what stands still while a gesture goes on; a buffered layer of its own, redrawn by marksChanged()
///   above  what moves, over the marks      painted straight to the widget
/// The moving parts have no paint buffer: a drag frame would clear and blend one the size of the window to show a few small
/// things in it. Painting them straight, clipped to what changed, costs only those few things.
class PaperPlot : public QCustomPlot
{
    Q_OBJECT
public:
    /// Without marks there is one paint buffer less to lay over the paper at every paint.
    enum class Marks { none, buffered };
    explicit PaperPlot(QWidget* parent, Marks marks);

    const Look& look() const { return *m_look; }
    /// Where the data lie, in widget pixels.
    QRectF area() const;
    /// From the widget's edge to area(). Takes effect with the next replot.
    void setAreaMargins(const QMargins& margins);
    QMargins areaMargins() const;

    /// Writes a picture of the plot, its heading above and the caution below, as large as the widget plus those.
    Outcome<bool> savePlot(const QString& path);
    void copyPlot();
    /// Stands above an exported picture: what is shown, and of which tier.
    void setPictureHeading(const QString& heading) { m_heading = heading; }
    const QString& pictureHeading() const { return m_heading; }
    /// Draws the plot alone, laid out for `where`.
    void paintInto(QCPPainter& painter, const QRect& where);

    /// Asks for a file to write: (parent, title, suggestion, filter) -> path, empty when given up.
    using AskPath = std::function<QString(QWidget*, const QString&, const QString&, const QString&)>;
    void setAskPath(AskPath ask) { m_askPath = std::move(ask); }

    /// Redraws frame, marks and the rest in full, before the next paint.
    void redrawAll() { replot(rpQueuedReplot); }

signals:
    /// What became of a wish to save or copy, for the status bar.
    void told(const QString& sentence);
    void saveFailed(const QString& reason);

protected:
    virtual void paintFrame(QPainter&) {}
    virtual void paintBelow(QPainter&) {}
    virtual void paintMarks(QPainter&) {}
    virtual void paintAbove(QPainter&) {}
    /// Pixels for coordinates changed (range, size, margins, export): geometry kept in pixels is stale.
    virtual void areaChanged() {}
    /// More entries for the context menu, below those for the picture.
    virtual void extendMenu(QMenu&) {}
    /// Colours or font changed. Call the base.
    virtual void lookChanged();

    /// The marks layer is stale: it is redrawn alone before the next paint.
    void marksChanged();
    /// True while the picture goes into a file or the clipboard instead of the screen.
    bool exporting() const { return m_exporting; }
    QFont strongFont() const;
    void setAxisLook(QCPAxis* axis, bool grid);

    void draw(QCPPainter* painter) override;
    void updateLayout() override;
    void paintEvent(QPaintEvent* event) override;
    void changeEvent(QEvent* event) override;
    void contextMenuEvent(QContextMenuEvent* event) override;
    // QCustomPlot looks for layerables under the mouse; ours do their own hit testing.
    void mousePressEvent(QMouseEvent* event) override { QWidget::mousePressEvent(event); }
    void mouseMoveEvent(QMouseEvent* event) override { QWidget::mouseMoveEvent(event); }
    void mouseReleaseEvent(QMouseEvent* event) override { QWidget::mouseReleaseEvent(event); }
    void mouseDoubleClickEvent(QMouseEvent* event) override { QWidget::mouseDoubleClickEvent(event); }
    void wheelEvent(QWheelEvent* event) override { event->ignore(); }

private:
    friend class PaperPart;
    enum class Part { paper, frame, below, marks, above };
    void drawPart(Part part, QCPPainter& painter);
    void redrawMarks();
    QSize pictureSize() const;
    void paintPicture(QCPPainter& painter, const QSize& size);
    void askAndSave();

    const Look* m_look;
    QString m_heading;
    AskPath m_askPath;
    bool m_exporting = false;
    bool m_marksStale = false;
};

} // namespace rungwright
