// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

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
    return written ? ExitStatus::done : refuse(ExitStatus::cannotWrite, written.trouble());
}

} // namespace rungwright
