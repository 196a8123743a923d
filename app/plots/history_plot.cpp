// SPDX-License-Identifier: GPL-3.0-or-later
#include "history_plot.h"

#include "curve_paint.h"
#include "wording.h"

#include <QHelpEvent>
#include <QKeyEvent>
#include <QMouseEvent>
#include <QPainter>
#include <QToolTip>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

/// Marks nearer to each other than this would hide the line.
constexpr double kMarkApart = 9;
constexpr double kRugHeight = 6;
constexpr double kMillisecondsADay = 86'400'000;

QString localTimeText(std::int64_t instant)
{
    return QLocale().toString(QDateTime::fromMSecsSinceEpoch(instant).toLocalTime(), QLocale::ShortFormat);
}

} // namespace

HistoryPlot::HistoryPlot(QWidget* parent) :
    PaperPlot(parent, Marks::buffered),
    m_amounts(QSharedPointer<MoneyTicks>::create()),
    m_times(QSharedPointer<QCPAxisTickerDateTime>::create())
{
    setFocusPolicy(Qt::StrongFocus);
    setMinimumSize(280, 88);
    m_times->setDateTimeSpec(Qt::LocalTime);
    yAxis->setTicker(m_amounts);
    xAxis->setTicker(m_times);
    HistoryPlot::lookChanged();
}

void HistoryPlot::setPicture(HistoryPicture picture)
{
    const auto before = chosen();
    m_picture = std::move(picture);
    m_chosen = -1;
    if (before)
        choose(*before);
    m_amounts->setCurrency(m_picture.currency);
    fitRange();
    fitMargins();
    describe();
    redrawAll();
}

void HistoryPlot::choose(std::int64_t id)
{
    const auto found = std::ranges::find(m_picture.marks, id, &HistoryMark::id);
    m_chosen = found == m_picture.marks.end() ? -1 : static_cast<int>(found - m_picture.marks.begin());
    describe();
    update();
}

std::optional<std::int64_t> HistoryPlot::chosen() const
{
    if (m_chosen < 0)
        return {};
    return m_picture.marks[static_cast<std::size_t>(m_chosen)].id;
}

int HistoryPlot::numbersWidth() const
{
    return m_picture.marks.empty() ? 40 : static_cast<int>(std::ceil(m_amounts->widest(yAxis->range(), QFontMetricsF(font())))) + 14;
}

void HistoryPlot::setNumbersWidth(int pixels)
{
    m_numbers = pixels;
    fitMargins();
    redrawAll();
}

void HistoryPlot::fitMargins()
{
    const int line = static_cast<int>(std::ceil(QFontMetricsF(font()).height()));
    setAreaMargins(QMargins(m_numbers, kHeadingTop + line + 6, 16, line + 10));
}

void HistoryPlot::describe()
{
    if (m_picture.marks.empty()) {
        setAccessibleDescription(tr("No sign-off to show."));
        return;
    }
    QStringList said{tr("%1 sign-offs, from %2 to %3.")
                         .arg(QLocale().toString(static_cast<qlonglong>(m_picture.marks.size())),
                              localTimeText(m_picture.marks.front().instant), localTimeText(m_picture.marks.back().instant))};
    for (const HistorySeries& series : m_picture.series) {
        if (series.points.empty() || std::isnan(series.points.back().value))
            continue;
        said << tr("%1: now %2.").arg(series.name, moneyText(series.points.back().value, m_picture.currency));
    }
    if (m_chosen >= 0)
        said << tr("Chosen: %1").arg(markText(m_chosen));
    setAccessibleDescription(said.join(QLatin1Char(' ')));
}

void HistoryPlot::fitRange()
{
    if (m_picture.marks.empty())
        return;
    const double from = static_cast<double>(m_picture.marks.front().instant);
    const double until = std::max(static_cast<double>(m_picture.until), static_cast<double>(m_picture.marks.back().instant));
    const double pad = std::max(0.01 * (until - from), 60'000.0);
    xAxis->setRange((from - pad) / 1000.0, (until + pad) / 1000.0);
    const bool longer = until - from > 3 * kMillisecondsADay;
    const bool years = until - from > 500 * kMillisecondsADay;
    m_times->setDateTimeFormat(years ? QStringLiteral("MMM yyyy") : longer ? QStringLiteral("d MMM") : QStringLiteral("d MMM hh:mm"));

    double low = 0;
    double high = 0;
    bool any = m_picture.fromZero;
    for (const HistorySeries& series : m_picture.series) {
        for (const HistoryPoint& point : series.points) {
            if (std::isnan(point.value))
                continue;
            low = any ? std::min(low, point.value) : point.value;
            high = any ? std::max(high, point.value) : point.value;
            any = true;
        }
    }
    if (!(high > low)) {
        const double room = std::max(1.0, 0.05 * std::abs(high));
        low -= m_picture.fromZero ? 0 : room;
        high += room;
    }
    const double air = 0.08 * (high - low);
    yAxis->setRange(m_picture.fromZero && low >= 0 ? 0 : low - air, high + air);
}

void HistoryPlot::areaChanged()
{
    m_lines.clear();
    const QFontMetricsF metrics(font());
    m_amounts->setSpacing(area().height(), 1.5 * metrics.height());
    m_times->setTickCount(std::clamp(static_cast<int>(area().width() / (7.5 * metrics.height())), 2, 9));
    if (m_picture.marks.empty())
        return;
    const QCPRange x = xAxis->range();
    const double perSecond = (xAxis->coordToPixel(x.upper) - xAxis->coordToPixel(x.lower)) / x.size();
    const double x0 = xAxis->coordToPixel(x.lower);
    const QCPRange y = yAxis->range();
    const double perMinor = (yAxis->coordToPixel(y.upper) - yAxis->coordToPixel(y.lower)) / y.size();
    const double y0 = yAxis->coordToPixel(y.lower);
    const auto xAt = [&](double instant) { return x0 + (instant / 1000.0 - x.lower) * perSecond; };
    const auto yAt = [&](double minor) { return y0 + (minor - y.lower) * perMinor; };
    const double end = xAt(static_cast<double>(std::max(m_picture.until, m_picture.marks.back().instant)));
    for (const HistorySeries& series : m_picture.series)
        m_lines.push_back(stepLine(series.points, end, xAt, yAt));
}

void HistoryPlot::lookChanged()
{
    yAxis->grid()->setVisible(true);
    xAxis->grid()->setVisible(false);
    PaperPlot::lookChanged();
    fitMargins();
}

// Painting -----------------------------------------------------------------------------------------------------------

QPen HistoryPlot::penOf(HistorySeries::Kind kind) const
{
    switch (kind) {
    case HistorySeries::Kind::floor:
        return {look().floor, 1.6, Qt::DashLine, Qt::FlatCap};
    case HistorySeries::Kind::unit:
        return {look().onOffer, 1.8, Qt::DotLine, Qt::FlatCap};
    case HistorySeries::Kind::cheapest:
    case HistorySeries::Kind::gap:
        break;
    }
    return {look().gapLine, 1.8, Qt::SolidLine, Qt::SquareCap};
}

void HistoryPlot::paintShape(QPainter& painter, HistorySeries::Kind kind, QPointF at, double size) const
{
    painter.setPen(QPen(look().paper, 1));
    painter.setBrush(penOf(kind).color());
    const auto shape = [&](std::initializer_list<QPointF> corners) {
        QPolygonF polygon;
        for (const QPointF& corner : corners)
            polygon << at + size * corner;
        painter.drawPolygon(polygon);
    };
    switch (kind) {
    case HistorySeries::Kind::floor:
        shape({{-0.9, -0.9}, {0.9, -0.9}, {0.9, 0.9}, {-0.9, 0.9}});
        break;
    case HistorySeries::Kind::cheapest:
        painter.drawEllipse(at, size, size);
        break;
    case HistorySeries::Kind::gap:
        shape({{0, -1.2}, {1.1, 0.9}, {-1.1, 0.9}});
        break;
    case HistorySeries::Kind::unit:
        shape({{0, -1.3}, {1.3, 0}, {0, 1.3}, {-1.3, 0}});
        break;
    }
}

/// From the right end leftwards; returns where it begins.
int HistoryPlot::paintLegend(QPainter& painter, double right) const
{
    const QFontMetricsF metrics(font());
    const double middle = kHeadingTop + 0.5 * metrics.height();
    double x = right;
    for (auto series = m_picture.series.rbegin(); series != m_picture.series.rend(); ++series) {
        const QString name = metrics.elidedText(series->name, Qt::ElideMiddle, 180);
        const double width = metrics.horizontalAdvance(name);
        x -= width;
        painter.setPen(look().ink);
        painter.drawText(QPointF(x, kHeadingTop + metrics.ascent()), name);
        x -= 38;
        painter.setPen(penOf(series->kind));
        painter.drawLine(QPointF(x, middle), QPointF(x + 30, middle));
        paintShape(painter, series->kind, QPointF(x + 15, middle), 3.4);
        x -= 20;
    }
    return static_cast<int>(x);
}

void HistoryPlot::paintFrame(QPainter& painter)
{
    if (m_picture.marks.empty())
        return;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, true);
    const QFontMetricsF metrics(font());
    painter.setFont(font());
    const int legendFrom = paintLegend(painter, area().right());
    painter.setPen(look().faintInk);
    painter.drawText(QPointF(8, kHeadingTop + metrics.ascent()), metrics.elidedText(m_picture.title, Qt::ElideRight, legendFrom - 16.0));
    painter.restore();
}

void HistoryPlot::paintMarks(QPainter& painter)
{
    if (m_picture.marks.empty())
        return;
    painter.save();
    painter.setClipRect(area().adjusted(-6, -6, 6, 6));
    for (std::size_t i = 0; i < m_lines.size(); ++i) {
        const StepLine& steps = m_lines[i];
        const HistorySeries& series = m_picture.series[i];
        for (std::size_t s = 0; s < steps.starts.size(); ++s) {
            const qsizetype from = steps.starts[s];
            const qsizetype to = s + 1 < steps.starts.size() ? steps.starts[s + 1] : steps.line.size();
            if (series.kind == HistorySeries::Kind::gap) {
                std::vector<QRectF> fill;
                appendFill(steps.line.constData() + from, to - from, yAxis->coordToPixel(0), fill);
                painter.setRenderHint(QPainter::Antialiasing, false);
                painter.setPen(Qt::NoPen);
                painter.setBrush(look().gapFill);
                painter.drawRects(fill.data(), static_cast<int>(fill.size()));
            }
            painter.setRenderHint(QPainter::Antialiasing, true);
            const QPen pen = penOf(series.kind);
            if (pen.style() == Qt::SolidLine) {
                paintCurve(painter, steps.line.constData() + from, to - from, pen);
            } else {
                painter.setPen(pen);
                painter.drawPolyline(steps.line.constData() + from, static_cast<int>(to - from));
            }
        }
        // All marks or none: a chosen few would look like the sign-offs there are.
        const bool crowded = static_cast<double>(series.points.size()) * kMarkApart > area().width();
        for (const HistoryPoint& point : series.points) {
            if (!crowded && !std::isnan(point.value))
                paintShape(painter, series.kind, QPointF(xOf(point.instant), yAxis->coordToPixel(point.value)), 3.4);
        }
    }
    // A stroke in every column that has a sign-off.
    painter.setRenderHint(QPainter::Antialiasing, false);
    painter.setPen(QPen(look().faintInk, 1));
    double drawn = -1;
    for (const HistoryMark& mark : m_picture.marks) {
        const double x = std::floor(xOf(mark.instant));
        if (x > drawn)
            painter.drawLine(QPointF(x, area().bottom() - kRugHeight), QPointF(x, area().bottom()));
        drawn = x;
    }
    painter.restore();
}

void HistoryPlot::paintAbove(QPainter& painter)
{
    painter.save();
    if (m_picture.marks.empty()) {
        painter.setPen(look().faintInk);
        painter.setFont(font());
        painter.drawText(viewport(), Qt::AlignCenter, tr("no sign-off to show"));
    } else if (m_chosen >= 0) {
        const std::int64_t instant = m_picture.marks[static_cast<std::size_t>(m_chosen)].instant;
        const double x = xOf(instant);
        painter.setPen(QPen(look().selection, 1));
        painter.drawLine(QPointF(x, area().top()), QPointF(x, area().bottom()));
        painter.setRenderHint(QPainter::Antialiasing, true);
        for (const HistorySeries& series : m_picture.series) {
            if (const auto value = valueAt(series, instant)) {
                const QPointF at(x, yAxis->coordToPixel(*value));
                paintShape(painter, series.kind, at, 3.4);
                painter.setBrush(Qt::NoBrush);
                painter.setPen(QPen(look().selection, 1.4));
                painter.drawEllipse(at, 7, 7);
            }
        }
    }
    if (hasFocus() && !exporting()) {
        painter.setRenderHint(QPainter::Antialiasing, false);
        painter.setBrush(Qt::NoBrush);
        painter.setPen(QPen(look().focus, 1));
        painter.drawRect(area().adjusted(0, 0, -1, -1));
    }
    painter.restore();
}

// Hands and keys -----------------------------------------------------------------------------------------------------

std::optional<double> HistoryPlot::valueAt(const HistorySeries& series, std::int64_t instant) const
{
    const auto after = std::ranges::upper_bound(series.points, instant, {}, &HistoryPoint::instant);
    if (after == series.points.begin() || std::isnan(std::prev(after)->value))
        return {};
    return std::prev(after)->value;
}

QString HistoryPlot::markText(int mark) const
{
    const std::int64_t instant = m_picture.marks[static_cast<std::size_t>(mark)].instant;
    QStringList said{localTimeText(instant)};
    for (const HistorySeries& series : m_picture.series) {
        const auto value = valueAt(series, instant);
        said << tr("%1: %2").arg(series.name, value ? moneyText(*value, m_picture.currency) : undefinedText());
    }
    return said.join(QStringLiteral(", "));
}

int HistoryPlot::nearest(double x) const
{
    const auto& marks = m_picture.marks;
    if (marks.empty())
        return -1;
    const auto instant = static_cast<std::int64_t>(xAxis->pixelToCoord(x) * 1000.0);
    const auto after = std::ranges::lower_bound(marks, instant, {}, &HistoryMark::instant);
    const auto index = static_cast<int>(after - marks.begin());
    if (index == 0)
        return 0;
    if (after == marks.end())
        return index - 1;
    return after->instant - instant < instant - std::prev(after)->instant ? index : index - 1;
}

void HistoryPlot::take(int mark)
{
    if (mark < 0 || mark == m_chosen)
        return;
    m_chosen = mark;
    describe();
    update();
    emit signOffChosen(m_picture.marks[static_cast<std::size_t>(mark)].id);
}

bool HistoryPlot::event(QEvent* event)
{
    if (event->type() != QEvent::ToolTip)
        return PaperPlot::event(event);
    const auto* help = static_cast<QHelpEvent*>(event);
    const int mark = nearest(help->pos().x());
    if (mark >= 0 && area().contains(help->pos()) &&
        std::abs(xOf(m_picture.marks[static_cast<std::size_t>(mark)].instant) - help->pos().x()) < 12)
        QToolTip::showText(help->globalPos(), markText(mark).toHtmlEscaped(), this);
    else
        QToolTip::hideText();
    return true;
}

void HistoryPlot::mousePressEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton || !area().contains(event->position())) {
        PaperPlot::mousePressEvent(event);
        return;
    }
    event->accept();
    take(nearest(event->position().x()));
}

void HistoryPlot::keyPressEvent(QKeyEvent* event)
{
    const auto last = static_cast<int>(m_picture.marks.size()) - 1;
    event->accept();
    switch (event->key()) {
    case Qt::Key_Left:
        take(m_chosen < 0 ? last : std::max(0, m_chosen - 1));
        break;
    case Qt::Key_Right:
        take(m_chosen < 0 ? last : std::min(last, m_chosen + 1));
        break;
    case Qt::Key_Home:
        take(std::min(0, last));
        break;
    case Qt::Key_End:
        take(last);
        break;
    default:
        event->ignore();
        PaperPlot::keyPressEvent(event);
    }
}

void HistoryPlot::focusInEvent(QFocusEvent* event)
{
    PaperPlot::focusInEvent(event);
    update();
}

void HistoryPlot::focusOutEvent(QFocusEvent* event)
{
    PaperPlot::focusOutEvent(event);
    update();
}

} // namespace rungwright
