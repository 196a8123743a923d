// SPDX-License-Identifier: GPL-3.0-or-later
#include "curtain_plot.h"

#include "axis_ticks.h"
#include "gap_paint.h"
#include "plot_words.h"
#include "wording.h"

#include <QPainter>

#include <algorithm>
#include <cmath>

namespace rungwright
{

CurtainPlot::CurtainPlot(QWidget* parent) : PaperPlot(parent, Marks::none)
{
    setObjectName(QStringLiteral("curtainPlot"));
    setAccessibleName(tr("Curtain"));
    setMinimumSize(150, 180);
    xAxis->setTicker(chanceTicks());
    xAxis->setRange(0, 1);
    yAxis->setTickLabels(false);
    m_priceTicks = QSharedPointer<MoneyTicks>::create();
    yAxis->setTicker(m_priceTicks);
    CurtainPlot::lookChanged();
}

void CurtainPlot::setWorkbench(Workbench* bench)
{
    if (m_bench)
        m_bench->disconnect(this);
    m_bench = bench;
    if (bench) {
        connect(bench, &Workbench::reset, this, &CurtainPlot::onReset);
        connect(bench, &Workbench::moving, this, &CurtainPlot::onMoving);
    }
    onReset();
}

void CurtainPlot::setPriceRange(const QCPRange& range)
{
    yAxis->setRange(range);
    areaChanged();
    redrawAll();
}

CurtainFrame CurtainPlot::frame() const { return {area(), yAxis->range().lower, yAxis->range().upper}; }

void CurtainPlot::onReset()
{
    if (shows()) {
        setAccessibleDescription(curtainDescription(*m_bench));
        setPictureHeading(benchHeading(*m_bench));
    } else {
        setAccessibleDescription(QString());
    }
    areaChanged();
    redrawAll();
}

void CurtainPlot::onMoving()
{
    if (!shows())
        return;
    m_worked.build(m_bench->worked(), frame());
    if (m_bench->gesture() == Workbench::Gesture::left && m_bench->candidate() >= 0)
        m_current.build(m_bench->current(), frame());
    placeLabel();
    update(area().adjusted(-2, -2, 2, 2).toAlignedRect());
}

void CurtainPlot::areaChanged()
{
    static_cast<MoneyTicks&>(*m_priceTicks).setSpacing(area().height(), 2.2 * QFontMetricsF(font()).height());
    m_label = QRectF();
    if (!shows())
        return;
    m_worked.build(m_bench->worked(), frame());
    m_current.build(m_bench->current(), frame());
    placeLabel();
}

void CurtainPlot::placeLabel()
{
    m_label = QRectF();
    const Measurement& m = m_bench->worked();
    if (!m.gap.gap || m_worked.empty())
        return;
    const QFontMetricsF metrics(font());
    const QString gap = moneyText(*m.gap.gap, m_bench->currency());
    m_labelText = (m_worked.reachesBelowFloor() ? tr("filled less hatched = gap %1") : tr("area = gap %1")).arg(gap);
    if (metrics.horizontalAdvance(m_labelText) + 16 > area().width())
        m_labelText = tr("gap %1").arg(gap);
    const QSizeF size(std::ceil(metrics.horizontalAdvance(m_labelText)) + 8, std::ceil(metrics.height()));
    const double floorY = frame().y(static_cast<double>(m.advertisedFloor.minor));
    // On the area, just above the floor; else at the upper right, where a curtain hardly ever reaches.
    const double bottom = std::min(floorY, area().bottom()) - 4;
    if (m_worked.roomBetween(bottom - size.height(), bottom) >= size.width() + 8) {
        m_label = QRectF(QPointF(area().left() + 6, bottom - size.height()), size);
    } else if (size.width() + 8 <= area().width()) {
        m_label = QRectF(QPointF(area().right() - size.width() - 4, area().top() + 6), size);
    }
}

void CurtainPlot::paintFrame(QPainter& painter)
{
    if (!shows())
        return;
    painter.setFont(font());
    painter.setPen(look().faintInk);
    const QFontMetricsF metrics(font());
    const QRectF room(4, kHeadingTop, viewport().width() - 8, metrics.height());
    QString title = tr("chance that nothing costs less");
    if (metrics.horizontalAdvance(title) > room.width())
        title = tr("chance none costs less");
    painter.drawText(room, Qt::AlignLeft | Qt::AlignTop, metrics.elidedText(title, Qt::ElideRight, room.width()));
}

void CurtainPlot::paintBelow(QPainter& painter)
{
    if (!shows())
        return;
    painter.save();
    m_worked.paintArea(painter, look());
    painter.restore();
}

void CurtainPlot::paintAbove(QPainter& painter)
{
    if (!shows())
        return;
    painter.save();
    const double floorY = frame().y(static_cast<double>(m_bench->worked().advertisedFloor.minor));
    if (m_bench->tierCase()->tier.hasFloor() && floorY >= area().top() && floorY <= area().bottom())
        paintFloorLine(painter, area().left(), area().right(), floorY, look());
    const Qt::PenCapStyle cap = m_bench->worked().model == ModelKind::fitted ? Qt::FlatCap : Qt::SquareCap;
    if (m_bench->candidate() >= 0 || m_bench->gesture() == Workbench::Gesture::trial)
        m_current.paintLine(painter, QPen(look().trace, 1.2, Qt::SolidLine, cap, Qt::MiterJoin));
    m_worked.paintLine(painter, QPen(look().gapLine, 1.8, Qt::SolidLine, cap, Qt::MiterJoin));
    if (!m_label.isNull()) {
        painter.setFont(font());
        painter.setPen(look().ink);
        QColor back = m_label.top() < area().top() + 10 ? look().paper : look().gapFill;
        back.setAlphaF(0.9F);
        painter.fillRect(m_label, back);
        painter.drawText(m_label, Qt::AlignCenter | Qt::TextSingleLine, m_labelText);
    }
    painter.restore();
}

void CurtainPlot::lookChanged()
{
    yAxis->grid()->setVisible(true);
    xAxis->grid()->setVisible(true);
    PaperPlot::lookChanged();
    CurtainPlot::areaChanged();
}

} // namespace rungwright
