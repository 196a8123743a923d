// SPDX-License-Identifier: GPL-3.0-or-later
// The checks and what is signed, in words.
#pragma once

#include "claims/checks.h"
#include "ladder/currency.h"

#include <QCoreApplication>
#include <QString>
#include <QStringList>

namespace rungwright
{

struct SignOffCase;
struct TierCase;

class SignOffWords
{
    Q_DECLARE_TR_FUNCTIONS(rungwright::SignOffWords)

public:
    /// "current", or the candidate's name.
    static QString ladderName(const TierCase& tierCase, int candidate);
    /// "Floor on sale now", "Inversions of grade", ...
    static QString checkName(CheckKind kind);
    /// "holds", "look at this", "not checked"; and the sign that stands before it, so that the three differ in shape too.
    static QString outcome(ClaimOutcome outcome);
    static QString outcomeSign(ClaimOutcome outcome);
    /// Why, in one or two plain sentences, with the figures it was decided on.
    static QString why(const Check& check, Price floor, const Currency& currency);
    /// Which rule a new price breaks, short: "locked", "above the ceiling", "no price point".
    static QString broken(const RuleBreach& breach);
    /// What the ladder does to the gap and to the prices, as the first thing to be read.
    static QString keySentence(const SignOffCase& c);
    /// "Random remainder, 3 units left"
    static QString model(const SignOffCase& c);

private:
    static QString units(std::size_t count);
    static QString whyNot(const Check& check);
    static QString whyShare(const Check& check, Price floor, const Currency& currency);
    static QString whyStays(const Check& check);
    static QString whyTotal(const Check& check, const Currency& currency);
};

} // namespace rungwright
