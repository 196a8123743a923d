// SPDX-License-Identifier: GPL-3.0-or-later
#include "sample_scenarios.h"
#include "tier_maker.h"

namespace rungwright::samples
{

namespace
{

const char* const kQuay = "Quillmere Quay";
const char* const kMill = "Quillmere Mill";

TierCase quayMiddle(const PriceRules& rules)
{
    Dice dice(6904);
    TierCase made = makeTier({.site = kQuay,
                              .name = "Room 4 m²",
                              .prefix = "B-",
                              .units = 39,
                              .onOffer = 13,
                              .closed = 1,
                              .reserved = 2,
                              .floor = {6900},
                              .lowest = {6900},
                              .highest = {12400},
                              .bend = 0.55,
                              .cheapFirst = 1.2,
                              .vacantFrom = {9000},
                              .grades = 5,
                              .areaM2 = 4},
                             dice);
    made.note = "The rooms at the advertised price went in spring; the advert has not been touched since.";
    made.candidates = {lowerTheLowEnd(made, 4, rules), evenSteps(made, rules), easeTheMiddle(made, 5, rules)};
    return made;
}

TierCase quaySmall()
{
    Dice dice(4201);
    TierCase made = makeTier({.site = kQuay,
                              .name = "Locker 1.5 m²",
                              .prefix = "A-",
                              .units = 48,
                              .onOffer = 21,
                              .floor = {3200},
                              .lowest = {3200},
                              .highest = {4950},
                              .bend = 1.7,
                              .cheapFirst = 0,
                              .grades = 3,
                              .areaM2 = 1.5},
                             dice);
    made.note = "Plenty of lockers near the advertised price.";
    return made;
}

TierCase quayLarge(const PriceRules& rules)
{
    Dice dice(777);
    TierCase made = makeTier({.site = kQuay,
                              .name = "Room 9 m²",
                              .prefix = "C-",
                              .units = 34,
                              .onOffer = 10,
                              .closed = 2,
                              .reserved = 1,
                              .floor = {12900},
                              .lowest = {12900},
                              .highest = {18450},
                              .bend = 0.9,
                              .cheapFirst = 3,
                              .vacantFrom = {13900},
                              .grades = 4,
                              .areaM2 = 9},
                             dice);
    made.note = "The advertised price is not on sale at present.";
    made.candidates = {lowerTheLowEnd(made, 3, rules)};
    return made;
}

TierCase millSmall()
{
    Dice dice(52);
    TierCase made = makeTier({.site = kMill,
                              .name = "Room 3 m²",
                              .prefix = "G-",
                              .units = 52,
                              .onOffer = 3,
                              .reserved = 1,
                              .floor = {5400},
                              .lowest = {5400},
                              .highest = {7900},
                              .bend = 1,
                              .cheapFirst = 1,
                              .vacantFrom = {5700},
                              .grades = 3,
                              .areaM2 = 3},
                             dice);
    made.note = "Nearly full.";
    return made;
}

TierCase millMiddle(const PriceRules& rules)
{
    Dice dice(60);
    TierCase made = makeTier({.site = kMill,
                              .name = "Room 6 m²",
                              .prefix = "H-",
                              .units = 43,
                              .onOffer = 17,
                              .reserved = 2,
                              .floor = {8900},
                              .lowest = {8900},
                              .highest = {13200},
                              .bend = 1.1,
                              .cheapFirst = 0.8,
                              .grades = 5,
                              .inverted = 12,
                              .areaM2 = 6},
                             dice);
    made.note = "Prices and grades have drifted apart over the years.";
    made.candidates = {evenSteps(made, rules)};
    return made;
}

TierCase millLarge()
{
    Dice dice(12);
    TierCase made = makeTier({.site = kMill,
                              .name = "Room 12 m²",
                              .prefix = "J-",
                              .units = 24,
                              .onOffer = 9,
                              .floor = {15900},
                              .lowest = {15900},
                              .highest = {24500},
                              .bend = 0.8,
                              .cheapFirst = 1.5,
                              .grades = 4,
                              .areaM2 = 12},
                             dice);
    // Two corner rooms are let under a promise that their price stays.
    made.tier.units[3].locked = true;
    made.tier.units[11].locked = true;
    return made;
}

} // namespace

Scenario storageSample()
{
    Scenario scenario;
    scenario.currency = {"EUR", 2};
    scenario.title = "Quillmere Storage (invented)";
    scenario.note = "An invented operator with two invented sites. Every name, unit and price here is made up. Prices are per month.";
    scenario.rules.points.step = {50};
    scenario.rules.greatestChangePercent = 25;
    scenario.tiers = {quaySmall(), quayMiddle(scenario.rules), quayLarge(scenario.rules),
                      millSmall(), millMiddle(scenario.rules), millLarge()};
    return scenario;
}

} // namespace rungwright::samples
