// SPDX-License-Identifier: GPL-3.0-or-later
// Axis numbers: money, whole counts, chances.
#pragma once

#include "ladder/currency.h"

#include <qcustomplot.h>

namespace rungwright
{

/// Ticks on an axis whose coordinates are minor units, written in the locale. Decimals only where the step needs them.
class MoneyTicks : public QCPAxisTicker
{
public:
    void setCurrency(const Currency& currency) { m_currency = currency; }
    /// Numbers stand at least `pixels` apart on an axis `length` pixels long.
    void setSpacing(double length, double pixels) { m_apart = pixels / (length > pixels ? length : pixels); }

    /// Pixels that the widest number of such a range takes.
    double widest(const QCPRange& range, const QFontMetricsF& metrics) const;

protected:
    double getTickStep(const QCPRange& range) override;
    int getSubTickCount(double) override { return 0; }
    QString getTickLabel(double tick, const QLocale& locale, QChar formatChar, int precision) override;

private:
    QString text(double tick, double step) const;

    Currency m_currency;
    double m_apart = 0.2; ///< Least share of the range from one number to the next.
    double m_step = 1;
};

/// 1, and then round numbers of things. No number is written beyond `lastWritten`, where the axis's title stands.
class CountTicks : public QCPAxisTicker
{
public:
    void setSpacing(double length, double pixels) { m_apart = pixels / (length > pixels ? length : pixels); }
    void setLastWritten(double coordinate) { m_lastWritten = coordinate; }

protected:
    double getTickStep(const QCPRange& range) override;
    int getSubTickCount(double) override { return 0; }
    QVector<double> createTickVector(double step, const QCPRange& range) override;
    QString getTickLabel(double tick, const QLocale& locale, QChar formatChar, int precision) override;

private:
    double m_apart = 0.1;
    double m_lastWritten = 1e9;
};

/// 0 %, 50 % and 100 % of a chance.
QSharedPointer<QCPAxisTicker> chanceTicks();

/// The least of 1, 2, 5, 10, 20, ... that is at least `step`.
double roundStep(double step);

} // namespace rungwright
