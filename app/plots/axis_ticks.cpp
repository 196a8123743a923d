// SPDX-License-Identifier: GPL-3.0-or-later
#include "axis_ticks.h"

#include "wording.h"

#include <algorithm>
#include <cmath>

namespace rungwright
{

double roundStep(double step)
{
    if (!(step > 1.0))
        return 1.0;
    const double power = std::pow(10.0, std::floor(std::log10(step)));
    // A hair of room, so that 2.0000000001 from an axis range still counts as 2.
    for (const double m : {1.0, 2.0, 5.0}) {
        if (step <= m * power * (1 + 1e-9))
            return m * power;
    }
    return 10.0 * power;
}

double MoneyTicks::getTickStep(const QCPRange& range)
{
    m_step = roundStep(range.size() * m_apart);
    return m_step;
}

QString MoneyTicks::text(double tick, double step) const
{
    const auto major = static_cast<double>(m_currency.minorPerMajor());
    return step >= major ? numberText(std::round(tick / major), 0) : moneyText(tick, m_currency);
}

double MoneyTicks::widest(const QCPRange& range, const QFontMetricsF& metrics) const
{
    const double step = roundStep(range.size() * m_apart);
    return std::max(metrics.horizontalAdvance(text(range.lower, step)), metrics.horizontalAdvance(text(range.upper, step)));
}

// Not in the plot's locale: QCustomPlot takes the grouping out of it.
QString MoneyTicks::getTickLabel(double tick, const QLocale&, QChar, int) { return text(tick, m_step); }

double CountTicks::getTickStep(const QCPRange& range) { return roundStep(range.size() * m_apart); }

QVector<double> CountTicks::createTickVector(double step, const QCPRange& range)
{
    QVector<double> ticks;
    if (range.contains(1))
        ticks << 1;
    const auto first = std::max<qint64>(1, static_cast<qint64>(std::ceil(range.lower / step)));
    for (qint64 i = first; static_cast<double>(i) * step <= range.upper; ++i) {
        const double tick = static_cast<double>(i) * step;
        if (tick > 1)
            ticks << tick;
    }
    return ticks;
}

QString CountTicks::getTickLabel(double tick, const QLocale&, QChar, int) { return tick > m_lastWritten ? QString() : numberText(tick, 0); }

QSharedPointer<QCPAxisTicker> chanceTicks()
{
    auto ticks = QSharedPointer<QCPAxisTickerText>::create();
    for (const double chance : {0.0, 0.5, 1.0})
        ticks->addTick(chance, percentText(chance));
    return ticks;
}

} // namespace rungwright
