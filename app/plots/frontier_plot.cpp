// SPDX-License-Identifier: GPL-3.0-or-later
#include "frontier_plot.h"

#include "plot_words.h"
#include "wording.h"

#include <QAccessible>
#include <QKeyEvent>
#include <QMenu>
#include <QMouseEvent>

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

namespace rungwright
{

namespace
{

constexpr double kMarkReach = 10; ///< Pixels around a named ladder that take the pointer before the curve does.

QString withCode(const QString& title, const Currency& currency)
{
    return currency.code == "XXX" ? title : title + QStringLiteral(", ") + QString::fromStdString(currency.code);
}

} // namespace

FrontierPlot::FrontierPlot(QWidget* parent) :
    PaperPlot(parent, Marks::buffered),
    m_amountTicks(QSharedPointer<MoneyTicks>::create()),
    m_gapTicks(QSharedPointer<MoneyTicks>::create())
{
    setObjectName(QStringLiteral("frontierPlot"));
    setAccessibleName(tr("Trade-off"));
    setFocusPolicy(Qt::StrongFocus);
    setMouseTracking(true);
    setMinimumSize(320, 240);
    xAxis->setTicker(m_amountTicks);
    yAxis->setTicker(m_gapTicks);
    FrontierPlot::lookChanged();
}

void FrontierPlot::show(FrontierPicture picture)
{
    // Keys go on from where they were while the same curve is shown again.
    const bool same = picture.against == m_picture.against && picture.curve.size() == m_picture.curve.size();
    m_picture = std::move(picture);
    if (!same || m_spot.point >= points() || m_spot.mark >= marks())
        m_spot = {};
    m_pressed = {};
    m_amountTicks->setCurrency(m_picture.currency);
    m_gapTicks->setCurrency(m_picture.currency);
    setPictureHeading(m_picture.heading);
    areaChanged();
    describe();
    redrawAll();
}

void FrontierPlot::fitRanges()
{
    double left = 0;
    double right = 0;
    double low = 0;
    double high = 0;
    const auto see = [&](double amount, double gap) {
        left = std::min(left, amount);
        right = std::max(right, amount);
        low = std::min(low, gap);
        high = std::max(high, gap);
    };
    for (const FrontierPoint& point : m_picture.curve)
        see(m_picture.amountOf(point), point.gap);
    for (const FrontierPicture::Mark& mark : m_picture.marks)
        see(mark.amount, mark.gap);
    const double least = std::max(1.0, 0.01 * inMinor(m_picture.floor));
    if (right - left < least)
        right = left + least;
    if (high - low < least)
        high = low + least;
    const double width = right - left;
    const double height = high - low;
    // Marks and their names want room inside the edges.
    xAxis->setRange(left - 0.04 * width, right + 0.06 * width);
    yAxis->setRange(low < 0 ? low - 0.08 * height : -0.02 * height, high + 0.12 * height);
}

void FrontierPlot::areaChanged()
{
    fitRanges();
    const QFontMetricsF metrics(font());
    const int line = static_cast<int>(std::ceil(metrics.height()));
    const int numbers = static_cast<int>(std::ceil(m_gapTicks->widest(yAxis->range(), metrics))) + 14;
    setAreaMargins(QMargins(numbers, kHeadingTop + 2 * line, 16, 2 * line + 14));
    axisRect()->setOuterRect(viewport());
    m_gapTicks->setSpacing(area().height(), 2.2 * metrics.height());
    m_amountTicks->setSpacing(area().width(), m_amountTicks->widest(xAxis->range(), metrics) + 2.5 * metrics.height());
}

void FrontierPlot::lookChanged()
{
    xAxis->grid()->setVisible(true);
    yAxis->grid()->setVisible(true);
    PaperPlot::lookChanged();
    FrontierPlot::areaChanged();
}

void FrontierPlot::extendMenu(QMenu& menu)
{
    menu.addSeparator();
    menu.addAction(tr("Copy &table"), this, &FrontierPlot::copyTableWanted)->setObjectName(QStringLiteral("copyTable"));
    menu.addAction(tr("Save table as &CSV…"), this, &FrontierPlot::saveTableWanted)->setObjectName(QStringLiteral("saveTable"));
}

QPointF FrontierPlot::placeOf(int point) const
{
    const FrontierPoint& p = m_picture.curve[static_cast<std::size_t>(point)];
    return place(m_picture.amountOf(p), p.gap);
}

QPointF FrontierPlot::placeOfMark(int mark) const
{
    const FrontierPicture::Mark& m = m_picture.marks[static_cast<std::size_t>(mark)];
    return place(m.amount, m.gap);
}

// Words ----------------------------------------------------------------------------------------------------------------------

QString FrontierPlot::amountTitle() const
{
    return m_picture.against == FrontierPicture::Against::prices ? withCode(tr("typical change a unit"), m_picture.currency)
                                                                 : withCode(tr("change of the asking total"), m_picture.currency);
}

QString FrontierPlot::gapText(double gap) const
{
    const QString text = moneyText(gap, m_picture.currency);
    return m_picture.floor.minor > 0 ? tr("gap %1 (%2)").arg(text, percentText(gap / inMinor(m_picture.floor), true))
                                     : tr("gap %1").arg(text);
}

QString FrontierPlot::pointText(int point) const
{
    const FrontierPoint& p = m_picture.curve[static_cast<std::size_t>(point)];
    QString said = gapText(p.gap) + QLatin1Char('\n');
    const double by = std::abs(p.totalChange) < 0.5 ? 0 : p.totalChange;
    QString total = by == 0 ? tr("asking total as today") : tr("asking total %1").arg(signedMoneyText(by, m_picture.currency));
    if (by != 0 && m_picture.total.minor > 0)
        total += tr(" (%1)").arg(percentText(by / inMinor(m_picture.total), true));
    if (m_picture.against == FrontierPicture::Against::prices)
        said += tr("typical change %1 a unit").arg(moneyText(p.rmsChange, m_picture.currency)) + QLatin1Char('\n');
    return said + total;
}

QString FrontierPlot::markText(int mark) const
{
    const FrontierPicture::Mark& m = m_picture.marks[static_cast<std::size_t>(mark)];
    const QString amount = m_picture.against == FrontierPicture::Against::prices
                               ? tr("typical change %1 a unit").arg(moneyText(m.amount, m_picture.currency))
                               : tr("asking total %1").arg(signedMoneyText(m.amount, m_picture.currency));
    return isolated(m.name) + QLatin1Char('\n') + gapText(m.gap) + QLatin1Char('\n') + amount;
}

QString FrontierPlot::spotText(Spot spot) const
{
    if (spot.mark >= 0)
        return markText(spot.mark);
    return spot.point >= 0 ? pointText(spot.point) : QString();
}

void FrontierPlot::describe()
{
    QStringList said;
    if (!m_spot.none())
        said << spotText(m_spot).replace(QLatin1Char('\n'), QStringLiteral(", ")) + QLatin1Char('.');
    if (!m_picture.note.isEmpty())
        said << m_picture.note;
    if (points() > 0) {
        said << (m_picture.against == FrontierPicture::Against::prices
                     ? tr("The smallest gap for an amount of change, %1 points.").arg(points())
                     : tr("The smallest gap at each asking total, %1 points.").arg(points()));
        QStringList some;
        for (const int at : {0, points() / 2, points() - 1}) {
            const QString text = pointText(at).replace(QLatin1Char('\n'), QStringLiteral(", "));
            if (!some.contains(text))
                some << text;
        }
        said << some.join(QStringLiteral("; ")) + QLatin1Char('.');
    }
    for (int i = 0; i < marks(); ++i)
        said << markText(i).replace(QLatin1Char('\n'), QStringLiteral(", ")) + QLatin1Char('.');
    setAccessibleDescription(said.join(QLatin1Char(' ')));
}

// Hands and keys ---------------------------------------------------------------------------------------------------------------

FrontierPlot::Spot FrontierPlot::spotAt(QPointF at) const
{
    Spot found;
    double nearest = kMarkReach;
    for (int i = 0; i < marks(); ++i) {
        const QPointF way = placeOfMark(i) - at;
        const double distance = std::hypot(way.x(), way.y());
        if (distance <= nearest) {
            nearest = distance;
            found.mark = i;
        }
    }
    if (found.mark >= 0 || !area().adjusted(-8, -8, 8, 8).contains(at))
        return found;
    // Anywhere else the curve is meant: its nearest point.
    nearest = std::numeric_limits<double>::infinity();
    for (int i = 0; i < points(); ++i) {
        const QPointF way = placeOf(i) - at;
        const double distance = std::hypot(way.x(), way.y());
        if (distance < nearest) {
            nearest = distance;
            found.point = i;
        }
    }
    return found;
}

void FrontierPlot::setSpot(Spot spot)
{
    if (spot == m_spot)
        return;
    m_spot = spot;
    describe();
    QAccessibleEvent changed(this, QAccessible::DescriptionChanged);
    QAccessible::updateAccessibility(&changed);
    if (spot.none())
        unsetCursor();
    else
        setCursor(Qt::PointingHandCursor);
    update();
}

void FrontierPlot::take(Spot spot)
{
    if (spot.mark >= 0)
        emit candidateChosen(m_picture.marks[static_cast<std::size_t>(spot.mark)].candidate);
    else if (spot.point >= 0)
        emit pointTaken(spot.point);
}

void FrontierPlot::mousePressEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton) {
        PaperPlot::mousePressEvent(event);
        return;
    }
    event->accept();
    m_pressed = spotAt(event->position());
    setSpot(m_pressed);
}

void FrontierPlot::mouseMoveEvent(QMouseEvent* event)
{
    event->accept();
    if (event->buttons() == Qt::NoButton)
        setSpot(spotAt(event->position()));
}

void FrontierPlot::mouseReleaseEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton) {
        PaperPlot::mouseReleaseEvent(event);
        return;
    }
    event->accept();
    const Spot pressed = std::exchange(m_pressed, Spot{});
    // Slid off to somewhere else: the click is given up.
    if (!pressed.none() && spotAt(event->position()) == pressed)
        take(pressed);
}

void FrontierPlot::keyPressEvent(QKeyEvent* event)
{
    const auto walk = [this](int by) {
        if (points() == 0)
            return;
        const int from = m_spot.point < 0 ? (by > 0 ? -1 : points()) : m_spot.point;
        setSpot({std::clamp(from + by, 0, points() - 1), -1});
    };
    event->accept();
    switch (event->key()) {
    case Qt::Key_Left:
        walk(-1);
        return;
    case Qt::Key_Right:
        walk(1);
        return;
    case Qt::Key_PageUp:
        walk(-5);
        return;
    case Qt::Key_PageDown:
        walk(5);
        return;
    case Qt::Key_Home:
    case Qt::Key_End:
        if (points() > 0)
            setSpot({event->key() == Qt::Key_Home ? 0 : points() - 1, -1});
        return;
    case Qt::Key_Up:
    case Qt::Key_Down:
        if (marks() > 0) {
            const int by = event->key() == Qt::Key_Down ? 1 : -1;
            const int from = m_spot.mark < 0 ? (by > 0 ? -1 : marks()) : m_spot.mark;
            setSpot({-1, std::clamp(from + by, 0, marks() - 1)});
        }
        return;
    case Qt::Key_Return:
    case Qt::Key_Enter:
        take(m_spot);
        return;
    default:
        event->ignore();
        PaperPlot::keyPressEvent(event);
    }
}

void FrontierPlot::leaveEvent(QEvent* event)
{
    PaperPlot::leaveEvent(event);
    setSpot({});
}

void FrontierPlot::focusInEvent(QFocusEvent* event)
{
    PaperPlot::focusInEvent(event);
    update();
}

void FrontierPlot::focusOutEvent(QFocusEvent* event)
{
    PaperPlot::focusOutEvent(event);
    update();
}

} // namespace rungwright
