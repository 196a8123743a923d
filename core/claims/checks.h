// SPDX-License-Identifier: GPL-3.0-or-later
// What should be looked at before prices leave: does the ladder bear out what is advertised, and does it keep the house's rules?
#pragma once

#include "cheapest/model.h"
#include "ladder/unit.h"
#include "reshape/rules.h"

#include <cstdint>
#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Which rule a new price breaks. Rules bind changes: a unit whose price stays breaks none.
struct RuleBreach {
    std::uint32_t unit = 0;    ///< Index into the tier's units.
    Bound bound = Bound::none; ///< The rule, or Bound::none when the price is only not a price point.

    bool operator==(const RuleBreach&) const = default;
};

/// Of the units whose price in `prices` (one a unit, by unit index) differs from what is asked, those that break a rule, in unit order. A
/// lock comes before all other rules, a limit before the price points.
std::vector<RuleBreach> ruleBreaches(const Tier& tier, std::span<const Price> prices, const PriceRules& rules);

enum class CheckKind : unsigned char {
    floorOnSale,   ///< A unit on offer is asked at or below the advertised floor.
    shareAtFloor,  ///< So many of the units on offer are.
    floorStays,    ///< How long one is expected to be.
    inversions,    ///< No unit on offer of higher grade is asked for less than one of lower grade.
    changesByRule, ///< Every new price keeps the rules.
    totalByRule,   ///< The change of the tier's asking total keeps its rule.
    belowFloor,    ///< No unit on offer is asked below the advertised floor; legal, and shown.
};

enum class ClaimOutcome : unsigned char { holds, lookAtThis, notChecked };

/// Why a check could not be made.
enum class NotChecked : unsigned char {
    no,             ///< It was.
    noFloor,        ///< No advertised floor is known.
    nothingOnOffer, ///< No unit is on offer.
    noLeastShare,   ///< The user has set no least share; the share is given.
    noLeastTime,    ///< The user has set no least part of the time; what the turnover model expects is given.
    floorNotOnSale, ///< There is nothing that could stay.
    loadUnknown,    ///< The tier is full or empty, so how busy it is cannot be inferred.
    noGrades,       ///< Fewer than two units on offer have a grade.
    noRules,        ///< No rule is set and no unit is locked.
    noTotalRule,    ///< No rule limits the change of the total; the change is given.
};

/// One check, with what it was decided on. Fields that do not belong to a kind stay empty.
struct Check {
    CheckKind kind = CheckKind::floorOnSale;
    ClaimOutcome outcome = ClaimOutcome::notChecked;
    NotChecked why = NotChecked::no;
    std::size_t count = 0;           ///< Units at or below the floor; inversions; breaches; units below the floor.
    std::size_t before = 0;          ///< The same at today's prices; inversions and units below the floor only.
    std::size_t of = 0;              ///< Units on offer; changesByRule: units whose price changes.
    std::optional<double> value;     ///< shareAtFloor: the share. floorStays: the part of the time that a unit at the floor is on offer, in
                                     ///< the long run. totalByRule: the change as a share of today's total.
    std::optional<double> limit;     ///< What `value` was held against.
    std::optional<double> untilGone; ///< floorStays: expected time until the last unit at the floor is taken, in mean stays.
    std::optional<Price> price;      ///< floorOnSale: the lowest price on offer. totalByRule: the change in money.
    std::optional<Price> priceLimit; ///< totalByRule: the limit in money.

    bool operator==(const Check&) const = default;
};

/// What only the user can say. What is not set is not judged: there is no number here that pretends to be law.
struct ClaimLimits {
    std::optional<double> leastShareAtFloor;    ///< Of the units on offer, in (0, 1].
    std::optional<double> leastTimeAtFloor;     ///< Of the time, in (0, 1].
    std::optional<double> greatestTotalPercent; ///< Change of the tier's asking total, up or down, of today's.
    std::optional<Price> greatestTotal;         ///< The same in money.

    bool operator==(const ClaimLimits&) const = default;
};

/// All checks, in the order of CheckKind. `prices` holds one price a unit, by unit index; the asking total is that of the units on offer,
/// as everywhere. `load` is the offered load of cheapest-first turnover; without one it is inferred from the units taken, as that model
/// does (see cheapest/odds.h).
///
/// floorStays is what cheapest-first turnover says of it, the only model here that knows time: with n rentable units at or below the floor
/// and offered load a, a unit among them is on offer during 1 - B(n, a) of the time (Erlang B, whatever the distribution of the stay).
/// Begun with j of them taken, the last is gone after sum over m = j..n-1 of 1 / (a B(m, a)) mean stays: the mean first passage of a birth-
/// death process from m to m + 1 is (pi_0 + ... + pi_m) / (rate_m pi_m), and pi_m over that sum is B(m, a) (Karlin & Taylor, A First Course
/// in Stochastic Processes, 2nd ed. 1975, chapter 4; from memory). That one takes the stays to be exponential.
std::vector<Check> claimChecks(const Tier& tier, std::span<const Price> prices, const PriceRules& rules, const ClaimLimits& limits,
                               std::optional<double> load = {});

/// The sum above, in mean stays; infinite where it goes beyond a double. 0 <= taken < units, load > 0.
double meanStaysUntilTaken(int units, int taken, double load);

} // namespace rungwright
