// SPDX-License-Identifier: GPL-3.0-or-later
// What is compared and where it goes. Painting: side_by_side_paint.cpp.
#include "side_by_side_plot.h"

#include "plot_words.h"
#include "wording.h"

#include <QStringList>

#include <algorithm>
#include <cmath>
#include <limits>

namespace rungwright
{

SideBySidePlot::SideBySidePlot(QWidget* parent) : PaperPlot(parent, Marks::buffered), m_priceTicks(QSharedPointer<MoneyTicks>::create())
{
    setObjectName(QStringLiteral("sideBySidePlot"));
    setAccessibleName(tr("Ladders side by side"));
    setMinimumSize(420, 240);
    yAxis->setTicker(m_priceTicks);
    xAxis->setTickLabels(false);
    SideBySidePlot::lookChanged();
}

void SideBySidePlot::setLadders(const Tier& tier, const Currency& currency, std::span<const SideLadder> ladders)
{
    m_currency = currency;
    m_floor = tier.advertisedFloor;
    m_units = tier.units;
    m_sides.clear();
    for (const SideLadder& ladder : ladders.first(std::min(ladders.size(), kMost))) {
        Side side;
        side.name = ladder.name;
        side.measurement = ladder.measurement;
        sortLadder(m_units, ladder.prices, Among::rentable, side.rungs);
        m_sides.push_back(std::move(side));
    }
    m_priceTicks->setCurrency(currency);
    setPictureHeading(isolated(tier.site) + QStringLiteral(" · ") + isolated(tier.name));
    describe();
    areaChanged();
    redrawAll();
}

void SideBySidePlot::setArrangement(Arrangement arrangement)
{
    if (m_arrangement == arrangement)
        return;
    m_arrangement = arrangement;
    areaChanged();
    redrawAll();
}

QString SideBySidePlot::gapText(const Side& side) const
{
    const GapFigures& gap = side.measurement.gap;
    if (!gap.gap)
        return tr("no gap to show");
    QString text = tr("gap %1").arg(moneyText(*gap.gap, m_currency));
    if (gap.gapShare)
        text += QStringLiteral(" (") + percentText(*gap.gapShare, true) + QLatin1Char(')');
    return text;
}

void SideBySidePlot::describe()
{
    QStringList lines;
    lines << (m_floor.minor > 0
                  ? tr("%1 ladders on one price axis. Advertised floor %2.").arg(m_sides.size()).arg(moneyText(m_floor, m_currency))
                  : tr("%1 ladders on one price axis. No advertised floor is known.").arg(m_sides.size()));
    for (const Side& side : m_sides) {
        const GapFigures& gap = side.measurement.gap;
        lines << (gap.gap ? tr("%1: %2, expected cheapest %3.").arg(side.name, gapText(side), moneyText(*gap.expectedCheapest, m_currency))
                          : tr("%1: %2.").arg(side.name, gapText(side)));
    }
    setAccessibleDescription(lines.join(QLatin1Char(' ')));
}

void SideBySidePlot::areaChanged()
{
    const QFontMetricsF metrics(font());
    double low = std::numeric_limits<double>::max();
    double high = std::numeric_limits<double>::lowest();
    for (const Side& side : m_sides) {
        if (!side.rungs.empty()) {
            low = std::min(low, static_cast<double>(side.rungs.front().price.minor));
            high = std::max(high, static_cast<double>(side.rungs.back().price.minor));
        }
    }
    if (m_floor.minor > 0 || high < low) {
        low = std::min(low, static_cast<double>(m_floor.minor));
        high = std::max(high, static_cast<double>(m_floor.minor));
    }
    if (!(high > low)) {
        const double around = std::max(1.0, 0.05 * std::abs(low));
        low -= around;
        high += around;
    }
    // Room below the floor for its label.
    const double label = 1.5 * metrics.height() / std::max(area().height(), 6.0 * metrics.height());
    yAxis->setRange(low - label * (high - low), high + 0.05 * (high - low));
    double numbers = 0;
    for (const double price : {low, high})
        numbers = std::max(numbers, metrics.horizontalAdvance(moneyText(price, m_currency)));
    const double line = metrics.height();
    const double rows = m_arrangement == Arrangement::columns ? 3.5 : 1.2 + legendRows(viewport().width() - 16) * 1.15;
    setAreaMargins(QMargins(static_cast<int>(numbers) + 14, kHeadingTop + static_cast<int>(rows * line) + 6, 12,
                            m_arrangement == Arrangement::columns ? 10 : static_cast<int>(line) + 12));
    m_priceTicks->setSpacing(area().height(), 2.2 * line);
    placeSides();
}

void SideBySidePlot::placeSides()
{
    if (m_sides.empty())
        return;
    constexpr double between = 20;
    const QRectF in = area();
    const auto count = static_cast<double>(m_sides.size());
    const bool columns = m_arrangement == Arrangement::columns;
    const double width = columns ? (in.width() - between * (count - 1)) / count : in.width();
    const double heading = 2.2 * QFontMetricsF(font()).height();
    double left = in.left();
    for (Side& side : m_sides) {
        const double ladder = std::floor(0.66 * (width - 8));
        side.heading = QRectF(left, in.top() - heading - 4, width, heading);
        side.ladder = QRectF(left, in.top(), ladder, in.height());
        side.curtain = QRectF(left + ladder + 8, in.top(), width - ladder - 8, in.height());
        side.shape.build(side.measurement, frame(side.curtain));
        if (columns)
            left += width + between;
    }
}

QRectF SideBySidePlot::column(std::size_t ladder) const
{
    if (m_arrangement != Arrangement::columns || ladder >= m_sides.size())
        return {};
    return m_sides[ladder].heading | m_sides[ladder].ladder | m_sides[ladder].curtain;
}

void SideBySidePlot::lookChanged()
{
    yAxis->grid()->setVisible(true);
    xAxis->grid()->setVisible(false);
    PaperPlot::lookChanged();
    SideBySidePlot::areaChanged();
}

} // namespace rungwright
