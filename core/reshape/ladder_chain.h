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

/// The order of prices a reshaping keeps.
enum class OrderKept : unsigned char {
    present, ///< Today's: a unit asked for less stays at or below one asked for more.
    grade,   ///< A higher grade is never asked for less: inversions are repaired. Within a grade today's order.
};

/// Kinds of rules that can be set aside to see what they cost.
enum class RuleFamily : unsigned char { locks, changePercent, changeMoney, ceiling, pointLimits, total };
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

    /// The units the model works on (modelUnits()) are those that move. Taken units among them count towards what an enquirer finds, but
    /// not towards the asking total; with `takenStay` they keep their prices. Units the model leaves out keep theirs. `weights` by unit
    /// index, > 0; empty = 1 each.
    void build(const Tier& tier, const ModelSettings& model, const PriceRules& rules, OrderKept order, bool takenStay,
               std::span<const double> weights, std::optional<RuleFamily> without = {});
    /// The first `rungs` places may not ask more than `floor`. False when one of them has no such price.
    bool holdAtFloor(std::size_t rungs, Price floor, const PricePoints& points);

    ChainProblem problem() const { return {today, weight, lo, hi, counted, odds, {}, {}, {}}; }
    RepairProblem repairProblem(const PricePoints& points) const;

private:
    std::vector<Rung> m_ladder;
};

} // namespace rungwright
