// SPDX-License-Identifier: GPL-3.0-or-later
// A tier, put in the order a reshaping keeps, as the numbers the solvers work on.
#pragma once

#include "cheapest/odds.h"
#include "reshape/chain_solver.h"
#include "reshape/price_point_repair.h"
#include "reshape/rules.h"

#include <cstdint>
#include <span>
#include <vector>

namespace rungwright
{

/// Kinds of rules that can be set aside to see what they cost.
enum class RuleFamily : unsigned char {
    locks,
    changePercent,
    changeMoney,
    ceiling,
    least, ///< The floor for asking prices.
    pointLimits,
    total,        ///< The asking total as wished.
    tierTotal,    ///< How far the rules let the asking total change.
    shareAtFloor, ///< The least share of units at the advertised floor.
};
/// A phrase for the user: "the locks", "the greatest change in percent", ...
std::string_view familyPhrase(RuleFamily family);

/// Today's room of every unit by unit index; `without` leaves that family of rules out.
void roomsOf(std::span<const Unit> units, const PriceRules& rules, std::optional<RuleFamily> without, std::vector<Room>& out);

/// The chosen units in the order kept, cheapest first, as unit indices.
///
/// Today's ties are broken by what the units are and never by their place in the list: the lower grade first, then who may go lower, then
/// who may not go as high, then the one on offer, then the smaller chance to be free. Units that are alike in all of these are
/// interchangeable, so that the prices come out the same however tied units are listed; only which of two like units gets which is up to
/// the list. By grade, the graded units are put in order of grade on the rungs that graded units hold today; ungraded ones keep their
/// rungs.
void chainOrder(std::span<const Unit> units, std::span<const Room> rooms, Among among, OrderKept kept, std::vector<std::uint32_t>& places);

/// Keeps its storage between calls.
struct LadderChain {
    std::vector<std::uint32_t> places; ///< Unit index by place.
    std::vector<Room> rooms;           ///< By unit index.
    std::vector<Price> todayPrices, least, most;
    std::vector<double> today, weight, lo, hi, counted;
    /// Cheapest odds by place, given that something is on offer; empty where the model has none, and `cheapest.note` says why.
    std::vector<double> odds;
    CheapestOdds cheapest;
    Price total; ///< Asking total of the units on offer, today.
    /// How many of the units on offer the rules want at or below the advertised floor, 0 without a floor, and how many could come down
    /// there by their own rules, one from the lowest on; fewer than wanted: the bounds do not hold that rule.
    std::size_t wantedAtFloor = 0, reachFloor = 0;

    /// The units the model works on (modelUnits()) are those that move. Taken units among them count towards what an enquirer finds, but
    /// not towards the asking total; with `takenStay` they keep their prices. Units the model leaves out keep theirs. `weights` by unit
    /// index, > 0; empty = 1 each. The lowest units on offer that the rules want at the advertised floor are held there by their bounds.
    void build(const Tier& tier, const ModelSettings& model, const PriceRules& rules, OrderKept order, bool takenStay,
               std::span<const double> weights, std::optional<RuleFamily> without = {});
    /// The first `rungs` places may not ask more than `floor`. False when one of them has no such price.
    bool holdAtFloor(std::size_t rungs, Price floor, const PricePoints& points);

    ChainProblem problem() const { return {today, weight, lo, hi, counted, odds, {}, {}, {}}; }
    RepairProblem repairProblem(const PricePoints& points) const;

private:
    bool holdPlaceAtFloor(std::size_t place, Price floor, const PricePoints& points);

    std::vector<Rung> m_ladder;
};

} // namespace rungwright
