// SPDX-License-Identifier: GPL-3.0-or-later
// What was handed over against what is asked now: did the prices of a sheet arrive where they were sent?
#pragma once

#include "scenario.h"

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

namespace rungwright
{

/// A price that was handed over and is not what is asked.
struct SignedDifference {
    std::string unit;
    Price before;               ///< Asked when the sheet was handed over.
    Price wanted;               ///< What the sheet says.
    std::optional<Price> asked; ///< What is asked now; nothing when the unit is gone.

    bool operator==(const SignedDifference&) const = default;
};

struct SignedCheck {
    enum class State {
        nothingSigned, ///< The sheet changed no price.
        applied,       ///< Every price of the sheet is asked.
        partly,        ///< Some are.
        notApplied,    ///< None is, though units of the sheet are there.
        cannotTell,    ///< All units of the sheet are gone, or the tier is.
    };
    State state = State::nothingSigned;
    std::int64_t wanted = 0;                   ///< Prices on the sheet.
    std::int64_t applied = 0;                  ///< Of them: asked now.
    std::int64_t gone = 0;                     ///< Of them: of units that are no longer there.
    std::vector<SignedDifference> differences; ///< The others and the gone ones, in the order of the sheet.

    bool operator==(const SignedCheck&) const = default;
};

/// `asked` = the tier as it is now, nullptr when it is gone.
SignedCheck checkSigned(const SignedSheet& sheet, const Tier* asked);

} // namespace rungwright
