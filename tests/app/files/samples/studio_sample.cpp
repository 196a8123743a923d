// SPDX-License-Identifier: GPL-3.0-or-later
#include "sample_scenarios.h"
#include "tier_maker.h"

namespace rungwright::samples
{

namespace
{

struct Studio {
    const char* name;
    std::int64_t fils;
    Status status;
    double areaM2;
    int grade;
    double chance;
};

TierCase tierOf(const char* name, std::int64_t floor, std::initializer_list<Studio> studios)
{
    TierCase made;
    made.tier.site = "Rimalin Yard";
    made.tier.name = name;
    made.tier.advertisedFloor = {floor};
    for (const Studio& studio : studios) {
        Unit unit;
        unit.name = studio.name;
        unit.asking = {studio.fils};
        unit.status = studio.status;
        unit.areaM2 = studio.areaM2;
        unit.grade = studio.grade;
        unit.vacancyChance = studio.chance;
        made.tier.units.push_back(std::move(unit));
    }
    return made;
}

} // namespace

Scenario studioSample()
{
    using enum Status;
    Scenario scenario;
    scenario.currency = {"KWD", 3};
    scenario.title = "Rimalin Yard workshops ورش ريمالين (invented)";
    scenario.note = "An invented yard of workshop studios. Few units, each dear and each different; three decimals. The vacancy chances "
                    "are made up too.";
    scenario.rules.points.step = {2'500};
    scenario.rules.points.endings = {{0}, {500}};
    scenario.rules.greatestChangePercent = 15;
    scenario.rules.ceiling = Price{600'000};

    TierCase bench = tierOf("Bench studio, 18 m²", 110'000,
                            {{"Lathe", 110'000, occupied, 17.5, 1, 0.1},
                             {"Anvil", 118'500, occupied, 18, 1, 0.15},
                             {"Loom", 132'500, vacant, 18, 2, 0.3},
                             {"Kiln", 140'000, vacant, 18.5, 3, 0.35},
                             {"Press", 142'500, occupied, 18.5, 3, 0.2},
                             {"Plane", 145'000, vacant, 19, 3, 0.4},
                             {"Chisel", 147'500, vacant, 19, 4, 0.45}});
    bench.model.kind = ModelKind::unit;
    bench.note = "Unit by unit: each studio's own chance to be free.";
    bench.candidates = {lowerTheLowEnd(bench, 2, scenario.rules)};

    TierCase hall = tierOf("Hall studio, 40 m²", 235'000,
                           {{"North hall", 235'000, vacant, 38, 1, 0.5},
                            {"Gallery hall", 257'500, occupied, 40, 2, 0.2},
                            {"Courtyard hall", 268'000, vacant, 42, 3, 0.4},
                            {"Gate hall", 275'500, reserved, 42, 3, 0.1},
                            {"Dome hall", 310'000, vacant, 45, 4, 0.3}});
    hall.model.kind = ModelKind::onHand;

    TierCase foundry = tierOf("Foundry, 90 m²", 480'000,
                              {{"East foundry", 480'000, occupied, 88, 1, 0.1},
                               {"West foundry", 525'000, vacant, 92, 2, 0.2},
                               {"Old foundry", 510'000, closed, 95, 2, 0}});
    foundry.note = "One of two is free; the third is being rebuilt.";
    foundry.tier.units[0].locked = true;

    scenario.tiers = {std::move(bench), std::move(hall), std::move(foundry)};
    return scenario;
}

} // namespace rungwright::samples
