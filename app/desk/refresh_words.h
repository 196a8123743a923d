// SPDX-License-Identifier: GPL-3.0-or-later
// A refresh in words: what a person reads before they say yes.
#pragma once

#include "refresh.h"

#include <QString>

#include <functional>

namespace rungwright
{

/// "The list changes 34 units in 5 of 12 tiers." and what must be said beside it, in one to three plain sentences.
QString refreshSentence(const RefreshPlan& plan);

/// "newly let", "asking price raised", ...: for one line; `refreshCountText` for many: "3 units newly let", "41 asking prices raised, by
/// 82.00 in all".
QString refreshKindText(RefreshKind kind);
QString refreshCountText(const RefreshPlan& plan, RefreshKind kind, const Currency& currency);

/// What a line's row shows. Empty where there is nothing to show.
struct RefreshLineText {
    QString site;
    QString tier; ///< Where it is now, or was when it is gone.
    QString unit; ///< Empty for a tier as a whole.
    QString before;
    QString after;
};
/// How amounts are written.
using MoneyWords = std::function<QString(Price)>;
RefreshLineText refreshLineText(const RefreshPlan& plan, const RefreshLine& line, const MoneyWords& money);

/// "3 price changes kept", "2 clash with the list", ...
QString changeFateCountText(const RefreshPlan& plan, ChangeFate fate);
/// What becomes of all candidates: one or two sentences; empty when there is none.
QString candidatesSentence(const RefreshPlan& plan);

/// "applied", "partly: 3 of 5", "not applied", ...
QString signedStateText(const SignedCheck& check);
/// What became of all sheets handed over, in one sentence; empty when there is none.
QString signedSentence(const std::vector<SignedTier>& tiers);

} // namespace rungwright
