// SPDX-License-Identifier: GPL-3.0-or-later
// A new unit list brought into an open scenario: what it would change, told before anything changes.
#pragma once

#include "scenario.h"

namespace rungwright
{

/// A refresh, worked out and not yet done: Document::refresh() does it.
struct RefreshPlan {
    TierList before; ///< The scenario's tiers it was worked out for.
    TierList after;  ///< What they become. Tiers in which nothing changes are one and the same element in both.
};

} // namespace rungwright
