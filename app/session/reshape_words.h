// SPDX-License-Identifier: GPL-3.0-or-later
// What a reshaping aims at, what it reached and what stands in its way, in words: the same on the desk and in commands.
#pragma once

#include "ladder/currency.h"
#include "reshape/least_change.h"

#include <QLocale>
#include <QString>
#include <QStringList>

namespace rungwright
{

/// "gap at most 8.00", "gap at most 5.0 % of the floor", "floor met by at least 40 % of enquirers".
QString targetText(const ChangeTarget& target, const Currency& currency, const QLocale& locale = QLocale());
/// What the ladder is kept under: "Least change: gap at most 8.00"; without a target "Least change: order and total as wished".
QString leastChangeName(const ChangeTarget& target, const Currency& currency, const QLocale& locale = QLocale());

/// Why there is no ladder as wished, in one or two sentences that name what binds and the nearest that can be had; empty when there is one.
QString obstacleText(const LeastChangeAnswer& answer, const Tier& tier, const ChangeWish& wish, const Currency& currency,
                     const QLocale& locale = QLocale());
/// What setting aside a kind of rules would give, a sentence each: "Without the locks the gap could be 7.20."
QStringList easingTexts(const LeastChangeAnswer& answer, const ChangeWish& wish, const Currency& currency,
                        const QLocale& locale = QLocale());
/// The nearest target that can be reached, rounded outwards so that it can be: a gap in minor units goes up to a whole one, shares to the
/// next tenth of a percent (gap share) or down to it (floor met). Nothing unless the obstacle is the target and one is known.
std::optional<ChangeTarget> nearestTarget(const LeastChangeAnswer& answer, const Tier& tier, const ChangeWish& wish);

/// What price points cost against the best ladder without them, in one sentence; and what they leave of target and total, when anything.
QString roundingText(const LeastChangeAnswer& answer, const Currency& currency, const QLocale& locale = QLocale());

} // namespace rungwright
