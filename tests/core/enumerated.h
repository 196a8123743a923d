// SPDX-License-Identifier: GPL-3.0-or-later
// What an enquirer may find, by listing every case: the definitions of the availability models taken literally.
#pragma once

#include <cmath>
#include <cstdint>
#include <limits>
#include <map>
#include <vector>

/// Chance of each price to be the cheapest found, and of finding nothing.
struct Enumerated {
    std::map<std::int64_t, double> cheapest;
    double none = 0;

    double found() const
    {
        double sum = 0;
        for (const auto& [price, chance] : cheapest)
            sum += chance;
        return sum;
    }
    /// Expected cheapest, given that something is found.
    double expected() const
    {
        double sum = 0;
        for (const auto& [price, chance] : cheapest)
            sum += chance * static_cast<double>(price);
        return sum / found();
    }
    double chanceAtMost(std::int64_t limit) const
    {
        double sum = 0;
        for (const auto& [price, chance] : cheapest)
            sum += price <= limit ? chance : 0;
        return sum / found();
    }
    /// The least price at which the cumulated chance reaches p; `hair` is what rounding may have taken from it.
    double quantile(double p, double hair = 1e-12) const
    {
        double sum = 0;
        for (const auto& [price, chance] : cheapest) {
            sum += chance / found();
            if (sum >= p - hair)
                return static_cast<double>(price);
        }
        return std::numeric_limits<double>::quiet_NaN();
    }
};

/// All m^n sequences of n draws with replacement.
inline Enumerated allDraws(const std::vector<std::int64_t>& prices, int n)
{
    Enumerated result;
    std::size_t sequences = 1;
    for (int i = 0; i < n; ++i)
        sequences *= prices.size();
    for (std::size_t code = 0; code < sequences; ++code) {
        std::int64_t least = std::numeric_limits<std::int64_t>::max();
        std::size_t rest = code;
        for (int i = 0; i < n; ++i, rest /= prices.size())
            least = std::min(least, prices[rest % prices.size()]);
        result.cheapest[least] += 1.0 / static_cast<double>(sequences);
    }
    return result;
}

/// All 2^M sets of free units, each with its chance; `onlySize` >= 0 keeps the sets of that size (not normalised).
inline Enumerated allSets(const std::vector<std::int64_t>& prices, const std::vector<double>& chances, int onlySize = -1)
{
    Enumerated result;
    for (std::size_t set = 0; set < std::size_t{1} << prices.size(); ++set) {
        double chance = 1;
        int size = 0;
        std::int64_t least = std::numeric_limits<std::int64_t>::max();
        for (std::size_t i = 0; i < prices.size(); ++i) {
            const bool free = (set >> i & 1) != 0;
            chance *= free ? chances[i] : 1 - chances[i];
            size += free;
            least = free ? std::min(least, prices[i]) : least;
        }
        if (onlySize >= 0 && size != onlySize)
            continue;
        if (size == 0)
            result.none += chance;
        else if (chance > 0)
            result.cheapest[least] += chance;
    }
    return result;
}

/// All sets of k units, equally likely.
inline Enumerated allSetsOf(const std::vector<std::int64_t>& prices, int k)
{
    Enumerated result = allSets(prices, std::vector<double>(prices.size(), 0.5), k);
    const double sets = result.found();
    for (auto& [price, chance] : result.cheapest)
        chance /= sets;
    return result;
}
