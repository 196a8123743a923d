// SPDX-License-Identifier: GPL-3.0-or-later
#include "sample_scenarios.h"
#include "tier_maker.h"

namespace rungwright::samples
{

namespace
{

struct Length {
    const char* name;
    const char* prefix;
    int berths;
    std::int64_t summerFloor;
    std::int64_t summerTop;
};

// Boats up to so long; yen a month. A wider berth has the wider range (common practice, no source).
constexpr Length kLengths[]{{"6 m", "K", 36, 18'000, 29'000},
                            {"8 m", "L", 30, 27'000, 46'000},
                            {"11 m", "M", 22, 44'000, 79'000},
                            {"15 m", "N", 9, 78'000, 148'000}};

} // namespace

Scenario berthSample()
{
    Scenario scenario;
    scenario.currency = {"JPY", 0};
    scenario.title = "Kumonoura Haven berths 雲之浦ヘイヴン (invented)";
    scenario.note = "An invented haven with invented berths. Tiers are boat lengths by season: summer (April to October) and winter "
                    "(November to March). "
                    "Yen a month, without decimals.";
    scenario.rules.points.step = {500};
    scenario.rules.greatestChange = Price{12'000};
    Dice dice(20260401);
    for (const Length& length : kLengths) {
        const int summerFree = length.berths / 5 + 1;
        TierCase summer = makeTier({.site = "Kumonoura Haven",
                                    .name = std::string(length.name) + " · summer",
                                    .prefix = std::string(length.prefix) + "-",
                                    .units = length.berths,
                                    .onOffer = summerFree,
                                    .closed = length.berths > 20 ? 1 : 0,
                                    .floor = {length.summerFloor},
                                    .lowest = {length.summerFloor},
                                    .highest = {length.summerTop},
                                    .bend = 0.75,
                                    .step = {500},
                                    .cheapFirst = 2.5,
                                    .vacantFrom = {length.summerFloor + 1'000},
                                    .grades = 3},
                                   dice);
        summer.note = "Summer: the berths near the jetty's root, the cheap ones, go first.";
        if (length.berths == 30) {
            summer.candidates = {lowerTheLowEnd(summer, 3, scenario.rules), evenSteps(summer, scenario.rules)};
            summer.chosen = 1;
        }
        TierCase winter = makeTier({.site = "Kumonoura Haven",
                                    .name = std::string(length.name) + " · winter",
                                    .prefix = std::string(length.prefix) + "-",
                                    .units = length.berths,
                                    .onOffer = length.berths * 3 / 5,
                                    .floor = {length.summerFloor * 6 / 10 / 500 * 500},
                                    .lowest = {length.summerFloor * 6 / 10 / 500 * 500},
                                    .highest = {length.summerTop * 6 / 10 / 500 * 500},
                                    .bend = 1.3,
                                    .step = {500},
                                    .cheapFirst = 0.5,
                                    .grades = 3},
                                   dice);
        winter.note = "Winter: most boats are ashore.";
        winter.model.kind = ModelKind::remainder;
        scenario.tiers.push_back(std::move(summer));
        scenario.tiers.push_back(std::move(winter));
    }
    return scenario;
}

} // namespace rungwright::samples
