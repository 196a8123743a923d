// SPDX-License-Identifier: GPL-3.0-or-later
#include "sample_scenarios.h"

namespace rungwright::samples
{

namespace
{

struct Plain {
    std::string name;
    std::int64_t minor;
    Status status = Status::vacant;
};

TierCase tierOf(std::string name, std::int64_t floor, std::initializer_list<Plain> units, std::string site = "Edgewater (invented)")
{
    TierCase made;
    made.tier.site = std::move(site);
    made.tier.name = std::move(name);
    made.tier.advertisedFloor = {floor};
    for (const Plain& plain : units) {
        Unit unit;
        unit.name = plain.name;
        unit.asking = {plain.minor};
        unit.status = plain.status;
        made.tier.units.push_back(std::move(unit));
    }
    return made;
}

std::string repeated(const std::string& text, int times)
{
    std::string out;
    for (int i = 0; i < times; ++i)
        out += text;
    return out;
}

} // namespace

Scenario edgeSample()
{
    using enum Status;
    Scenario scenario;
    scenario.title = "Edge cases (invented)";
    scenario.note = "Every tier here is invented and odd in its own way: what it shows stands in its name or note. No currency is named.";

    TierList& tiers = scenario.tiers;
    tiers.push_back(tierOf("One unit", 5000, {{"only", 6200}}));
    tiers.push_back(tierOf("None on offer", 5000, {{"n1", 5000, occupied}, {"n2", 5600, reserved}, {"n3", 6100, occupied}}));
    tiers.push_back(tierOf("All equal", 5000, {{"e1", 5500}, {"e2", 5500}, {"e3", 5500}, {"e4", 5500, occupied}}));
    tiers.push_back(tierOf("Floor above all", 9000, {{"a1", 6000}, {"a2", 7000}, {"a3", 8000}}));
    tiers.push_back(tierOf("A unit below the floor", 6000, {{"b1", 5400}, {"b2", 6000}, {"b3", 7500}, {"b4", 8100, occupied}}));
    tiers.push_back(tierOf("Full", 5000, {{"f1", 5000, occupied}, {"f2", 5500, occupied}, {"f3", 6000, occupied}, {"f4", 6500, occupied}}));
    tiers.push_back(tierOf("Nothing taken", 5000, {{"t1", 5000}, {"t2", 5500}, {"t3", 6000}, {"t4", 6500}}));
    tiers.push_back(tierOf("No units yet", 5000, {}));
    tiers.push_back(tierOf("All closed", 5000, {{"c1", 5000, closed}, {"c2", 5500, closed}}));
    tiers.push_back(tierOf("Two units, one price apart", 5000, {{"p1", 5000}, {"p2", 5001}}));
    tiers.push_back(tierOf("Seven digits", 123'456'700,
                           {{"s1", 123'456'700, occupied}, {"s2", 187'654'321}, {"s3", 250'000'000}, {"s4", 999'999'999}}));
    tiers.push_back(tierOf("From a cent to a fortune", 1, {{"m1", 1}, {"m2", kGreatestPrice.minor}}));

    TierCase locked = tierOf("All locked", 5000, {{"l1", 5200}, {"l2", 5800}, {"l3", 6400}});
    for (Unit& unit : locked.tier.units)
        unit.locked = true;
    tiers.push_back(std::move(locked));

    TierCase inverted = tierOf("Grades upside down", 5000, {{"g1", 5000}, {"g2", 6000}, {"g3", 7000}, {"g4", 8000}});
    for (std::size_t i = 0; i < inverted.tier.units.size(); ++i)
        inverted.tier.units[i].grade = 4 - static_cast<int>(i);
    tiers.push_back(std::move(inverted));

    TierCase longNames = tierOf("A very long tier name " + repeated("that goes on and on ", 9) + "and ends", 5000,
                                {{"Unit " + repeated("long ", 60) + "end", 5100}, {repeated("W", 200), 5600}, {"x", 6000, occupied}});
    longNames.note = repeated("A long note about nothing in particular. ", 40);
    tiers.push_back(std::move(longNames));

    tiers.push_back(tierOf("مخزن ٣ أمتار", 5000, {{"أ-١", 5200}, {"ب-٢", 5900, occupied}, {"ج-٣ (A)", 6400}}, "ميناء الحافة (مُخترع)"));
    tiers.push_back(tierOf("מחסן קטן", 5000, {{"יחידה 1", 5300}, {"יחידה 2", 6100}}));
    tiers.push_back(tierOf("倉庫 三畳", 5000, {{"い-一", 5400}, {"ろ-二", 5900}, {"は-三", 6600, reserved}}, "縁ノ浜（架空）"));
    tiers.push_back(
        tierOf("Emoji 📦 and a family 👩‍👩‍👧", 5000, {{"📦 1", 5100}, {"🧰 2", 5700}, {"é (e + accent)", 6000}}));
    tiers.push_back(
        tierOf("Cells a spreadsheet would run", 5000, {{"=1+2", 5100}, {"+3", 5200}, {"-4", 5300}, {"@five", 5400}, {"'=6", 5500}}));
    tiers.push_back(tierOf("Quotes \"here\", commas, and\na line end", 5000, {{"a, \"b\"", 5100}, {"c; d", 5200}}));

    TierCase model = tierOf("Settings by hand", 5000, {{"h1", 5200}, {"h2", 5900}, {"h3", 6400, occupied}, {"h4", 7000, occupied}});
    model.model = {ModelKind::turnover, {}, 1.75};
    model.tier.units[0].vacancyChance = 0;
    model.tier.units[1].vacancyChance = 1;
    model.tier.units[2].areaM2 = 0.1;
    model.candidates = {{"=candidate", "Named like a formula.", {{5000}, {5900}, {6400}, {7000}}}};
    tiers.push_back(std::move(model));
    return scenario;
}

} // namespace rungwright::samples
