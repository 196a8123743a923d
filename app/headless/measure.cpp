// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

#include "caution.h"
#include "figures_list.h"
#include "measure_text.h"
#include "selection.h"
#include "streams.h"

namespace rungwright
{

ExitStatus measure(const Request& request)
{
    Scenario scenario;
    std::vector<ChosenLadder> ladders;
    if (const ExitStatus status = prepare(request, scenario, ladders); status != ExitStatus::done)
        return status;

    const std::vector<MeasuredLadder> all = measureAll(ladders);
    const Currency& currency = scenario.currency;
    const auto written =
        writeToStandardOutput(request.json ? measurementsToJson(all, currency) : measurementsToText(all, currency, QLocale()).toUtf8());
    if (!written)
        return refuse(ExitStatus::cannotWrite, written.trouble());
    say(cautionText());
    return ExitStatus::done;
}

} // namespace rungwright
