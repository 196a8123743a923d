// SPDX-License-Identifier: GPL-3.0-or-later
#include "plot_words.h"

#include "wording.h"
#include "workbench.h"

#include <QCoreApplication>
#include <QStringList>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("PlotWords", text); }

QString withCurrency(const QString& title, const Currency& currency)
{
    return currency.code == "XXX" ? title : title + QStringLiteral(", ") + QString::fromStdString(currency.code);
}

QString said(const Measurement& m, const Currency& currency)
{
    const Reading r = reading(m, currency);
    const QString head = r.share.isEmpty() ? r.headline : r.headline + QStringLiteral(", ") + r.share;
    return head + QStringLiteral(". ") + r.sentence;
}

} // namespace

QString isolated(const QString& name)
{
    // First strong isolate ... pop directional isolate (Unicode Standard Annex 9).
    return QChar(0x2068) + name + QChar(0x2069);
}

QString isolated(const std::string& utf8) { return isolated(QString::fromStdString(utf8)); }

QString priceAxisTitle(const Currency& currency) { return withCurrency(tr("asking price"), currency); }

QString gapAxisTitle(const Currency& currency) { return withCurrency(tr("gap"), currency); }

QString statusText(Status status)
{
    switch (status) {
    case Status::vacant:
        return tr("on offer");
    case Status::occupied:
        return tr("taken");
    case Status::reserved:
        return tr("reserved");
    case Status::closed:
        return tr("closed");
    }
    return {};
}

QString benchHeading(const Workbench& bench)
{
    const TierCase* tc = bench.tierCase();
    if (!tc)
        return {};
    const QString dot = QStringLiteral(" · ");
    return isolated(tc->tier.site) + dot + isolated(tc->tier.name) + dot + isolated(bench.candidateName());
}

QString unitToolTip(const Workbench& bench, std::uint32_t unit)
{
    const TierCase* tc = bench.tierCase();
    if (!tc || unit >= tc->tier.units.size())
        return {};
    const Unit& u = tc->tier.units[unit];
    const Price now = bench.workedPrices()[unit];
    const Price current = bench.currentPrices()[unit];
    QStringList lines;
    lines << isolated(u.name);
    QString price = tr("asking %1").arg(moneyText(now, bench.currency()));
    if (now != current)
        price += tr(", current ladder %1").arg(moneyText(current, bench.currency()));
    lines << price;
    lines << (u.locked ? tr("%1, locked").arg(statusText(u.status)) : statusText(u.status));
    QStringList size;
    if (u.grade)
        size << tr("grade %1").arg(*u.grade);
    if (u.areaM2)
        size << tr("%1 m²").arg(QLocale().toString(*u.areaM2, 'g', 6));
    if (!size.isEmpty())
        lines << size.join(QStringLiteral(" · "));
    const Measurement& m = bench.worked();
    const auto rung = std::find_if(m.ladder.begin(), m.ladder.end(), [unit](const Rung& r) { return r.unit == unit; });
    if (m.odds.defined() && rung != m.ladder.end()) {
        const std::vector<double> chances = sharedAmongTies(m.ladder, m.odds);
        lines << tr("%1 chance of being the cheapest found")
                     .arg(percentText(chances[static_cast<std::size_t>(rung - m.ladder.begin())], true));
    }
    return lines.join(QLatin1Char('\n'));
}

int numberLeft(const Measurement& m)
{
    if (m.odds.left)
        return *m.odds.left;
    return static_cast<int>(m.onOffer);
}

QString ladderDescription(const Workbench& bench)
{
    if (!bench.tierCase())
        return tr("No tier is on the bench.");
    const Measurement& m = bench.worked();
    QStringList lines;
    lines << tr("Ladder worked on: %1. %2 units, %3 on offer.").arg(bench.candidateName()).arg(m.units).arg(m.onOffer);
    if (m.figures.lowest && m.figures.highest) {
        lines << tr("Asking from %1 to %2.")
                     .arg(moneyText(*m.figures.lowest, bench.currency()), moneyText(*m.figures.highest, bench.currency()));
    }
    lines << said(m, bench.currency());
    const std::size_t selected = bench.selection().size();
    if (selected == 1) {
        const std::uint32_t unit = bench.selection().front();
        lines << tr("Selected: %1, %2.")
                     .arg(QString::fromStdString(bench.tierCase()->tier.units[unit].name),
                          moneyText(bench.workedPrices()[unit], bench.currency()));
    } else if (selected > 1) {
        lines << tr("%1 units are selected.").arg(selected);
    }
    return lines.join(QLatin1Char(' '));
}

QString curtainDescription(const Workbench& bench)
{
    const Measurement& m = bench.worked();
    if (m.curtain.empty() || !m.gap.gap)
        return tr("No chances to show.");
    QStringList lines;
    lines << tr("The chance that nothing on offer costs less, by price. The area above the floor is the gap, %1.")
                 .arg(moneyText(*m.gap.gap, bench.currency()));
    if (m.gap.chanceFloorMet)
        lines << tr("Chance that the floor is met: %1.").arg(percentText(*m.gap.chanceFloorMet, true));
    if (m.gap.gapMedian && m.gap.gapP90) {
        lines << tr("Half of the enquirers find a gap of at most %1, nine in ten at most %2.")
                     .arg(moneyText(*m.gap.gapMedian, bench.currency()), moneyText(*m.gap.gapP90, bench.currency()));
    }
    return lines.join(QLatin1Char(' '));
}

QString thinningDescription(const Workbench& bench)
{
    const Measurement& m = bench.worked();
    QStringList lines;
    lines << tr("The gap against the number of units left on offer.");
    const int left = numberLeft(m);
    if (m.gap.gap && left > 0) {
        lines << (takesLeft(m.model) ? tr("At %1 left the gap is %2.")
                                     : tr("Now, with %1 on offer, the gap is %2. This model takes no number left."))
                     .arg(left)
                     .arg(moneyText(*m.gap.gap, bench.currency()));
    }
    if (m.thinning.empty()) {
        lines << tr("There is no curve to show.");
        return lines.join(QLatin1Char(' '));
    }
    QStringList points;
    const auto count = static_cast<int>(m.thinning.size());
    for (const int k : {1, count / 4, count / 2, count}) {
        if (k < 1 || std::isnan(m.thinning[static_cast<std::size_t>(k) - 1]))
            continue;
        const QString point = tr("%1 left: %2").arg(k).arg(moneyText(m.thinning[static_cast<std::size_t>(k) - 1], bench.currency()));
        if (!points.contains(point))
            points << point;
    }
    lines << points.join(QStringLiteral("; ")) + QLatin1Char('.');
    return lines.join(QLatin1Char(' '));
}

} // namespace rungwright
