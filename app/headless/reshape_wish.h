// SPDX-License-Identifier: GPL-3.0-or-later
// What the command `reshape` is told about the ladders it is to make.
#pragma once

#include "outcome.h"
#include "reshape/least_change.h"

#include <QString>

#include <functional>
#include <optional>

namespace rungwright
{

struct Currency;

/// The options of `reshape`, read as far as they can be without the list's currency.
struct ReshapeWish {
    QString rules;                  ///< Path of a rules file; empty = the scenario's own rules.
    QString sheet;                  ///< Path of a price sheet to write, in place of a scenario.
    std::optional<QString> gap;     ///< An amount, not yet read.
    ChangeTarget target;            ///< Unless it is a gap in money.
    TotalWish total;                ///< Held unless said otherwise.
    std::optional<OrderKept> order; ///< Without it the rules' own.
    bool takenStay = false;
};

/// What was given for an option; nothing when it was not.
using OptionValue = std::function<std::optional<QString>(const char*)>;
using OptionFlag = std::function<bool(const char*)>;

/// Fills in `wish`; what is wrong with an option, or an empty text.
QString readReshapeWish(const OptionValue& text, const OptionFlag& flag, ReshapeWish& wish);

/// The target, now that the currency is known.
Outcome<ChangeTarget> targetOf(const ReshapeWish& wish, const Currency& currency);

} // namespace rungwright
