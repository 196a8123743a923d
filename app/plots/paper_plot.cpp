// SPDX-License-Identifier: GPL-3.0-or-later
#include "paper_plot.h"

#include "picture_file.h"
#include "picture_page.h"

#include <QApplication>
#include <QClipboard>
#include <QContextMenuEvent>
#include <QFileDialog>
#include <QMenu>

namespace rungwright
{

/// Hands one part of the plot to a QCustomPlot layer.
class PaperPart : public QCPLayerable
{
public:
    PaperPart(PaperPlot* plot, const QString& layer, PaperPlot::Part part) : QCPLayerable(plot, layer), m_plot(plot), m_part(part) {}

protected:
    /// QCustomPlot moves the clip up by a pixel; the paper goes down to the last one.
    QRect clipRect() const override { return parentPlot()->viewport().adjusted(0, 0, 0, 2); }
    void applyDefaultAntialiasingHint(QCPPainter*) const override {}
    void draw(QCPPainter* painter) override { m_plot->drawPart(m_part, *painter); }

private:
    PaperPlot* m_plot;
    PaperPlot::Part m_part;
};

namespace
{
const QString kMarksLayer = QStringLiteral("marks");
}

PaperPlot::PaperPlot(QWidget* parent, Marks marks) : QCustomPlot(parent), m_look(&Look::of(this))
{
    setSelectionRect(nullptr); // Lives on the overlay layer, whose full-size buffer nothing here uses.
    removeLayer(layer(QStringLiteral("overlay")));
    const QString frameLayer = QStringLiteral("legend");
    QString topLayer = frameLayer;
    if (marks == Marks::buffered) {
        addLayer(kMarksLayer, layer(frameLayer));
        layer(kMarksLayer)->setMode(QCPLayer::lmBuffered);
        topLayer = kMarksLayer;
    }
    // In the order they are drawn; `below` and `above` draw nothing into buffers, see drawPart().
    new PaperPart(this, QStringLiteral("background"), Part::paper);
    new PaperPart(this, frameLayer, Part::frame);
    new PaperPart(this, topLayer, Part::below);
    new PaperPart(this, topLayer, Part::marks);
    new PaperPart(this, topLayer, Part::above);
    setPlottingHint(QCP::phImmediateRefresh, false);
    axisRect()->setAutoMargins(QCP::msNone);
    for (QCPAxis* axis : {xAxis2, yAxis2})
        axis->setVisible(false);
    setAttribute(Qt::WA_OpaquePaintEvent);
    m_askPath = [](QWidget* over, const QString& title, const QString& suggestion, const QString& filter) {
        return QFileDialog::getSaveFileName(over, title, suggestion, filter);
    };
    PaperPlot::lookChanged();
}

QRectF PaperPlot::area() const { return axisRect()->rect(); }

void PaperPlot::setAreaMargins(const QMargins& margins) { axisRect()->setMargins(margins); }

QMargins PaperPlot::areaMargins() const { return axisRect()->margins(); }

QFont PaperPlot::strongFont() const
{
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    return strong;
}

// Look -----------------------------------------------------------------------------------------------------------------

void PaperPlot::setAxisLook(QCPAxis* axis, bool grid)
{
    axis->setBasePen(Qt::NoPen);
    axis->setTickPen(Qt::NoPen);
    axis->setSubTicks(false);
    axis->setTickLength(1, 0); // Of no length they would be dots in an SVG, pen or no pen.
    axis->setTickLabelFont(font());
    axis->setTickLabelColor(m_look->faintInk);
    axis->setTickLabelPadding(6);
    axis->grid()->setVisible(grid);
    axis->grid()->setPen(QPen(m_look->grid, 1));
    axis->grid()->setZeroLinePen(Qt::NoPen);
}

void PaperPlot::lookChanged()
{
    m_look = &Look::of(this);
    setBackground(QBrush(m_look->paper));
    for (QCPAxis* axis : {xAxis, yAxis})
        setAxisLook(axis, axis->grid()->visible());
    redrawAll();
}

void PaperPlot::changeEvent(QEvent* event)
{
    QCustomPlot::changeEvent(event);
    switch (event->type()) {
    case QEvent::PaletteChange:
    case QEvent::FontChange:
    case QEvent::StyleChange:
    case QEvent::LocaleChange:
        lookChanged();
        break;
    default:
        break;
    }
}

// Painting -------------------------------------------------------------------------------------------------------------

void PaperPlot::drawPart(Part part, QCPPainter& painter)
{
    switch (part) {
    case Part::paper:
        // Makes the lowest paint buffer opaque: laying it down is then as quick as copying.
        painter.fillRect(viewport(), m_look->paper);
        break;
    case Part::frame:
        paintFrame(painter);
        break;
    case Part::marks:
        paintMarks(painter);
        break;
    case Part::below:
        if (m_exporting)
            paintBelow(painter);
        break;
    case Part::above:
        if (m_exporting)
            paintAbove(painter);
        break;
    }
}

void PaperPlot::marksChanged()
{
    m_marksStale = true;
    update();
}

void PaperPlot::redrawMarks()
{
    m_marksStale = false;
    // QCPLayer::replot() asks for another paint of the widget; here that paint is already going on.
    const bool held = testAttribute(Qt::WA_UpdatesDisabled);
    setAttribute(Qt::WA_UpdatesDisabled, true);
    layer(kMarksLayer)->replot();
    setAttribute(Qt::WA_UpdatesDisabled, held);
}

void PaperPlot::draw(QCPPainter* painter)
{
    // Only pictures come this way; the screen is served from the paint buffers.
    m_exporting = true;
    QCustomPlot::draw(painter);
    m_exporting = false;
}

void PaperPlot::updateLayout()
{
    // QCustomPlot makes the ticks while it lays out: ranges that hang on the area's size must be right before. Nothing but the axis rect
    // lies in the layout, so its place is known.
    axisRect()->setOuterRect(viewport());
    areaChanged();
    QCustomPlot::updateLayout();
}

void PaperPlot::paintEvent(QPaintEvent* event)
{
    if (!qFuzzyCompare(bufferDevicePixelRatio(), devicePixelRatioF())) { // Moved to another screen.
        setBufferDevicePixelRatio(devicePixelRatioF());
        redrawAll();
    }
    if (mPaintBuffers.isEmpty() || hasInvalidatedPaintBuffers())
        redrawAll();
    else if (m_marksStale)
        redrawMarks();
    QCPPainter painter(this);
    if (mPaintBuffers.isEmpty())
        painter.fillRect(event->rect(), m_look->paper);
    for (qsizetype i = 0; i < mPaintBuffers.size(); ++i) {
        mPaintBuffers.at(i)->draw(&painter);
        if (i == 0)
            paintBelow(painter);
    }
    paintAbove(painter);
}

// Pictures -------------------------------------------------------------------------------------------------------------

void PaperPlot::paintInto(QCPPainter& painter, const QRect& where)
{
    painter.save();
    painter.translate(where.topLeft());
    toPainter(&painter, where.width(), where.height());
    painter.restore();
    replot(rpQueuedReplot); // The layout is still the picture's.
}

QSize PaperPlot::pictureSize() const { return pictureSizeFor(size(), font()); }

void PaperPlot::paintPicture(QCPPainter& painter, const QSize& size)
{
    paintPicturePage(painter, size, font(), *m_look, m_heading, [this, &painter](const QRect& where) { paintInto(painter, where); });
}

Outcome<bool> PaperPlot::savePlot(const QString& path)
{
    const QSize size = pictureSize();
    return savePicture(path, size, m_heading, [this, size](QCPPainter& painter) { paintPicture(painter, size); });
}

void PaperPlot::copyPlot()
{
    const QSize size = pictureSize();
    QApplication::clipboard()->setImage(pictureImage(size, 2.0, [this, size](QCPPainter& painter) { paintPicture(painter, size); }));
    emit told(tr("Picture copied."));
}

void PaperPlot::askAndSave()
{
    const QString path = m_askPath(this, tr("Save picture"), accessibleName().toLower() + QStringLiteral(".png"), pictureFilter());
    if (path.isEmpty())
        return;
    const Outcome<bool> saved = savePlot(path);
    if (saved)
        emit told(tr("Picture saved as %1.").arg(path));
    else
        emit saveFailed(QString::fromStdString(saved.trouble()));
}

void PaperPlot::contextMenuEvent(QContextMenuEvent* event)
{
    auto* menu = new QMenu(this);
    menu->setObjectName(QStringLiteral("pictureMenu"));
    menu->setAttribute(Qt::WA_DeleteOnClose);
    menu->addAction(tr("&Copy picture"), this, &PaperPlot::copyPlot)->setObjectName(QStringLiteral("copyPicture"));
    menu->addAction(tr("&Save picture…"), this, &PaperPlot::askAndSave)->setObjectName(QStringLiteral("savePicture"));
    extendMenu(*menu);
    menu->popup(event->globalPos());
}

} // namespace rungwright
