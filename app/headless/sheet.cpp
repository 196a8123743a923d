// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

#include "caution.h"
#include "price_sheet.h"
#include "selection.h"
#include "streams.h"

namespace rungwright
{

ExitStatus sheet(const Request& request)
{
    Scenario scenario;
    std::vector<ChosenLadder> ladders;
    if (const ExitStatus status = prepare(request, scenario, ladders); status != ExitStatus::done)
        return status;

    // --site and --tier together name one tier at most.
    const ChosenLadder& ladder = ladders.front();
    const std::vector<SheetRow> rows = sheetRows(scenario, *ladder.tierCase, ladder.candidate);
    const Outcome<bool> saved = saveSheet(rows, scenario.currency, request.out);
    if (!saved)
        return refuse(ExitStatus::cannotWrite, saved.trouble());
    say(QStringLiteral("%1: %2 units written, read again and found equal").arg(request.out).arg(rows.size()));
    say(cautionText());
    return ExitStatus::done;
}

} // namespace rungwright
