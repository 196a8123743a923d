// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape_wish.h"

#include "ladder/currency.h"

#include <QStringList>

#include <cmath>

namespace rungwright
{

namespace
{

/// A finite number with a decimal point, a percent sign behind it or not.
std::optional<double> percentOf(QString text)
{
    if (text.endsWith(QLatin1Char('%')))
        text.chop(1);
    bool number = false;
    const double value = text.trimmed().toDouble(&number);
    return number && std::isfinite(value) ? std::optional(value) : std::nullopt;
}

/// More than one option of a group, as a message.
QString clash(const QStringList& given)
{
    return given.size() > 1 ? QStringLiteral("%1 exclude each other").arg(given.join(QStringLiteral(" and "))) : QString();
}

QString readTarget(const OptionValue& text, ReshapeWish& wish)
{
    QStringList given;
    for (const char* name : {"gap", "gap-share", "floor-met"})
        if (text(name))
            given += QStringLiteral("--%1").arg(QLatin1String(name));
    if (given.size() > 1)
        return clash(given);
    wish.gap = text("gap");
    if (const auto typed = text("gap-share")) {
        const auto percent = percentOf(*typed);
        if (!percent || *percent < 0)
            return QStringLiteral("--gap-share wants a percentage of the floor of at least 0, such as 5, found '%1'").arg(*typed);
        wish.target = {TargetKind::gapShare, *percent / 100};
    }
    if (const auto typed = text("floor-met")) {
        const auto percent = percentOf(*typed);
        if (!percent || *percent <= 0 || *percent > 100)
            return QStringLiteral("--floor-met wants a percentage of enquirers above 0 and up to 100, such as 60, found '%1'").arg(*typed);
        wish.target = {TargetKind::floorMet, *percent / 100};
    }
    return {};
}

QString readTotal(const OptionValue& text, const OptionFlag& flag, ReshapeWish& wish)
{
    QStringList given;
    if (flag("hold-total"))
        given += QStringLiteral("--hold-total");
    if (text("total-change"))
        given += QStringLiteral("--total-change");
    if (flag("free-total"))
        given += QStringLiteral("--free-total");
    if (given.size() > 1)
        return clash(given);
    wish.total.free = flag("free-total");
    if (const auto typed = text("total-change")) {
        const auto percent = percentOf(*typed);
        if (!percent || *percent <= -100 || *percent > 1000)
            return QStringLiteral("--total-change wants a percentage above -100 and up to 1000, such as -2.5, found '%1'").arg(*typed);
        wish.total.changePercent = *percent;
    }
    return {};
}

} // namespace

QString readReshapeWish(const OptionValue& text, const OptionFlag& flag, ReshapeWish& wish)
{
    wish.rules = text("rules").value_or(QString());
    wish.sheet = text("sheet").value_or(QString());
    for (const char* name : {"rules", "sheet", "candidate"})
        if (const auto typed = text(name); typed && typed->trimmed().isEmpty())
            return QStringLiteral("--%1 is empty").arg(QLatin1String(name));
    if (text("out").has_value() == text("sheet").has_value())
        return text("out") ? QStringLiteral("--out and --sheet exclude each other")
                           : QStringLiteral("--out, a scenario to write, or --sheet, a price sheet, is missing");
    if (const QString wrong = readTarget(text, wish); !wrong.isEmpty())
        return wrong;
    if (const QString wrong = readTotal(text, flag, wish); !wrong.isEmpty())
        return wrong;
    if (const auto typed = text("order")) {
        if (*typed != QLatin1String("present") && *typed != QLatin1String("grade"))
            return QStringLiteral("--order knows no '%1'; wanted present or grade").arg(*typed);
        wish.order = *typed == QLatin1String("grade") ? OrderKept::grade : OrderKept::present;
    }
    wish.takenStay = flag("taken-stay");
    if (!wish.gap && wish.target.kind == TargetKind::none && wish.total.changePercent == 0 && wish.order != OrderKept::grade &&
        wish.rules.isEmpty())
        return QStringLiteral(
            "nothing is wished for: give a target (--gap, --gap-share or --floor-met), --total-change, --order or --rules");
    return {};
}

Outcome<ChangeTarget> targetOf(const ReshapeWish& wish, const Currency& currency)
{
    if (!wish.gap)
        return wish.target;
    const auto amount = parsePlain(wish.gap->toStdString(), currency);
    if (!amount || amount->minor < 0)
        return Trouble{QStringLiteral("rungwright reshape: --gap wants an amount of %1 of at least 0 with a decimal point, found '%2'")
                           .arg(QString::fromStdString(currency.code), *wish.gap)
                           .toStdString()};
    return ChangeTarget{TargetKind::gap, inMinor(*amount)};
}

} // namespace rungwright
