// SPDX-License-Identifier: GPL-3.0-or-later
// LadderPlot: where the moving things are, and which part of the plot a move touches.
#include "ladder_plot.h"

#include "plot_words.h"
#include "wording.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

constexpr double kNowhere = std::numeric_limits<double>::quiet_NaN();

QRectF around(QPointF at, double r) { return {at.x() - r, at.y() - r, 2 * r, 2 * r}; }

QString claimWords(const Measurement& m)
{
    return modelUnits(m.model) == Among::onOffer ? LadderPlot::tr("floor not on sale %1") : LadderPlot::tr("floor not asked %1");
}

} // namespace

int LadderPlot::unitInHand() const
{
    if (!shows())
        return -1;
    if (m_bench->gesture() == Workbench::Gesture::bend)
        return m_bendUnit;
    if (m_bench->gesture() != Workbench::Gesture::move || m_bench->moved().empty())
        return -1;
    const auto moved = m_bench->moved();
    if (m_pressed >= 0 && std::binary_search(moved.begin(), moved.end(), static_cast<std::uint32_t>(m_pressed)))
        return m_pressed;
    return static_cast<int>(moved.front());
}

void LadderPlot::arrange(Scene& scene)
{
    // Rungs in the hand reach a little further than the rest.
    LabelRoom room(area(), m_points, m_size.grip + 2);
    layOutBandLabels(scene, room);
    scene.handle = QPointF();
    const bool trial = m_bench->gesture() == Workbench::Gesture::trial; // Which is not bent.
    if (m_bendUnit >= 0 && area().height() > 120 && !trial) {
        const QPointF rung = rungPosition(static_cast<std::uint32_t>(m_bendUnit));
        QPointF handle = rung + QPointF(-16, -26);
        if (handle.y() < area().top() + 10)
            handle = rung + QPointF(16, 26);
        if (area().contains(around(handle, 9)))
            scene.handle = handle;
    }
    scene.movers = QRectF();
    const auto columns = m_bench->columns();
    for (const std::uint32_t place : m_moverPlaces) {
        const QPointF now = m_points[place];
        const double start = yOf(static_cast<double>(m_bench->startPrices()[columns[place]].minor));
        const double side = std::max(m_size.half, m_size.grip) + 6;
        scene.movers |=
            QRectF(QPointF(now.x() - side, std::min(now.y(), start) - 12), QPointF(now.x() + side, std::max(now.y(), start) + 12));
    }
    if (!scene.handle.isNull())
        room.take(around(scene.handle, 10));
    layOutDragBox(scene, room);
}

void LadderPlot::layOutBandLabels(Scene& scene, LabelRoom& room)
{
    const Measurement& m = m_bench->worked();
    const Currency& currency = m_bench->currency();
    BandInput in;
    in.floorY = in.expectedY = in.claimY = kNowhere;
    if (m_bench->tierCase()->tier.hasFloor()) {
        in.floorY = yOf(static_cast<double>(m.advertisedFloor.minor));
        in.floorText = tr("advertised floor %1").arg(moneyText(m.advertisedFloor, currency));
    }
    if (m.gap.expectedCheapest) {
        in.expectedY = yOf(*m.gap.expectedCheapest);
        in.expectedText = tr("expected cheapest %1").arg(moneyText(*m.gap.expectedCheapest, currency));
    }
    if (m.gap.gap) {
        in.gapText = tr("gap %1").arg(moneyText(*m.gap.gap, currency));
        if (m.gap.gapShare)
            in.gapText += QStringLiteral(" (") + percentText(*m.gap.gapShare, true) + QLatin1Char(')');
        if (*m.gap.claimPart >= 0.5) {
            in.claimY = yOf(static_cast<double>(m.advertisedFloor.minor) + *m.gap.claimPart);
            in.claimText = claimWords(m).arg(moneyText(*m.gap.claimPart, currency));
        }
        if (*m.gap.shapePart >= 0.5 && *m.gap.claimPart > -0.5)
            in.shapeText = tr("thin low end %1").arg(moneyText(*m.gap.shapePart, currency));
    }
    scene.expectedY = in.expectedY;
    const QFontMetricsF strong(strongFont());
    layOutBand(in, QFontMetricsF(font()), strong, room, scene.band);
    if (!m.gap.gap) {
        // The reading line says why; here a word is enough.
        const QString word = reading(m, currency).headline;
        const QSizeF size(std::ceil(strong.horizontalAdvance(word)) + 8, std::ceil(strong.height()));
        const QRectF& in0 = room.area();
        std::vector<QRectF> wanted;
        for (const double x : {in0.right() - 8 - size.width(), in0.left() + 8, in0.center().x() - 0.5 * size.width()}) {
            for (const double y : {std::isnan(in.floorY) ? in0.top() + 8 : in.floorY - 8 - size.height(), in0.top() + 8, in0.center().y(),
                                   in0.bottom() - 8 - size.height()})
                wanted.emplace_back(QPointF(x, y), size);
        }
        const QRectF rect = room.choose(wanted);
        if (!rect.isNull()) {
            room.take(rect);
            scene.band.labels.push_back({word, rect, PlacedLabel::Tone::ink, true, PlacedLabel::Backing::paper});
        }
    }
}

QStringList LadderPlot::dragText(std::uint32_t unit) const
{
    const Currency& currency = m_bench->currency();
    const Price now = m_bench->workedPrices()[unit];
    const Price start = m_bench->startPrices()[unit];
    const QFontMetricsF metrics(font());
    const QString name =
        isolated(metrics.elidedText(QString::fromStdString(m_bench->tierCase()->tier.units[unit].name), Qt::ElideMiddle, 150));
    QStringList lines;
    if (m_bench->gesture() == Workbench::Gesture::bend)
        lines << tr("Bend %1").arg(numberText(m_bench->bendExponent())) << tr("%1: %2").arg(name, moneyText(now, currency));
    else if (m_bench->moved().size() > 1)
        lines << tr("%1 of %2 units: %3").arg(name).arg(m_bench->moved().size()).arg(moneyText(now, currency));
    else
        lines << tr("%1: %2").arg(name, moneyText(now, currency));
    const auto by = static_cast<double>((now - start).minor);
    if (now == start) {
        lines << tr("as it was");
    } else {
        const double share = start.minor > 0 ? by / static_cast<double>(start.minor) : 0.0;
        lines << tr("%1 (%2) from %3").arg(signedMoneyText(by, currency), percentText(share, true), moneyText(start, currency));
    }
    if (const QString held = m_bench->boundText(); !held.isEmpty())
        lines << held;
    if (m_bench->holdsTotal() && m_bench->leftOver() != Price{})
        lines << tr("no room left: asking total %1").arg(signedMoneyText(static_cast<double>(m_bench->leftOver().minor), currency));
    return lines;
}

void LadderPlot::layOutDragBox(Scene& scene, LabelRoom& room) const
{
    scene.dragBox = QRectF();
    scene.dragLines.clear();
    const int unit = unitInHand();
    if (unit < 0 || m_hand == Hand::empty)
        return;
    scene.dragLines = dragText(static_cast<std::uint32_t>(unit));
    const QFontMetricsF plain(font());
    const QFontMetricsF strong(strongFont());
    double width = 0;
    for (qsizetype i = 0; i < scene.dragLines.size(); ++i)
        width = std::max(width, (i == 0 ? strong : plain).horizontalAdvance(scene.dragLines[i]));
    const QSizeF size(std::ceil(width) + 16, static_cast<double>(scene.dragLines.size()) * plain.height() + 8);
    scene.dragBox = placeBeside(rungPosition(static_cast<std::uint32_t>(unit)), size, m_size.half + 10, room);
}

QRect LadderPlot::changedRect(const Scene& from, const Scene& to) const
{
    // One rectangle, for the raster engine is slow at drawing clipped to a region of many, and copying paper is quick.
    QRectF changed;
    const QRectF in = area();
    const auto addStrip = [&](double y1, double y2) {
        const double top = std::isnan(y1) || std::isnan(y2) ? in.top() : std::min(y1, y2);
        const double bottom = std::isnan(y1) || std::isnan(y2) ? in.bottom() : std::max(y1, y2);
        changed |= QRectF(QPointF(in.left(), top - 3), QPointF(in.right(), bottom + 3));
    };
    const auto hatchTop = [&](const Scene& scene) { return scene.band.hatched.isNull() ? in.bottom() : scene.band.hatched.top(); };
    if (!(from.expectedY == to.expectedY) && !(std::isnan(from.expectedY) && std::isnan(to.expectedY)))
        addStrip(from.expectedY, to.expectedY);
    if (from.band.hatched != to.band.hatched)
        addStrip(hatchTop(from), hatchTop(to));
    for (std::size_t i = 0; i < std::max(from.band.labels.size(), to.band.labels.size()); ++i) {
        const PlacedLabel* was = i < from.band.labels.size() ? &from.band.labels[i] : nullptr;
        const PlacedLabel* is = i < to.band.labels.size() ? &to.band.labels[i] : nullptr;
        if (was && is && was->rect == is->rect && was->text == is->text && was->backing == is->backing)
            continue;
        if (was)
            changed |= was->rect;
        if (is)
            changed |= is->rect;
    }
    for (const Scene* scene : {&from, &to}) {
        changed |= scene->movers;
        changed |= scene->dragBox;
        if (from.handle != to.handle && !scene->handle.isNull())
            changed |= QRectF(scene->handle, QSizeF(1, 1)).adjusted(-32, -40, 32, 40);
        if (from.band.bracket != to.band.bracket && !scene->band.bracket.isNull())
            changed |= QRectF(scene->band.bracket.p1(), scene->band.bracket.p2()).normalized().adjusted(-5, -2, 5, 2);
    }
    return changed.adjusted(-2, -2, 2, 2).toAlignedRect() & rect();
}

// Bending ----------------------------------------------------------------------------------------------------------------

void LadderPlot::chooseBendUnit()
{
    if (m_bench->gesture() != Workbench::Gesture::none)
        return; // The handle stays with its rung.
    m_bendUnit = -1;
    const auto& units = m_bench->tierCase()->tier.units;
    const auto prices = m_bench->workedPrices();
    const bool some = m_bench->selection().size() >= 3; // As Workbench::beginBend() takes it.
    const auto bends = [&](std::uint32_t unit) { return some ? m_bench->isSelected(unit) : units[unit].rentable(); };
    std::size_t count = 0;
    m_bendLow = std::numeric_limits<double>::infinity();
    m_bendHigh = -m_bendLow;
    for (std::uint32_t unit = 0; unit < units.size(); ++unit) {
        if (!bends(unit))
            continue;
        ++count;
        m_bendLow = std::min(m_bendLow, static_cast<double>(prices[unit].minor));
        m_bendHigh = std::max(m_bendHigh, static_cast<double>(prices[unit].minor));
    }
    if (count < 3 || !(m_bendHigh > m_bendLow))
        return;
    // The rung nearest to the middle that the bend moves: not locked, and off both ends.
    double nearest = std::numeric_limits<double>::infinity();
    std::size_t seen = 0;
    for (const std::uint32_t unit : m_bench->columns()) {
        if (!bends(unit))
            continue;
        const double off = std::abs(static_cast<double>(seen++) - 0.5 * static_cast<double>(count - 1));
        const auto price = static_cast<double>(prices[unit].minor);
        if (!units[unit].locked && price > m_bendLow && price < m_bendHigh && off < nearest) {
            nearest = off;
            m_bendUnit = static_cast<int>(unit);
            m_bendStart = price;
        }
    }
}

double LadderPlot::exponentFor(double price) const
{
    const double width = m_bendHigh - m_bendLow;
    const double wanted = std::clamp((price - m_bendLow) / width, 1e-6, 1 - 1e-6);
    return std::log(wanted) / std::log((m_bendStart - m_bendLow) / width);
}

} // namespace rungwright
