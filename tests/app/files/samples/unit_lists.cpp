// SPDX-License-Identifier: GPL-3.0-or-later
#include "sample_scenarios.h"
#include "sheet_cells.h"
#include "tier_maker.h"

#include <charconv>

namespace rungwright::samples
{

namespace
{

std::string number(double value)
{
    char text[32];
    return {text, std::to_chars(text, text + sizeof text, value).ptr};
}

constexpr const char* kHeader = "site,tier,unit,asking_price,status,advertised_floor,currency,grade,area,vacancy_chance,locked\n";

std::string row(const Tier& tier, const Unit& unit, const Currency& currency, bool withFloor)
{
    std::string out =
        csvCell(tier.site) + ',' + csvCell(tier.name) + ',' + csvCell(unit.name) + ',' + plainText(unit.asking, currency) + ',';
    out += statusWord(unit.status);
    out += ',' + (withFloor ? plainText(tier.advertisedFloor, currency) : std::string()) + ',' + currency.code + ',';
    out += (unit.grade ? std::to_string(*unit.grade) : std::string()) + ',' + (unit.areaM2 ? number(*unit.areaM2) : std::string()) + ',';
    out += (unit.vacancyChance ? number(*unit.vacancyChance) : std::string()) + ',' + (unit.locked ? "yes" : "") + '\n';
    return out;
}

} // namespace

QByteArray unitListCsv(const Scenario& scenario)
{
    std::string out = kHeader;
    for (const TierCase& tierCase : scenario.tiers) {
        for (const Unit& unit : tierCase.tier.units)
            out += row(tierCase.tier, unit, scenario.currency, true);
    }
    return QByteArray::fromStdString(out);
}

QByteArray longListCsv()
{
    constexpr const char* sites[]{"Ashwold", "Brackenford", "Cindermoor", "Dunmarrow",
                                  "Eskerby", "Fallowmere",  "Gorsewick",  "Hollinghythe"};
    struct Size {
        const char* name;
        double areaM2;
        std::int64_t floor;
    };
    constexpr Size sizes[]{{"Box 1 m²", 1, 1900},  {"Room 2 m²", 2, 3400},    {"Room 4 m²", 4, 5900},
                           {"Room 6 m²", 6, 7900}, {"Room 10 m²", 10, 11900}, {"Hall 20 m²", 20, 20900}};
    const Currency currency{"EUR", 2};
    Dice dice(2400);
    std::vector<TierCase> tiers;
    for (const char* site : sites) {
        for (const Size& size : sizes) {
            const std::int64_t floor = size.floor + dice.whole(-3, 3) * 100;
            tiers.push_back(makeTier({.site = site,
                                      .name = size.name,
                                      .prefix = std::string(1, site[0]) + std::to_string(&size - sizes + 1) + "-",
                                      .units = 50,
                                      .onOffer = dice.whole(3, 24),
                                      .closed = dice.whole(0, 2),
                                      .reserved = dice.whole(0, 3),
                                      .floor = {floor},
                                      .lowest = {floor},
                                      .highest = {floor + floor * dice.whole(40, 90) / 100},
                                      .bend = 0.6 + dice.share(),
                                      .step = {50},
                                      .cheapFirst = 3 * dice.share(),
                                      .grades = 5,
                                      .inverted = dice.whole(0, 4),
                                      .areaM2 = size.areaM2},
                                     dice));
        }
    }
    // The floor stands on each tier's first row only, which is all that is asked of a list.
    std::string out = kHeader;
    for (std::size_t i = 0; i < 50; ++i) {
        for (const TierCase& tierCase : tiers)
            out += row(tierCase.tier, tierCase.tier.units[i], currency, i == 0);
    }
    return QByteArray::fromStdString(out);
}

QByteArray refusedListCsv()
{
    return "site,tier,unit,asking_price,status,advertised_floor,currency,grade,area,vacancy_chance,locked\n"
           "Thornby Cross (invented),Room 4 m²,T-01,69.00,occupied,69.00,EUR,1,4,,\n"
           "Thornby Cross (invented),Room 4 m²,T-02,\"82,50\",vacant,69.00,EUR,2,4,,\n"
           "Thornby Cross (invented),Room 4 m²,T-03,84.00,vacant,69.00,EUR,2,4.1,,\n"
           "Thornby Cross (invented),Room 4 m²,T-04,88.255,vacant,69.00,EUR,2,4.1,,\n"
           "Thornby Cross (invented),Room 4 m²,T-05,91.00,free,69.00,EUR,3,4.2,,\n"
           "Thornby Cross (invented),Room 4 m²,T-03,92.00,vacant,69.00,EUR,3,4.2,,\n"
           "Thornby Cross (invented),Room 4 m²,T-07,94.50,vacant,72.00,EUR,3,4.2,,\n"
           "Thornby Cross (invented),Room 4 m²,T-08,95.00,vacant,69.00,EUR,good,4.2,,\n"
           "Thornby Cross (invented),Room 4 m²,T-09,97.00,vacant,69.00,EUR,4,4.2,25,\n"
           "Thornby Cross (invented),Room 4 m²,T-10, corner,99.00,vacant,69.00,EUR,4,4.2,,\n"
           "Thornby Cross (invented),Room 4 m²,T-11,101.00,vacant,69.00,EUR,4,4.3,0.25,yes\n"
           "Thornby Cross (invented),Room 8 m²,T-21,119.00,vacant,119.00,EUR,1,8,,\n"
           "Thornby Cross (invented),Room 8 m²,T-22,126.50,vacant,,EUR,2,8,,\n"
           "Thornby Cross (invented),Room 8 m²,T-23,131.00,occupied,119.00,EUR,3,8,,no\n";
}

} // namespace rungwright::samples
