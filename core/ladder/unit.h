// SPDX-License-Identifier: GPL-3.0-or-later
// The rentable things and the tiers they are sold in.
#pragma once

#include "ladder/price.h"

#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace rungwright
{

/// What is known of a unit's occupation. Only a vacant unit is on offer; a closed one is not rentable at all.
enum class Status : unsigned char { vacant, occupied, reserved, closed };

/// The word of a status as files spell it: "vacant", "occupied", "reserved", "closed".
std::string_view statusWord(Status status);
std::optional<Status> statusFromWord(std::string_view word);

/// One rentable thing. Texts are UTF-8.
struct Unit {
    std::string name; ///< Unique within its tier.
    Price asking;     ///< Per billing period, > 0.
    Status status = Status::vacant;
    bool locked = false;                 ///< A locked unit's price does not move.
    std::optional<int> grade;            ///< Higher is more desirable.
    std::optional<double> areaM2;        ///< Square metres, > 0.
    std::optional<double> vacancyChance; ///< In [0, 1]; absent = the tier's share on offer.

    bool onOffer() const { return status == Status::vacant; }
    bool rentable() const { return status != Status::closed; }
    bool operator==(const Unit&) const = default;
};

/// The units of one size class at one site, advertised together by one "from" price.
struct Tier {
    std::string site;
    std::string name;
    Price advertisedFloor; ///< > 0; 0 = no floor is known, see hasFloor().
    std::vector<Unit> units;

    /// Without a floor there is no gap: only what needs none is defined.
    bool hasFloor() const { return advertisedFloor.minor > 0; }
    bool operator==(const Tier&) const = default;
};

/// The asking prices of `units`, by unit index: the current ladder's prices.
std::vector<Price> askingPrices(std::span<const Unit> units);

} // namespace rungwright
