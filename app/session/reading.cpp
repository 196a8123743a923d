// SPDX-License-Identifier: GPL-3.0-or-later
// The reading line. Every special case gets a sentence of its own.
#include "wording.h"

#include <QCoreApplication>
#include <QStringList>

#include <cmath>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("Reading", text); }

/// Below half a minor unit an amount shows as zero, and a sentence must not speak of it.
bool shows(double minorUnits) { return std::abs(minorUnits) >= 0.5; }

bool onRentable(const Measurement& m) { return modelUnits(m.model) == Among::rentable; }

QString whyUndefined(const Measurement& m)
{
    if (m.units == 0)
        return tr("The tier has no units.");
    if (m.rentable == 0)
        return tr("All units are closed: nothing is rentable.");
    const QString reason = m.odds.note ? oddsNoteText(*m.odds.note) : tr("There is no gap to show.");
    if (m.onOffer == 0 && m.odds.note == OddsNote::nothingOnOffer)
        return tr("Nothing is on offer: all %1 rentable units are taken or reserved.").arg(m.rentable) + QLatin1Char(' ') +
               tr("“Random remainder” with a number left, or “Cheapest-first turnover” with a load, shows what they will find once "
                  "something frees up.");
    return reason;
}

/// Where the gap comes from: its parts, in words.
QString parts(const Measurement& m, const Currency& currency, const QLocale& locale)
{
    const double claim = *m.gap.claimPart;
    const double shape = *m.gap.shapePart;
    const QString onSale = onRentable(m) ? tr("no rentable unit asks the floor") : tr("nothing is on sale at the floor");
    QStringList said;
    if (claim > 0 && shows(claim))
        said << tr("%1 because %2").arg(moneyText(claim, currency, locale), onSale);
    if (claim < 0 && shows(claim) && shows(shape))
        said << tr("%1 because the low end is thin, less %2 because the lowest price is below the advert")
                    .arg(moneyText(shape, currency, locale), moneyText(-claim, currency, locale));
    else if (shape > 0 && shows(shape))
        said << tr("%1 because the low end is thin").arg(moneyText(shape, currency, locale));
    else if (shows(shape)) // only the fitted range: a smooth curve begins at the floor, whatever is on offer
        said << tr("less %1 because the fitted curve reaches below the lowest price").arg(moneyText(-shape, currency, locale));
    return said.join(tr(", "));
}

QString remarks(const Measurement& m, const Currency& currency, const QLocale& locale)
{
    QStringList said;
    const LadderFigures& f = m.figures;
    if (m.onOffer == 1)
        said << tr("Only one unit is on offer.");
    else if (m.onOffer > 1 && f.lowest == f.highest)
        said << tr("All %1 units on offer ask %2.").arg(m.onOffer).arg(moneyText(*f.lowest, currency, locale));
    if (m.belowFloor == 1)
        said << tr("One unit is asked below the advertised floor.");
    else if (m.belowFloor > 1 && m.belowFloor < m.onOffer)
        said << tr("%1 units are asked below the advertised floor.").arg(m.belowFloor);
    if (m.odds.none >= 0.005)
        said << tr("The chance that nothing is on offer at all is %1.").arg(percentText(m.odds.none, true, locale));
    if (m.onOffer == 0)
        said << tr("Nothing is on offer right now.");
    return said.join(QLatin1Char(' '));
}

} // namespace

Reading reading(const Measurement& m, const Currency& currency, const QLocale& locale)
{
    if (!m.gap.gap && m.advertisedFloor.minor <= 0 && m.rentable > 0 && m.odds.note != OddsNote::nothingOnOffer) {
        QString sentence = tr("No advertised floor is known for this tier, so there is no gap to show.");
        if (m.gap.expectedCheapest)
            sentence +=
                QLatin1Char(' ') +
                tr("The cheapest unit an enquirer finds is expected at %1.").arg(moneyText(*m.gap.expectedCheapest, currency, locale));
        return {tr("No floor"), {}, sentence};
    }
    if (!m.gap.gap) {
        const QString headline = m.onOffer == 0 ? tr("Nothing on offer") : tr("Gap undefined");
        return {headline, {}, whyUndefined(m)};
    }
    const double gap = *m.gap.gap;
    Reading r;
    r.headline = tr("Gap %1").arg(moneyText(gap, currency, locale));
    if (m.gap.gapShare)
        r.share = tr("%1 of the floor").arg(percentText(*m.gap.gapShare, true, locale));

    const QString floor = moneyText(m.advertisedFloor, currency, locale);
    const QString cheapest = moneyText(*m.gap.expectedCheapest, currency, locale);
    QString sentence = tr("Advertised from %1. The cheapest unit an enquirer finds is expected at %2").arg(floor, cheapest);
    if (!shows(gap)) {
        sentence += tr(": the floor that was advertised.");
    } else if (gap < 0) {
        sentence += tr(", %1 below the advert: the advertised floor lies above what is asked.").arg(moneyText(-gap, currency, locale));
    } else {
        sentence += tr(": ") + parts(m, currency, locale) + QLatin1Char('.');
    }
    const QString more = remarks(m, currency, locale);
    r.sentence = more.isEmpty() ? sentence : sentence + QLatin1Char(' ') + more;
    return r;
}

} // namespace rungwright
