// SPDX-License-Identifier: GPL-3.0-or-later
// Which ladders a command is about, and their figures.
#pragma once

#include "gap/measure.h"
#include "outcome.h"
#include "request.h"
#include "scenario.h"

#include <vector>

namespace rungwright
{

/// One ladder of a scenario: a tier's current one or a candidate.
struct ChosenLadder {
    const TierCase* tierCase = nullptr; ///< Lives in the scenario.
    int candidate = -1;                 ///< Index of the candidate; -1 = the current ladder.
    ModelSettings settings;             ///< The tier's own, with --model, --left and --load in their place.

    std::string_view candidateName() const;
};

/// The ladders of the tiers that --site and --tier let through, in scenario order. Trouble when these let none through, when a tier let
/// through has no candidate of the asked name, and when --left or --load is given to a model that has no use for it.
Outcome<std::vector<ChosenLadder>> chooseLadders(const Scenario& scenario, const Request& request);

/// What every command begins with: opens FILE, chooses the ladders, and sees that --out would not overwrite FILE.
/// ExitStatus::done, or the status to end with after the reason was told.
ExitStatus prepare(const Request& request, Scenario& scenario, std::vector<ChosenLadder>& ladders);

/// ExitStatus::done, unless --out names a file that is read: then it says so, and gives the status to end with.
ExitStatus refuseToOverwriteInput(const Request& request);

struct MeasuredLadder {
    ChosenLadder ladder;
    Measurement measurement;
};

std::vector<MeasuredLadder> measureAll(const std::vector<ChosenLadder>& ladders);

} // namespace rungwright
