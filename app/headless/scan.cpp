// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

#include "figures_list.h"
#include "selection.h"
#include "streams.h"

#include <algorithm>
#include <limits>

namespace rungwright
{

namespace
{

/// Tiers whose gap is undefined come behind every number.
double rank(const MeasuredLadder& one) { return one.measurement.gap.gapShare.value_or(-std::numeric_limits<double>::infinity()); }

} // namespace

ExitStatus scan(const Request& request)
{
    Scenario scenario;
    std::vector<ChosenLadder> ladders;
    if (const ExitStatus status = prepare(request, scenario, ladders); status != ExitStatus::done)
        return status;

    std::vector<MeasuredLadder> all = measureAll(ladders);
    // Equal shares keep the order of the scenario.
    std::stable_sort(all.begin(), all.end(), [](const MeasuredLadder& a, const MeasuredLadder& b) { return rank(a) > rank(b); });

    const QByteArray csv = measurementsToCsv(all, scenario.currency);
    const auto written = request.out.isEmpty() ? writeToStandardOutput(csv) : writeOut(request.out, csv);
    return written ? ExitStatus::done : refuse(ExitStatus::cannotWrite, written.trouble());
}

} // namespace rungwright
