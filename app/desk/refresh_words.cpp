// SPDX-License-Identifier: GPL-3.0-or-later
#include "refresh_words.h"

#include "plot_words.h"
#include "wording.h"
#include "words.h"

#include <QStringList>

namespace rungwright
{

namespace
{

QString wordOfUtf8(const std::string& text) { return QString::fromStdString(text); }

QString counted(std::int64_t count) { return numberText(static_cast<double>(count), 0); }

/// `one` for exactly one, else `many` with the number in place of %1.
QString plural(std::int64_t count, const QString& one, const QString& many) { return count == 1 ? one : many.arg(counted(count)); }

QString unitsAndMore(const TierCase& tierCase)
{
    QStringList parts{plural(static_cast<std::int64_t>(tierCase.tier.units.size()), Words::tr("1 unit"), Words::tr("%1 units"))};
    if (!tierCase.candidates.empty())
        parts << plural(static_cast<std::int64_t>(tierCase.candidates.size()), Words::tr("1 candidate"), Words::tr("%1 candidates"));
    if (!tierCase.note.empty())
        parts << Words::tr("a note");
    return parts.join(QStringLiteral(", "));
}

/// The value that a line is about, of one side.
QString unitValue(RefreshKind kind, const Unit& unit, const MoneyWords& money)
{
    switch (kind) {
    case RefreshKind::newUnit:
    case RefreshKind::unitGone:
        return Words::tr("%1, %2").arg(money(unit.asking), statusText(unit.status));
    case RefreshKind::newlyLet:
    case RefreshKind::newlyFree:
    case RefreshKind::otherStatus:
        return statusText(unit.status);
    case RefreshKind::raised:
    case RefreshKind::lowered:
        return money(unit.asking);
    case RefreshKind::newGrade:
        return unit.grade ? QString::number(*unit.grade) : undefinedText();
    case RefreshKind::newArea:
        return unit.areaM2 ? Words::tr("%1 m²").arg(numberText(*unit.areaM2)) : undefinedText();
    case RefreshKind::newChance:
        return unit.vacancyChance ? percentText(*unit.vacancyChance, true) : undefinedText();
    case RefreshKind::locked:
        return unit.locked ? Words::tr("locked") : Words::tr("not locked");
    default:
        return {};
    }
}

QString tierValue(RefreshKind kind, const TierCase& tierCase, const MoneyWords& money)
{
    switch (kind) {
    case RefreshKind::newTier:
    case RefreshKind::tierGone:
        return unitsAndMore(tierCase);
    case RefreshKind::floorChanged:
        return tierCase.tier.hasFloor() ? money(tierCase.tier.advertisedFloor) : undefinedText();
    case RefreshKind::movedTier:
        return wordOfUtf8(tierCase.tier.name);
    default:
        return {};
    }
}

} // namespace

QString refreshSentence(const RefreshPlan& plan)
{
    QStringList said;
    const auto stay = static_cast<std::int64_t>(plan.before.size()) - plan.count(RefreshKind::tierGone);
    if (plan.changesNothing()) {
        said << Words::tr("The list says what the scenario says already: no unit, price or floor changes.");
    } else {
        const std::int64_t gone = plan.count(RefreshKind::tierGone);
        const std::int64_t fresh = plan.count(RefreshKind::newTier);
        const QString tiers = plural(stay, Words::tr("1 tier"), Words::tr("%1 tiers"));
        if (stay == 0)
            said << Words::tr("The list names none of the tiers there are: is it of other sites?");
        else if (plan.tiersTouched == 0)
            said << Words::tr("Nothing changes in the %1 that stay.").arg(tiers);
        else if (gone > 0)
            said << Words::tr("The list changes something in %1 of %2 that stay.").arg(counted(plan.tiersTouched), tiers);
        else
            said << Words::tr("The list changes something in %1 of %2.").arg(counted(plan.tiersTouched), tiers);
        if (gone > 0)
            said << plural(gone, Words::tr("1 tier leaves."), Words::tr("%1 tiers leave."));
        if (fresh > 0)
            said << plural(fresh, Words::tr("1 tier is new."), Words::tr("%1 tiers are new."));
        if (plan.unitsBefore != plan.unitsAfter)
            said << Words::tr("Units: %1 today, %2 then.").arg(counted(plan.unitsBefore), counted(plan.unitsAfter));
    }
    if (plan.takesCurrency)
        said << Words::tr("The scenario names no currency so far and takes the list’s: %1.").arg(wordOfUtf8(plan.currency.code));
    if (plan.seenCleared > 0)
        said << plural(plan.seenCleared, Words::tr("One tier marked as seen is to be looked at again."),
                       Words::tr("%1 tiers marked as seen are to be looked at again."));
    return said.join(u' ');
}

QString refreshKindText(RefreshKind kind)
{
    switch (kind) {
    case RefreshKind::newTier:
        return Words::tr("new tier");
    case RefreshKind::tierGone:
        return Words::tr("tier gone");
    case RefreshKind::newUnit:
        return Words::tr("new unit");
    case RefreshKind::unitGone:
        return Words::tr("unit gone");
    case RefreshKind::movedTier:
        return Words::tr("moved to another tier");
    case RefreshKind::newlyLet:
        return Words::tr("newly let");
    case RefreshKind::newlyFree:
        return Words::tr("newly free");
    case RefreshKind::otherStatus:
        return Words::tr("other status");
    case RefreshKind::raised:
        return Words::tr("price raised");
    case RefreshKind::lowered:
        return Words::tr("price lowered");
    case RefreshKind::floorChanged:
        return Words::tr("floor changed");
    case RefreshKind::newGrade:
        return Words::tr("grade changed");
    case RefreshKind::newArea:
        return Words::tr("area changed");
    case RefreshKind::newChance:
        return Words::tr("vacancy chance changed");
    case RefreshKind::locked:
        return Words::tr("locked by the list");
    }
    return {};
}

QString refreshCountText(const RefreshPlan& plan, RefreshKind kind, const Currency& currency)
{
    const std::int64_t count = plan.count(kind);
    const auto of = [&](const QString& one, const QString& many) { return plural(count, one, many); };
    const auto by = [&](Price sum) { return count == 0 ? QString() : Words::tr(", by %1 in all").arg(moneyText(sum, currency)); };
    switch (kind) {
    case RefreshKind::newTier:
        return of(Words::tr("1 new tier"), Words::tr("%1 new tiers"));
    case RefreshKind::tierGone:
        return of(Words::tr("1 tier gone"), Words::tr("%1 tiers gone"));
    case RefreshKind::newUnit:
        return of(Words::tr("1 new unit"), Words::tr("%1 new units"));
    case RefreshKind::unitGone:
        return of(Words::tr("1 unit gone"), Words::tr("%1 units gone"));
    case RefreshKind::movedTier:
        return of(Words::tr("1 unit moved to another tier"), Words::tr("%1 units moved to another tier"));
    case RefreshKind::newlyLet:
        return of(Words::tr("1 unit newly let"), Words::tr("%1 units newly let"));
    case RefreshKind::newlyFree:
        return of(Words::tr("1 unit newly free"), Words::tr("%1 units newly free"));
    case RefreshKind::otherStatus:
        return of(Words::tr("1 other status"), Words::tr("%1 other statuses"));
    case RefreshKind::raised:
        return of(Words::tr("1 price raised"), Words::tr("%1 prices raised")) + by(plan.raisedBy);
    case RefreshKind::lowered:
        return of(Words::tr("1 price lowered"), Words::tr("%1 prices lowered")) + by(plan.loweredBy);
    case RefreshKind::floorChanged:
        return of(Words::tr("1 floor changed"), Words::tr("%1 floors changed"));
    case RefreshKind::newGrade:
        return of(Words::tr("1 grade changed"), Words::tr("%1 grades changed"));
    case RefreshKind::newArea:
        return of(Words::tr("1 area changed"), Words::tr("%1 areas changed"));
    case RefreshKind::newChance:
        return of(Words::tr("1 vacancy chance changed"), Words::tr("%1 vacancy chances changed"));
    case RefreshKind::locked:
        return of(Words::tr("1 unit locked by the list"), Words::tr("%1 units locked by the list"));
    }
    return {};
}

RefreshLineText refreshLineText(const RefreshPlan& plan, const RefreshLine& line, const MoneyWords& money)
{
    const auto tierCase = [](const TierList& tiers, int tier) { return tier < 0 ? nullptr : &tiers[static_cast<std::size_t>(tier)]; };
    const auto unit = [](const TierCase* of, int index) { return index < 0 ? nullptr : &of->tier.units[static_cast<std::size_t>(index)]; };
    const TierCase* before = tierCase(plan.before, line.tierBefore);
    const TierCase* after = tierCase(plan.after, line.tierAfter);
    const Unit* unitBefore = unit(before, line.unitBefore);
    const Unit* unitAfter = unit(after, line.unitAfter);
    const TierCase* shown = after ? after : before;
    const Unit* shownUnit = unitAfter ? unitAfter : unitBefore;
    const auto value = [&](const TierCase* of, const Unit* one) {
        if (!of)
            return QString();
        return one && line.kind != RefreshKind::movedTier ? unitValue(line.kind, *one, money) : tierValue(line.kind, *of, money);
    };
    return {wordOfUtf8(shown->tier.site), wordOfUtf8(shown->tier.name), shownUnit ? wordOfUtf8(shownUnit->name) : QString(),
            value(before, unitBefore), value(after, unitAfter)};
}

QString changeFateCountText(const RefreshPlan& plan, ChangeFate fate)
{
    const auto of = [&](const QString& one, const QString& many) { return plural(plan.count(fate), one, many); };
    switch (fate) {
    case ChangeFate::kept:
        return of(Words::tr("1 price change kept"), Words::tr("%1 price changes kept"));
    case ChangeFate::clash:
        return of(Words::tr("1 kept, clashes with the list"), Words::tr("%1 kept, clash with the list"));
    case ChangeFate::nowAsked:
        return of(Words::tr("1 asked by the list now"), Words::tr("%1 asked by the list now"));
    case ChangeFate::unitGone:
        return of(Words::tr("1 dropped, unit gone"), Words::tr("%1 dropped, unit gone"));
    case ChangeFate::unitMoved:
        return of(Words::tr("1 dropped, unit moved"), Words::tr("%1 dropped, unit moved"));
    case ChangeFate::tierDropped:
        return of(Words::tr("1 dropped, tier gone"), Words::tr("%1 dropped, tier gone"));
    }
    return {};
}

QString candidatesSentence(const RefreshPlan& plan)
{
    if (plan.candidates.empty())
        return {};
    std::int64_t leave = 0;
    for (const CandidateOutcome& outcome : plan.candidates)
        leave += outcome.tierAfter < 0 ? 1 : 0;
    const auto all = static_cast<std::int64_t>(plan.candidates.size());
    QString said = leave == 0 ? plural(all, Words::tr("The one candidate stays."), Words::tr("All %1 candidates stay."))
                              : Words::tr("%1 of %2 leave with their tiers.")
                                    .arg(counted(leave), plural(all, Words::tr("1 candidate"), Words::tr("%1 candidates")));
    const std::int64_t dropped = plan.count(ChangeFate::unitGone) + plan.count(ChangeFate::unitMoved) + plan.count(ChangeFate::tierDropped);
    QStringList parts;
    const auto part = [&](std::int64_t count, const QString& one, const QString& many) {
        if (count > 0)
            parts << plural(count, one, many);
    };
    part(plan.count(ChangeFate::kept), Words::tr("1 is kept"), Words::tr("%1 are kept"));
    part(plan.count(ChangeFate::clash), Words::tr("1 is kept and clashes with the list"), Words::tr("%1 are kept and clash with the list"));
    part(plan.count(ChangeFate::nowAsked), Words::tr("1 is asked by the list now"), Words::tr("%1 are asked by the list now"));
    part(dropped, Words::tr("1 is dropped"), Words::tr("%1 are dropped"));
    if (!parts.isEmpty())
        said += u' ' + Words::tr("Of the price changes made in them, %1.").arg(parts.join(QStringLiteral(", ")));
    return said;
}

QString signedStateText(const SignedCheck& check)
{
    using State = SignedCheck::State;
    switch (check.state) {
    case State::nothingSigned:
        return Words::tr("nothing to apply");
    case State::applied:
        return Words::tr("applied");
    case State::partly:
        return Words::tr("partly: %1 of %2").arg(counted(check.applied), counted(check.wanted));
    case State::notApplied:
        return Words::tr("not applied");
    case State::cannotTell:
        return Words::tr("cannot be told: the units are gone");
    }
    return {};
}

QString signedSentence(const std::vector<SignedTier>& tiers)
{
    if (tiers.empty())
        return {};
    using State = SignedCheck::State;
    const auto count = [&](State state) {
        std::int64_t found = 0;
        for (const SignedTier& tier : tiers)
            found += tier.check.state == state ? 1 : 0;
        return found;
    };
    const std::pair<State, QString> parts[] = {{State::applied, Words::tr("%1 applied")},
                                               {State::partly, Words::tr("%1 applied in part")},
                                               {State::notApplied, Words::tr("%1 not applied")},
                                               {State::cannotTell, Words::tr("%1 cannot be told")},
                                               {State::nothingSigned, Words::tr("%1 without a change to apply")}};
    QStringList said;
    for (const auto& [state, words] : parts) {
        if (const std::int64_t found = count(state))
            said << words.arg(counted(found));
    }
    return Words::tr("Of %1 handed over: %2.")
        .arg(plural(static_cast<std::int64_t>(tiers.size()), Words::tr("1 price sheet"), Words::tr("%1 price sheets")),
             said.join(QStringLiteral(", ")));
}

} // namespace rungwright
