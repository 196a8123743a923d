// SPDX-License-Identifier: GPL-3.0-or-later
// Everything that is signed: a ladder of a tier as it was looked at, against what is asked today.
#pragma once

#include "claims/checks.h"
#include "document.h"
#include "gap/measure.h"
#include "ladder_change.h"
#include "price_sheet.h"

#include <vector>

namespace rungwright
{

/// Page, report, sheet and ledger entry all speak of one of these, so that they cannot differ.
struct SignOffCase {
    Tier tier;
    QString ladder;     ///< The candidate's name, or the word for the current ladder.
    int candidate = -1; ///< -1 = the current ladder.
    QString scenario;   ///< Its title, may be empty.
    Currency currency;
    ModelSettings model;
    std::vector<Price> prices; ///< By unit index.
    std::vector<SheetRow> rows;
    SignedSheet sheet; ///< What Document::recordSignedSheet() takes, without a time.
    Measurement before;
    Measurement after;
    LadderChange change;
    std::vector<RuleBreach> breaches;
    std::vector<Check> checks;
};

/// `model` = the settings shown. `leastTime` see ClaimLimits::leastTimeAtFloor; the other limits are the tier's price rules.
SignOffCase signOffCase(const Document& document, int tier, int candidate, const ModelSettings& model, std::optional<double> leastTime);

/// What a sheet of that ladder changes, in unit order.
SignedSheet signedSheet(const TierCase& tierCase, int candidate);

} // namespace rungwright
