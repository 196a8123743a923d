// SPDX-License-Identifier: GPL-3.0-or-later
// Invented tiers: prices of a chosen shape, taken units, grades, and candidates that keep the scenario's rules.
#pragma once

#include "dice.h"
#include "scenario.h"

#include <functional>
#include <string>
#include <vector>

namespace rungwright::samples
{

/// What a made-up tier is to look like.
struct TierPlan {
    std::string site;
    std::string name;
    std::string prefix; ///< Of the unit names: "B-" gives B-01, B-02, ...
    int units = 0;      ///< All of them, closed ones included.
    int onOffer = 0;
    int closed = 0;
    int reserved = 0;
    Price floor;
    Price lowest; ///< Cheapest rung; above the floor when the advert is not even on the ladder.
    Price highest;
    double bend = 1;       ///< price = lowest + (highest - lowest) * u^bend: below 1 crowds near the top, above 1 near the bottom.
    Price step{50};        ///< All prices are multiples of it.
    double cheapFirst = 3; ///< 0: taken units lie anywhere; the larger, the surer the cheap ones are the taken ones.
    Price vacantFrom{};    ///< Every unit asked less is among the taken ones.
    int grades = 0;        ///< 0: no grades; else 1..grades, rising with the price ...
    int inverted = 0;      ///< ... but for so many units, whose grade is thrown anew.
    double areaM2 = 0;     ///< About this, a little different from unit to unit; 0: not known.
};

TierCase makeTier(const TierPlan& plan, Dice& dice);

/// "Lower the low end": the cheapest `count` units on offer are brought down towards the floor, the cheapest onto it, as far as the rules
/// let them.
Candidate lowerTheLowEnd(const TierCase& tierCase, int count, const PriceRules& rules);
/// "Even steps": the units on offer are spread evenly from the floor to the dearest of them, as far as the rules let them.
Candidate evenSteps(const TierCase& tierCase, const PriceRules& rules);
/// "A little off the middle": the middle third on offer asks `percent` less, snapped to the price points.
Candidate easeTheMiddle(const TierCase& tierCase, double percent, const PriceRules& rules);

} // namespace rungwright::samples
