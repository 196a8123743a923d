// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape_words.h"

#include "wording.h"

#include <QCoreApplication>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

QString reshapeTr(const char* text) { return QCoreApplication::translate("ReshapeWords", text); }

QString unitNamed(const Tier& tier, std::uint32_t unit) { return QString::fromStdString(tier.units[unit].name); }

/// The gap or the share that can be had at best.
QString reachText(double reach, TargetKind kind, const Currency& currency, const QLocale& locale)
{
    if (kind == TargetKind::floorMet)
        return percentText(reach, true, locale);
    return moneyText(reach, currency, locale);
}

QString totalObstacle(const LeastChangeAnswer& answer, const Currency& currency, const QLocale& locale)
{
    const QString range = reshapeTr("order and rules allow %1 to %2")
                              .arg(moneyText(answer.leastTotal, currency, locale), moneyText(answer.mostTotal, currency, locale));
    if (answer.wantedTotal == Price{})
        return reshapeTr("The asking total cannot stay as near to today's: %1.").arg(range);
    return reshapeTr("The asking total cannot be %1: %2.").arg(moneyText(answer.wantedTotal, currency, locale), range);
}

QString targetObstacle(const LeastChangeAnswer& answer, const Tier& tier, const ChangeWish& wish, const Currency& currency,
                       const QLocale& locale)
{
    if (!answer.nearestTarget)
        return reshapeTr("No ladder within order, rules and asking total reaches this target.");
    if (wish.target.kind == TargetKind::floorMet)
        return reshapeTr("The floor can be met by at most %1 of enquirers.").arg(percentText(*answer.nearestTarget, true, locale));
    const QString smallest = moneyText(*answer.nearestTarget, currency, locale);
    if (wish.target.kind == TargetKind::gap)
        return reshapeTr("The smallest gap reachable is %1.").arg(smallest);
    return reshapeTr("The smallest gap reachable is %1, %2 of the floor.")
        .arg(smallest, percentText(*answer.nearestTarget / inMinor(tier.advertisedFloor), true, locale));
}

} // namespace

QString targetText(const ChangeTarget& target, const Currency& currency, const QLocale& locale)
{
    switch (target.kind) {
    case TargetKind::none:
        break;
    case TargetKind::gap:
        return reshapeTr("gap at most %1").arg(moneyText(target.value, currency, locale));
    case TargetKind::gapShare:
        return reshapeTr("gap at most %1 of the floor").arg(percentText(target.value, true, locale));
    case TargetKind::floorMet:
        return reshapeTr("floor met by at least %1 of enquirers").arg(percentText(target.value, true, locale));
    }
    return reshapeTr("order and total as wished");
}

QString leastChangeName(const ChangeTarget& target, const Currency& currency, const QLocale& locale)
{
    return reshapeTr("Least change: %1").arg(targetText(target, currency, locale));
}

QString obstacleText(const LeastChangeAnswer& answer, const Tier& tier, const ChangeWish& wish, const Currency& currency,
                     const QLocale& locale)
{
    switch (answer.obstacle) {
    case Obstacle::none:
        return {};
    case Obstacle::order:
        return reshapeTr("%1 and %2 cannot keep their rules and the order at once: the first may not go as low as the second must.")
            .arg(unitNamed(tier, answer.conflict.lower), unitNamed(tier, answer.conflict.upper));
    case Obstacle::total:
        return totalObstacle(answer, currency, locale);
    case Obstacle::target:
        return targetObstacle(answer, tier, wish, currency, locale);
    case Obstacle::noOdds:
        return answer.note ? oddsNoteText(*answer.note) : reshapeTr("The availability model has no answer for this tier.");
    case Obstacle::noFloor:
        return reshapeTr("No advertised floor is known, so there is no gap to aim at.");
    case Obstacle::pricePoints:
        return reshapeTr("There is such a ladder, but none on the price points.");
    case Obstacle::shareAtFloor:
        return reshapeTr("The rules want %1 units at the advertised floor; only %2 of them can come down to it.")
            .arg(answer.wantedAtFloor)
            .arg(answer.reachFloor);
    }
    return {};
}

QStringList easingTexts(const LeastChangeAnswer& answer, const ChangeWish& wish, const Currency& currency, const QLocale& locale)
{
    QStringList texts;
    for (const Easing& easing : answer.easings) {
        const std::string_view words = familyPhrase(easing.family);
        const QString phrase = QString::fromUtf8(words.data(), static_cast<qsizetype>(words.size()));
        const QString reach = reachText(easing.reach, wish.target.kind, currency, locale);
        const bool share = wish.target.kind == TargetKind::floorMet;
        if (answer.obstacle == Obstacle::total)
            texts << reshapeTr("Without %1 it could be %2.").arg(phrase, moneyText(easing.reach, currency, locale));
        else if (answer.obstacle == Obstacle::shareAtFloor)
            texts << reshapeTr("Without %1 it would be %2.").arg(phrase).arg(static_cast<int>(easing.reach));
        else if (answer.obstacle != Obstacle::target)
            continue;
        else if (!share && easing.reach < 0.5 && easing.family != RuleFamily::total) // How far below the floor tells nobody anything.
            texts << reshapeTr("Without %1 there need be no gap.").arg(phrase);
        else if (easing.family == RuleFamily::total)
            texts << (share ? reshapeTr("With the asking total free it could be %1.")
                            : reshapeTr("With the asking total free the gap could be %1."))
                         .arg(reach);
        else
            texts << (share ? reshapeTr("Without %1 it could be %2.") : reshapeTr("Without %1 the gap could be %2.")).arg(phrase, reach);
    }
    return texts;
}

std::optional<ChangeTarget> nearestTarget(const LeastChangeAnswer& answer, const Tier& tier, const ChangeWish& wish)
{
    if (answer.obstacle != Obstacle::target || !answer.nearestTarget)
        return {};
    const double reach = *answer.nearestTarget;
    // A hair, so that what is whole but for its rounding stays so.
    switch (wish.target.kind) {
    case TargetKind::none:
        break;
    case TargetKind::gap:
        return ChangeTarget{TargetKind::gap, std::ceil(reach - 1e-6)};
    case TargetKind::gapShare:
        return ChangeTarget{TargetKind::gapShare, std::ceil(1000 * reach / inMinor(tier.advertisedFloor) - 1e-6) / 1000};
    case TargetKind::floorMet: {
        const double share = std::floor(1000 * reach + 1e-6) / 1000;
        return share > 0 ? std::optional(ChangeTarget{TargetKind::floorMet, share}) : std::nullopt;
    }
    }
    return {};
}

QString roundingText(const LeastChangeAnswer& answer, const Currency& currency, const QLocale& locale)
{
    if (answer.obstacle != Obstacle::none)
        return {};
    QStringList said;
    if (answer.cost > answer.leastCost * (1 + 5e-4) && answer.leastCost > 0)
        said << reshapeTr("Rounding to price points costs %1 more than the best without them.")
                    .arg(percentText(answer.cost / answer.leastCost - 1, true, locale));
    else if (answer.cost > 0 && answer.leastCost <= 0)
        said << reshapeTr("Only the price points ask for these changes.");
    else if (answer.changed > 0)
        said << (answer.cost <= answer.leastCost * (1 + 1e-9) ? reshapeTr("Rounding to price points costs nothing.")
                                                              : reshapeTr("Rounding to price points costs next to nothing."));
    if (!answer.targetMet)
        said << reshapeTr("The price points leave the target just out of reach.");
    if (answer.totalMiss != Price{})
        said << reshapeTr("They leave the asking total %1 off.").arg(signedMoneyText(inMinor(answer.totalMiss), currency, locale));
    return said.join(QLatin1Char(' '));
}

} // namespace rungwright
