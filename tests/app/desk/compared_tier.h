// SPDX-License-Identifier: GPL-3.0-or-later
// A small invented tier with candidates whose figures can be worked out on paper, and a seam that answers with a preset path.
#pragma once

#include "document.h"
#include "questions.h"
#include "scenario.h"

#include <QLocale>
#include <QStringList>

#include <utility>

namespace rungwright
{

/// Tern Wharf, Box 4, advertised from 70.00 EUR; invented. On offer A-1 at 80.00 (grade 1) and A-2 at 90.00 (grade 2); A-3 is taken at
/// 100.00, the closed unit at 110.00 has a name that a spreadsheet would take for a formula.
///
/// Perceived range, N = 2 units on offer at a < b: the cheapest of two draws is a with chance 3/4, so it is expected at (3a + b) / 4.
///   current      80.00, 90.00: 82.50, gap 12.50 = 10.00 floor not on sale + 2.50 thin; share 12.5 / 70 = 17.86 %; total 170.00
///   Lower end    70.00, 90.00: 75.00, gap  5.00 =  0.00 + 5.00; share 7.14 %; floor met with 3/4; total 160.00
///   Steeper      85.00, 82.00: 82.75, gap 12.75 = 12.00 + 0.75; share 18.21 %; total 167.00; A-2 below A-1: one inversion
///   Same bottom  70.00, 90.00, and A-3 taken to 95.00: the figures of Lower end
inline Scenario comparedScenario()
{
    Tier tier;
    tier.site = "Tern Wharf (invented)";
    tier.name = "Box 4";
    tier.advertisedFloor = Price{7000};
    const auto unit = [&](const char* name, std::int64_t price, Status status, std::optional<int> grade) {
        Unit one;
        one.name = name;
        one.asking = Price{price};
        one.status = status;
        one.grade = grade;
        tier.units.push_back(one);
    };
    unit("A-1", 8000, Status::vacant, 1);
    unit("A-2", 9000, Status::vacant, 2);
    unit("A-3", 10000, Status::occupied, std::nullopt);
    unit("=B-4", 11000, Status::closed, std::nullopt);

    TierCase tierCase;
    tierCase.tier = tier;
    tierCase.candidates = {
        {"Lower end", "", {Price{7000}, Price{9000}, Price{10000}, Price{11000}}},
        {"Steeper", "", {Price{8500}, Price{8200}, Price{10000}, Price{11000}}},
        {"Same bottom", "", {Price{7000}, Price{9000}, Price{9500}, Price{11000}}},
    };
    Scenario scenario;
    scenario.currency = *findCurrency("EUR");
    scenario.title = "Compared (invented)";
    scenario.tiers = {tierCase};
    return scenario;
}

/// Answers questions for a path with `path`, once; keeps what was suggested and told.
class PathAnswers : public Questions
{
public:
    QString path;
    QStringList suggested;
    QStringList told;

    QString savePath(QWidget*, const QString&, const QString& suggestion, const QString&) override
    {
        suggested << suggestion;
        return std::exchange(path, QString());
    }
    void tell(QWidget*, const QString& text, const QString& detail) override { told << text + QLatin1Char(' ') + detail; }
};

} // namespace rungwright
