// SPDX-License-Identifier: GPL-3.0-or-later
#include "sheet_remarks.h"

#include "wording.h"
#include "words.h"

#include <QCoreApplication>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("SheetRemarks", text); }

/// "A-1, A-2, A-3 and 4 more"
QString listed(const QStringList& names)
{
    constexpr int most = 3;
    const QString first = names.mid(0, most).join(tr(", "));
    return names.size() <= most ? first : tr("%1 and %2 more").arg(first, numberText(static_cast<double>(names.size() - most), 0));
}

QString counted(qsizetype count, const char* one, const char* several)
{
    return count == 1 ? tr(one) : tr(several).arg(numberText(static_cast<double>(count), 0));
}

void remarkOnFloor(const Measurement& m, const Currency& currency, QStringList& said)
{
    if (m.advertisedFloor.minor <= 0) {
        said << tr("No advertised floor is known for this tier, so nothing was checked against it.");
        return;
    }
    const QString floor = moneyText(m.advertisedFloor, currency);
    if (m.onOffer == 0)
        said << tr("Nothing is on offer, so the advertised floor of %1 is not on sale.").arg(floor);
    else if (m.atFloor == 0)
        said << tr("The advertised floor of %1 is not on sale: the cheapest unit on offer asks %2.")
                    .arg(floor, moneyText(*m.figures.lowest, currency));
    if (m.belowFloor > 0)
        said << counted(static_cast<qsizetype>(m.belowFloor),
                        QT_TRANSLATE_NOOP("SheetRemarks", "One unit on offer is asked below the advertised floor."),
                        QT_TRANSLATE_NOOP("SheetRemarks", "%1 units on offer are asked below the advertised floor."));
}

void remarkOnRules(const Tier& tier, std::span<const Price> prices, const PriceRules& rules, QStringList& said)
{
    QStringList locked, tooFar, offPoints;
    for (std::size_t i = 0; i < prices.size(); ++i) {
        Unit unit = tier.units[i];
        if (prices[i] == unit.asking)
            continue;
        const QString name = shownText(unit.name, 24);
        if (unit.locked)
            locked << name;
        unit.locked = false;
        const Room room = roomOf(unit, rules);
        if (prices[i] < room.lo || prices[i] > room.hi)
            tooFar << name;
        else if (!rules.points.allows(prices[i]))
            offPoints << name;
    }
    if (!locked.isEmpty())
        said << counted(locked.size(), QT_TRANSLATE_NOOP("SheetRemarks", "One unit gets a new price though it is locked"),
                        QT_TRANSLATE_NOOP("SheetRemarks", "%1 units get a new price though they are locked")) +
                    tr(": %1.").arg(listed(locked));
    if (!tooFar.isEmpty())
        said << counted(tooFar.size(), QT_TRANSLATE_NOOP("SheetRemarks", "One new price lies beyond the price rules"),
                        QT_TRANSLATE_NOOP("SheetRemarks", "%1 new prices lie beyond the price rules")) +
                    tr(": %1.").arg(listed(tooFar));
    if (!offPoints.isEmpty())
        said << counted(offPoints.size(), QT_TRANSLATE_NOOP("SheetRemarks", "One new price is not a price point"),
                        QT_TRANSLATE_NOOP("SheetRemarks", "%1 new prices are not price points")) +
                    tr(": %1.").arg(listed(offPoints));
}

} // namespace

QStringList sheetRemarks(const Tier& tier, std::span<const Price> prices, const Measurement& sheet, const PriceRules& rules,
                         const Currency& currency)
{
    QStringList said;
    remarkOnFloor(sheet, currency, said);
    if (sheet.figures.inversions > 0)
        said << counted(
            static_cast<qsizetype>(sheet.figures.inversions),
            QT_TRANSLATE_NOOP("SheetRemarks",
                              "One inversion of grade on offer: a unit of higher grade is asked for less than one of lower grade."),
            QT_TRANSLATE_NOOP("SheetRemarks",
                              "%1 inversions of grade on offer: a unit of higher grade is asked for less than one of lower grade."));
    remarkOnRules(tier, prices, rules, said);
    return said;
}

} // namespace rungwright
