// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder/unit.h"

#include <algorithm>
#include <array>
#include <utility>

namespace rungwright
{

namespace
{

constexpr std::array<std::pair<Status, std::string_view>, 4> kStatusWords{{
    {Status::vacant, "vacant"},
    {Status::occupied, "occupied"},
    {Status::reserved, "reserved"},
    {Status::closed, "closed"},
}};

} // namespace

std::string_view statusWord(Status status)
{
    return std::ranges::find(kStatusWords, status, &std::pair<Status, std::string_view>::first)->second;
}

std::optional<Status> statusFromWord(std::string_view word)
{
    const auto found = std::ranges::find(kStatusWords, word, &std::pair<Status, std::string_view>::second);
    return found == kStatusWords.end() ? std::nullopt : std::optional(found->first);
}

std::vector<Price> askingPrices(std::span<const Unit> units)
{
    std::vector<Price> prices;
    prices.reserve(units.size());
    for (const Unit& unit : units)
        prices.push_back(unit.asking);
    return prices;
}

} // namespace rungwright
