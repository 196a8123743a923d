// SPDX-License-Identifier: GPL-3.0-or-later
#include "signoff_words.h"

#include "signoff_case.h"
#include "wording.h"

#include <cmath>

namespace rungwright
{

namespace
{

QString wholeNumber(std::size_t count) { return numberText(static_cast<double>(count), 0); }

QString joinedSentences(const QString& first, const QString& second)
{
    return second.isEmpty() ? first : first + QLatin1Char(' ') + second;
}

} // namespace

QString SignOffWords::ladderName(const TierCase& tierCase, int candidate)
{
    return candidate < 0 ? tr("current") : QString::fromStdString(tierCase.candidates[static_cast<std::size_t>(candidate)].name);
}

QString SignOffWords::checkName(CheckKind kind)
{
    switch (kind) {
    case CheckKind::floorOnSale:
        return tr("Advertised floor on sale now");
    case CheckKind::shareAtFloor:
        return tr("Share on offer at the floor");
    case CheckKind::floorStays:
        return tr("How long the floor stays on sale");
    case CheckKind::inversions:
        return tr("Inversions of grade");
    case CheckKind::changesByRule:
        return tr("Changes within the price rules");
    case CheckKind::totalByRule:
        return tr("Change of the asking total");
    case CheckKind::belowFloor:
        return tr("Units below the floor");
    }
    return {};
}

QString SignOffWords::outcome(ClaimOutcome outcome)
{
    switch (outcome) {
    case ClaimOutcome::holds:
        return tr("holds");
    case ClaimOutcome::lookAtThis:
        return tr("look at this");
    case ClaimOutcome::notChecked:
        return tr("not checked");
    }
    return {};
}

QString SignOffWords::outcomeSign(ClaimOutcome outcome)
{
    switch (outcome) {
    case ClaimOutcome::holds:
        return QStringLiteral("✓");
    case ClaimOutcome::lookAtThis:
        return QStringLiteral("⚠");
    case ClaimOutcome::notChecked:
        return QStringLiteral("–");
    }
    return {};
}

QString SignOffWords::units(std::size_t count) { return count == 1 ? tr("1 unit") : tr("%1 units").arg(wholeNumber(count)); }

QString SignOffWords::whyNot(const Check& check)
{
    switch (check.why) {
    case NotChecked::no:
        break;
    case NotChecked::noFloor:
        return tr("No advertised floor is known for this tier.");
    case NotChecked::nothingOnOffer:
        return tr("Nothing is on offer.");
    case NotChecked::noLeastShare:
        return tr("The price rules set no least share.");
    case NotChecked::noLeastTime:
        return tr("No least part of the time is set.");
    case NotChecked::floorNotOnSale:
        return tr("Nothing is on sale at the floor that could stay.");
    case NotChecked::loadUnknown:
        return tr("The tier is full or empty, so how busy it is cannot be inferred, and it has not been simulated.");
    case NotChecked::noGrades:
        return tr("Fewer than two units on offer have a grade.");
    case NotChecked::noRules:
        return tr("No price rule is set and no unit is locked.");
    case NotChecked::noTotalRule:
        return tr("The price rules set no limit to the total.");
    }
    return {};
}

QString SignOffWords::whyShare(const Check& check, Price floor, const Currency& currency)
{
    const QString seen =
        tr("%1 of %2 on offer at or below %3, that is %4")
            .arg(wholeNumber(check.count), wholeNumber(check.of), moneyText(floor, currency), percentText(*check.value, true));
    return check.limit ? tr("%1; the rules ask for at least %2.").arg(seen, percentText(*check.limit, true)) : tr("%1.").arg(seen);
}

QString SignOffWords::whyStays(const Check& check)
{
    QString seen = tr("By cheapest-first turnover a unit at the floor is on offer %1 of the time").arg(percentText(*check.value, true));
    seen = check.limit ? tr("%1; at least %2 is wanted.").arg(seen, percentText(*check.limit, true)) : tr("%1.").arg(seen);
    QString wait;
    if (*check.untilGone > 1000)
        wait = tr("From today, the last of them is expected to stay for more than a thousand mean stays.");
    else
        wait =
            tr("From today, the last of them is expected to be gone after %1 mean stays of a tenant (for one year of mean stay: %2 weeks).")
                .arg(numberText(*check.untilGone, *check.untilGone < 0.1 ? 3 : 2), numberText(52.18 * *check.untilGone, 1));
    return joinedSentences(seen, joinedSentences(wait, tr("Not simulated: seasons and choices other than the cheapest are left out.")));
}

QString SignOffWords::whyTotal(const Check& check, const Currency& currency)
{
    QString seen = check.price == Price{} ? tr("The asking total on offer does not change")
                                          : tr("The asking total on offer changes by %1 (%2%3)")
                                                .arg(signedMoneyText(inMinor(*check.price), currency),
                                                     *check.value > 0 ? QStringLiteral("+") : QString(), percentText(*check.value, true));
    QStringList limits;
    if (check.limit)
        limits << percentText(*check.limit, true);
    if (check.priceLimit)
        limits << moneyText(*check.priceLimit, currency);
    return limits.isEmpty() ? tr("%1.").arg(seen) : tr("%1; the rules allow %2.").arg(seen, limits.join(tr(" and ")));
}

QString SignOffWords::why(const Check& check, Price floor, const Currency& currency)
{
    QString seen;
    const QString not_ = whyNot(check);
    switch (check.kind) {
    case CheckKind::floorOnSale:
        if (!not_.isEmpty())
            return not_;
        if (check.of == 0)
            return tr("Nothing is on offer, so the advertised %1 is not on sale.").arg(moneyText(floor, currency));
        if (check.count == 0)
            return tr("The cheapest on offer asks %1; %2 is advertised.")
                .arg(moneyText(*check.price, currency), moneyText(floor, currency));
        return tr("%1 on offer at or below %2.").arg(units(check.count), moneyText(floor, currency));
    case CheckKind::shareAtFloor:
        return check.value ? joinedSentences(whyShare(check, floor, currency), not_) : not_;
    case CheckKind::floorStays:
        return check.value ? joinedSentences(whyStays(check), not_) : not_;
    case CheckKind::totalByRule:
        return check.value ? joinedSentences(whyTotal(check, currency), not_) : not_;
    case CheckKind::inversions:
        if (!not_.isEmpty())
            return not_;
        if (check.count == 0)
            return tr("No unit on offer of higher grade is asked for less than one of lower grade.");
        seen = check.count == 1 ? tr("One pair on offer has the higher grade at the lower price")
                                : tr("%1 pairs on offer have the higher grade at the lower price").arg(wholeNumber(check.count));
        return tr("%1; today there are %2.").arg(seen, wholeNumber(check.before));
    case CheckKind::changesByRule:
        if (!not_.isEmpty())
            return not_;
        if (check.of == 0)
            return tr("No price changes.");
        if (check.count == 0)
            return tr("All %1 that change keep the price rules.").arg(units(check.of));
        return tr("%1 of the %2 new prices break a rule; the table says which.").arg(wholeNumber(check.count), wholeNumber(check.of));
    case CheckKind::belowFloor:
        if (!not_.isEmpty())
            return not_;
        if (check.count == 0)
            return tr("No unit on offer is asked below the advertised floor.");
        return tr("%1 on offer below the floor (today %2). That is legal; the advert could say less.")
            .arg(units(check.count), wholeNumber(check.before));
    }
    return {};
}

QString SignOffWords::broken(const RuleBreach& breach)
{
    switch (breach.bound) {
    case Bound::lock:
        return tr("locked");
    case Bound::changePercent:
        return tr("greatest change, percent");
    case Bound::changeMoney:
        return tr("greatest change, money");
    case Bound::ceiling:
        return tr("above the ceiling");
    case Bound::least:
        return tr("below the lowest price");
    case Bound::leastPoint:
        return tr("below the price points");
    case Bound::greatestPoint:
        return tr("above the price points");
    default:
        return tr("no price point");
    }
}

QString SignOffWords::keySentence(const SignOffCase& c)
{
    QString gap;
    if (c.before.gap.gap && c.after.gap.gap) {
        const double was = *c.before.gap.gap;
        const double is = *c.after.gap.gap;
        const QString now = moneyText(is, c.currency);
        if (moneyText(was, c.currency) == now)
            gap = tr("The gap stays at %1.").arg(now);
        else
            gap = is < was ? tr("The gap narrows from %1 to %2.").arg(moneyText(was, c.currency), now)
                           : tr("The gap widens from %1 to %2.").arg(moneyText(was, c.currency), now);
    } else {
        gap = c.after.odds.note ? oddsNoteText(*c.after.odds.note) : tr("The gap is not defined.");
    }
    if (c.change.unitsChanged == 0)
        return tr("%1 No price changes.").arg(gap);
    const QString total =
        c.change.askingTotal
            ? tr("the asking total on offer changes by %1").arg(signedMoneyText(inMinor(*c.change.askingTotal), c.currency))
            : tr("nothing is on offer");
    return tr("%1 New prices for %2 of %3 units; %4.")
        .arg(gap, wholeNumber(c.change.unitsChanged), wholeNumber(c.tier.units.size()),
             c.change.askingTotal == Price{} ? tr("the asking total on offer stays") : total);
}

QString SignOffWords::model(const SignOffCase& c)
{
    const QString name = modelName(c.model.kind);
    const auto left = c.after.odds.left;
    if (!takesLeft(c.model.kind) || !left)
        return name;
    return *left == 1 ? tr("%1, 1 unit left").arg(name) : tr("%1, %2 units left").arg(name, numberText(*left, 0));
}

} // namespace rungwright
