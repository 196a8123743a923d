// SPDX-License-Identifier: GPL-3.0-or-later
#include "thinning_plot.h"

#include "curve_paint.h"
#include "plot_words.h"
#include "wording.h"

#include <QKeyEvent>
#include <QMouseEvent>
#include <QPainter>

#include <algorithm>
#include <array>
#include <cmath>

namespace rungwright
{

ThinningPlot::ThinningPlot(QWidget* parent) :
    PaperPlot(parent, Marks::none), m_gapTicks(QSharedPointer<MoneyTicks>::create()), m_leftTicks(QSharedPointer<CountTicks>::create())
{
    setObjectName(QStringLiteral("thinningPlot"));
    setAccessibleName(tr("Thinning"));
    setFocusPolicy(Qt::StrongFocus);
    setMouseTracking(true);
    setMinimumSize(320, 96);
    yAxis->setTicker(m_gapTicks);
    xAxis->setTicker(m_leftTicks);
    ThinningPlot::lookChanged();
}

void ThinningPlot::setWorkbench(Workbench* bench)
{
    if (m_bench)
        m_bench->disconnect(this);
    m_bench = bench;
    if (bench) {
        connect(bench, &Workbench::reset, this, &ThinningPlot::onReset);
        connect(bench, &Workbench::moving, this, &ThinningPlot::onMoving);
    }
    onReset();
}

bool ThinningPlot::movable() const { return shows() && takesLeft(m_bench->settings().kind) && !m_bench->worked().thinning.empty(); }

int ThinningPlot::numbersWidth() const
{
    return shows() ? static_cast<int>(std::ceil(m_gapTicks->widest(yAxis->range(), QFontMetricsF(font())))) + 14 : 40;
}

void ThinningPlot::describe() { setAccessibleDescription(shows() ? thinningDescription(*m_bench) : QString()); }

void ThinningPlot::onReset()
{
    m_dragging = false;
    if (shows()) {
        m_gapTicks->setCurrency(m_bench->currency());
        setPictureHeading(benchHeading(*m_bench));
    }
    describe();
    areaChanged();
    redrawAll();
}

void ThinningPlot::onMoving()
{
    if (!shows())
        return;
    // The axis stands still unless the curve outgrows it.
    const auto& gaps = m_bench->worked().thinning;
    const QCPRange range = yAxis->range();
    const bool outgrown = std::any_of(gaps.begin(), gaps.end(), [&](double g) { return g > range.upper || g < range.lower; });
    if (outgrown) {
        areaChanged();
        redrawAll();
        return;
    }
    build(gaps, m_worked, m_workedStarts);
    placeMarker();
    update(area().adjusted(-8, -8, 8, 8).toAlignedRect()); // A knob at the edge reaches a little beyond.
}

void ThinningPlot::fitRange()
{
    double low = 0;
    double high = 0;
    const auto take = [&](double gap) {
        if (!std::isnan(gap)) {
            low = std::min(low, gap);
            high = std::max(high, gap);
        }
    };
    for (const Measurement* m : {&m_bench->worked(), &m_bench->current()}) {
        std::for_each(m->thinning.begin(), m->thinning.end(), take);
        if (m->gap.gap)
            take(*m->gap.gap);
    }
    if (!(high > low))
        high = low + std::max(1.0, 0.1 * static_cast<double>(m_bench->worked().advertisedFloor.minor));
    // A knob and its label want room above the curve.
    const double air = 0.10 * (high - low);
    yAxis->setRange(low < 0 ? low - air : 0, high + 1.6 * air);
}

void ThinningPlot::areaChanged()
{
    m_worked.clear();
    m_current.clear();
    m_knob = QPointF();
    m_label = QRectF();
    if (!shows())
        return;
    fitRange();
    const auto most = static_cast<double>(
        std::max({m_bench->worked().thinning.size(), m_bench->current().thinning.size(), m_bench->worked().rentable, std::size_t{1}}));
    const double pad = 0.02 * most + 0.5;
    xAxis->setRange(1 - pad, most + pad);
    const QFontMetricsF metrics(font());
    m_gapTicks->setSpacing(area().height(), 1.25 * metrics.height());
    m_leftTicks->setSpacing(area().width(), 4.2 * metrics.height());
    const double titleLeft = area().right() - metrics.horizontalAdvance(tr("units left on offer")) - 24;
    m_leftTicks->setLastWritten(xAxis->pixelToCoord(titleLeft));
    build(m_bench->worked().thinning, m_worked, m_workedStarts);
    build(m_bench->current().thinning, m_current, m_currentStarts);
    placeMarker();
}

void ThinningPlot::build(const std::vector<double>& gaps, QPolygonF& line, std::vector<qsizetype>& starts) const
{
    line.clear();
    starts.clear();
    const QCPRange x = xAxis->range();
    const QCPRange y = yAxis->range();
    const double dx = (xAxis->coordToPixel(x.upper) - xAxis->coordToPixel(x.lower)) / x.size();
    const double dy = (yAxis->coordToPixel(y.upper) - yAxis->coordToPixel(y.lower)) / y.size();
    const double x0 = xAxis->coordToPixel(0);
    const double y0 = yAxis->coordToPixel(0);
    bool open = false;
    CurveBuilder curve(line);
    for (std::size_t i = 0; i < gaps.size(); ++i) {
        if (std::isnan(gaps[i])) {
            open = false;
            continue;
        }
        const QPointF point(x0 + dx * static_cast<double>(i + 1), y0 + dy * gaps[i]);
        if (open) {
            curve.add(point);
        } else {
            starts.push_back(line.size());
            curve.begin(point);
        }
        open = true;
    }
}

void ThinningPlot::placeMarker()
{
    m_knob = QPointF();
    m_label = QRectF();
    const Measurement& m = m_bench->worked();
    const int left = numberLeft(m);
    if (!m.gap.gap || left < 1)
        return;
    const QRectF in = area();
    m_knob = QPointF(std::clamp(xOf(left), in.left(), in.right()), std::clamp(yAxis->coordToPixel(*m.gap.gap), in.top(), in.bottom()));
    const QString gap = moneyText(*m.gap.gap, m_bench->currency());
    m_labelText = (takesLeft(m.model) ? tr("%1 left: gap %2") : tr("%1 on offer now: gap %2")).arg(left).arg(gap);
    const QFontMetricsF metrics(strongFont());
    const QSizeF size(std::ceil(metrics.horizontalAdvance(m_labelText)) + 8, std::ceil(metrics.height()));
    // Above the curves beside the knob, on its right if there is room; else below them.
    const double gapBeside = 12;
    for (const double x : {m_knob.x() + gapBeside, m_knob.x() - gapBeside - size.width()}) {
        const auto [top, bottom] = heightsBetween(x, x + size.width());
        const double above = std::min(top, m_knob.y()) - size.height() - 4;
        const double below = std::max(bottom, m_knob.y()) + 4;
        for (const double y : {above, below}) {
            const QRectF rect(QPointF(x, y), size);
            if (in.contains(rect)) {
                m_label = rect;
                return;
            }
        }
    }
    m_label =
        QRectF(QPointF(std::clamp(m_knob.x() + gapBeside, in.left(), std::max(in.left(), in.right() - size.width())), in.top()), size);
}

std::pair<double, double> ThinningPlot::heightsBetween(double from, double to) const
{
    double top = area().bottom();
    double bottom = area().top();
    const auto see = [&](const QPolygonF& line) {
        const auto first = std::lower_bound(line.begin(), line.end(), from, [](const QPointF& p, double x) { return p.x() < x; });
        for (auto p = first == line.begin() ? first : first - 1; p != line.end(); ++p) {
            top = std::min(top, p->y());
            bottom = std::max(bottom, p->y());
            if (p->x() > to)
                break;
        }
    };
    see(m_worked);
    if (m_bench->candidate() >= 0 || m_bench->gesture() == Workbench::Gesture::trial)
        see(m_current);
    return {top, bottom};
}

// Painting -------------------------------------------------------------------------------------------------------------------

void ThinningPlot::paintFrame(QPainter& painter)
{
    if (!shows())
        return;
    painter.save();
    const QFontMetricsF metrics(font());
    painter.setFont(font());
    painter.setPen(look().faintInk);
    painter.drawText(QPointF(8, kHeadingTop + metrics.ascent()), gapAxisTitle(m_bench->currency()));
    painter.drawText(QRectF(area().left(), area().bottom() + 5, area().width() - 4, metrics.height()), Qt::AlignRight | Qt::AlignTop,
                     tr("units left on offer"));
    if (!movable() && m_bench->worked().gap.gap) {
        const double left = 8 + metrics.horizontalAdvance(gapAxisTitle(m_bench->currency())) + 16;
        painter.drawText(QRectF(left, kHeadingTop, viewport().width() - left - 8, metrics.height()), Qt::AlignRight | Qt::AlignTop,
                         metrics.elidedText(tr("this model takes no number left: the marker shows the present state"), Qt::ElideRight,
                                            viewport().width() - left - 8));
    }
    painter.restore();
}

void ThinningPlot::paintStretches(QPainter& painter, const QPolygonF& line, const std::vector<qsizetype>& starts, const QPen& pen) const
{
    for (std::size_t i = 0; i < starts.size(); ++i) {
        const qsizetype from = starts[i];
        const qsizetype to = i + 1 < starts.size() ? starts[i + 1] : line.size();
        if (to - from == 1) { // A single defined value still shows.
            painter.setPen(pen);
            painter.setBrush(Qt::NoBrush);
            painter.drawEllipse(line[from], 1.5, 1.5);
        } else {
            paintCurve(painter, line.constData() + from, to - from, pen);
        }
    }
}

void ThinningPlot::paintBelow(QPainter& painter)
{
    if (!shows())
        return;
    const double zero = std::clamp(yAxis->coordToPixel(0), area().top(), area().bottom());
    m_fill.clear();
    for (std::size_t i = 0; i < m_workedStarts.size(); ++i) {
        const qsizetype from = m_workedStarts[i];
        const qsizetype to = i + 1 < m_workedStarts.size() ? m_workedStarts[i + 1] : m_worked.size();
        appendFill(m_worked.constData() + from, to - from, zero, m_fill);
    }
    if (m_fill.empty())
        return;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, false);
    painter.setPen(Qt::NoPen);
    painter.setBrush(look().gapFill);
    painter.drawRects(m_fill.data(), static_cast<int>(m_fill.size()));
    painter.restore();
}

void ThinningPlot::paintAbove(QPainter& painter)
{
    if (!shows())
        return;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, true);
    if (m_bench->candidate() >= 0 || m_bench->gesture() == Workbench::Gesture::trial)
        paintStretches(painter, m_current, m_currentStarts, QPen(look().trace, 1.2, Qt::SolidLine, Qt::FlatCap));
    paintStretches(painter, m_worked, m_workedStarts, QPen(look().gapLine, 1.8, Qt::SolidLine, Qt::FlatCap));
    if (!m_knob.isNull()) {
        const bool canMove = movable();
        const bool held = m_dragging || m_hover;
        QPen stem(canMove ? look().ink : look().faintInk, 1);
        if (!canMove)
            stem.setStyle(Qt::DashLine);
        painter.setPen(stem);
        painter.drawLine(QPointF(m_knob.x(), area().top()), QPointF(m_knob.x(), area().bottom()));
        // Filled = can be moved; hollow = shows the present state.
        painter.setPen(QPen(canMove ? look().paper : look().gapLine, 1.6));
        painter.setBrush(canMove ? look().gapLine : look().paper);
        const double r = held && canMove ? 7.5 : 6;
        painter.drawEllipse(m_knob, r, r);
        QColor back = look().paper;
        back.setAlphaF(0.9F);
        painter.fillRect(m_label, back);
        painter.setFont(strongFont());
        painter.setPen(look().ink);
        painter.drawText(m_label, Qt::AlignCenter | Qt::TextSingleLine, m_labelText);
    }
    if (m_worked.isEmpty()) {
        painter.setFont(font());
        painter.setPen(look().faintInk);
        painter.drawText(area(), Qt::AlignCenter, tr("no curve to show"));
    }
    if (hasFocus() && !exporting()) {
        painter.setRenderHint(QPainter::Antialiasing, false);
        painter.setBrush(Qt::NoBrush);
        painter.setPen(QPen(look().focus, 1));
        painter.drawRect(area().adjusted(0, 0, -1, -1));
    }
    painter.restore();
}

void ThinningPlot::lookChanged()
{
    yAxis->grid()->setVisible(true);
    xAxis->grid()->setVisible(false);
    PaperPlot::lookChanged();
    ThinningPlot::areaChanged();
}

// Hands and keys ---------------------------------------------------------------------------------------------------------------

int ThinningPlot::leftAt(double x) const { return static_cast<int>(std::lround(xAxis->pixelToCoord(x))); }

void ThinningPlot::mousePressEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton || !movable() || !area().contains(event->position())) {
        PaperPlot::mousePressEvent(event);
        return;
    }
    event->accept();
    if (!markerFree())
        return;
    // Anywhere in the plot: the marker jumps to the pointer, as on a slider's groove.
    m_dragging = m_bench->beginLeft();
    if (m_dragging && std::abs(event->position().x() - m_knob.x()) > 8)
        m_bench->leftTo(leftAt(event->position().x()));
    update();
}

void ThinningPlot::mouseMoveEvent(QMouseEvent* event)
{
    event->accept();
    if (m_dragging && m_bench && m_bench->gesture() == Workbench::Gesture::left) {
        m_bench->leftTo(leftAt(event->position().x()));
        return;
    }
    const bool over =
        movable() && !m_knob.isNull() && std::abs(event->position().x() - m_knob.x()) <= 8 && area().contains(event->position());
    if (over != m_hover) {
        m_hover = over;
        if (over)
            setCursor(Qt::SizeHorCursor);
        else
            unsetCursor();
        update();
    }
}

void ThinningPlot::mouseReleaseEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton || !m_dragging) {
        PaperPlot::mouseReleaseEvent(event);
        return;
    }
    event->accept();
    m_dragging = false;
    if (m_bench && m_bench->gesture() == Workbench::Gesture::left)
        m_bench->finishGesture();
    describe();
    update();
}

bool ThinningPlot::markerFree()
{
    if (m_bench->gesture() == Workbench::Gesture::trial)
        emit told(tr("First keep what is tried (Enter), or give it up (Esc)."));
    return m_bench->gesture() == Workbench::Gesture::none;
}

void ThinningPlot::setLeft(int left)
{
    if (!markerFree() || !m_bench->beginLeft())
        return;
    m_bench->leftTo(left);
    m_bench->finishGesture();
    describe();
}

void ThinningPlot::keyPressEvent(QKeyEvent* event)
{
    if (event->key() == Qt::Key_Escape && m_bench && m_bench->gesture() == Workbench::Gesture::left) {
        m_dragging = false;
        m_bench->giveUpGesture();
        event->accept();
        return;
    }
    if (!movable()) {
        PaperPlot::keyPressEvent(event);
        return;
    }
    const int left = numberLeft(m_bench->worked());
    event->accept();
    switch (event->key()) {
    case Qt::Key_Left:
    case Qt::Key_Down:
        setLeft(left - 1);
        break;
    case Qt::Key_Right:
    case Qt::Key_Up:
        setLeft(left + 1);
        break;
    case Qt::Key_PageDown:
        setLeft(left - 5);
        break;
    case Qt::Key_PageUp:
        setLeft(left + 5);
        break;
    case Qt::Key_Home:
        setLeft(1);
        break;
    case Qt::Key_End:
        setLeft(static_cast<int>(m_bench->worked().rentable));
        break;
    default:
        event->ignore();
        PaperPlot::keyPressEvent(event);
    }
}

void ThinningPlot::leaveEvent(QEvent* event)
{
    PaperPlot::leaveEvent(event);
    if (m_hover) {
        m_hover = false;
        unsetCursor();
        update();
    }
}

void ThinningPlot::focusInEvent(QFocusEvent* event)
{
    PaperPlot::focusInEvent(event);
    update();
}

void ThinningPlot::focusOutEvent(QFocusEvent* event)
{
    PaperPlot::focusOutEvent(event);
    update();
}

} // namespace rungwright
