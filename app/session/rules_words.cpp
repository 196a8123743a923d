// SPDX-License-Identifier: GPL-3.0-or-later
#include "rules_words.h"

#include "wording.h"

#include <QCoreApplication>

namespace rungwright
{

namespace
{

struct RulesWords {
    Q_DECLARE_TR_FUNCTIONS(RulesWords)
};

QString upToPercent(double percent, const QLocale& locale)
{
    return locale.toString(percent, 'g', 6) + QStringLiteral("\u00a0%"); // A space that does not break.
}

} // namespace

QString boundWords(Bound bound, const PriceRules& rules, const Currency& currency, const QLocale& locale)
{
    const auto money = [&](std::optional<Price> price) { return moneyText(price.value_or(Price{}), currency, locale); };
    switch (bound) {
    case Bound::changePercent:
        return RulesWords::tr("greatest change %1").arg(upToPercent(rules.greatestChangePercent.value_or(0), locale));
    case Bound::changeMoney:
        return RulesWords::tr("greatest change %1").arg(money(rules.greatestChange));
    case Bound::ceiling:
        return RulesWords::tr("ceiling %1").arg(money(rules.ceiling));
    case Bound::least:
        return RulesWords::tr("lowest asking price %1").arg(money(rules.least));
    case Bound::leastPoint:
        return rules.points.least ? RulesWords::tr("least price point %1").arg(money(rules.points.least))
                                  : RulesWords::tr("there is no lower price point");
    case Bound::greatestPoint:
        return rules.points.greatest ? RulesWords::tr("greatest price point %1").arg(money(rules.points.greatest))
                                     : RulesWords::tr("there is no higher price point");
    case Bound::totalPercent:
        return RulesWords::tr("greatest change of the asking total %1")
            .arg(upToPercent(rules.greatestTierChangePercent.value_or(0), locale));
    case Bound::totalMoney:
        return RulesWords::tr("greatest change of the asking total %1").arg(money(rules.greatestTierChange));
    case Bound::shareAtFloor:
        return RulesWords::tr("at least %1 of the units on offer at the floor")
            .arg(upToPercent(100 * rules.leastShareAtFloor.value_or(0), locale));
    case Bound::none:
    case Bound::lock:
    case Bound::noPricePoint:
        break;
    }
    const std::string_view reason = boundReason(bound);
    return QString::fromUtf8(reason.data(), static_cast<qsizetype>(reason.size()));
}

QString scopeWords(const RuleScope& scope)
{
    const auto name = [](const std::string& utf8) { return QString::fromUtf8(utf8.data(), static_cast<qsizetype>(utf8.size())); };
    if (scope.site.empty())
        return RulesWords::tr("the whole scenario");
    return scope.tier.empty() ? name(scope.site) : RulesWords::tr("%1 at %2").arg(name(scope.tier), name(scope.site));
}

} // namespace rungwright
