// SPDX-License-Identifier: GPL-3.0-or-later
// Money as the tool holds it: whole minor units, never a floating-point amount.
#pragma once

// First, or Qt 6.4's moc stumbles over <concepts> in every desk header that begins with one of ours.
#include <version>

#include <compare>
#include <cstdint>

namespace rungwright
{

/// An asking price (or a difference of two), in the currency's minor units: 69.00 EUR is 6900,
/// 12 JPY is 12, 1.500 KWD is 1500. How many decimals a unit has is the Currency's business.
/// Sums of ten million of the greatest price (9 * 10^11 minor units, see kGreatestPrice) stay inside the type.
struct Price {
    std::int64_t minor = 0;

    auto operator<=>(const Price&) const = default;
    Price& operator+=(Price other)
    {
        minor += other.minor;
        return *this;
    }
    Price& operator-=(Price other)
    {
        minor -= other.minor;
        return *this;
    }
    friend Price operator+(Price a, Price b) { return a += b; }
    friend Price operator-(Price a, Price b) { return a -= b; }
    friend Price operator-(Price a) { return Price{-a.minor}; }
};

/// As a number of minor units, where expectations and sums of squares begin.
constexpr double inMinor(Price price) { return static_cast<double>(price.minor); }

/// The dearest price the tool takes from a file: 900 000 000 000 minor units. Beyond it a typing error
/// is far likelier than a rent, and doubles that hold sums of such prices stay exact.
inline constexpr Price kGreatestPrice{900'000'000'000};

} // namespace rungwright
