// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

#include "bench_picture.h"
#include "selection.h"
#include "streams.h"

#include <QFileInfo>

#include <algorithm>

namespace rungwright
{

ExitStatus picture(const Request& request)
{
    const QString ending = QFileInfo(request.out).suffix().toLower();
    if (ending != QLatin1String("png") && ending != QLatin1String("svg") && ending != QLatin1String("pdf"))
        return refuse(ExitStatus::wrongUsage, "rungwright picture: --out ends in .png, .svg or .pdf");
    Scenario scenario;
    std::vector<ChosenLadder> ladders;
    if (const ExitStatus status = prepare(request, scenario, ladders); status != ExitStatus::done)
        return status;

    // --site and --tier together name one tier at most.
    const int candidate = ladders.front().candidate;
    const TierList& tiers = scenario.tiers;
    const auto place = std::find_if(tiers.begin(), tiers.end(), [&](const TierCase& one) { return &one == ladders.front().tierCase; });
    const int tier = int(place - tiers.begin());
    Document document;
    document.begin(std::move(scenario), request.file, true);
    const Outcome<bool> drawn = renderBench(document, tier, candidate, request.out);
    return drawn ? ExitStatus::done : refuse(ExitStatus::cannotWrite, drawn.trouble());
}

} // namespace rungwright
