// SPDX-License-Identifier: GPL-3.0-or-later
// ISO 4217 currency codes and their number of decimals.
#pragma once

#include "ladder/price.h"

#include <optional>
#include <span>
#include <string>
#include <string_view>

namespace rungwright
{

/// A currency: its ISO 4217 alphabetic code and the number of decimals of its minor unit (0, 2, 3 or 4).
/// `XXX` ("no currency") stands for amounts whose currency was not said; the tool gives it 2 decimals.
struct Currency {
    std::string code = "XXX";
    int decimals = 2;

    bool operator==(const Currency&) const = default;
    /// Minor units in one major unit: 10^decimals.
    std::int64_t minorPerMajor() const;
    /// A price in major units, as a floating-point figure (for display, plots and JSON only).
    double major(double minorUnits) const { return minorUnits / static_cast<double>(minorPerMajor()); }
};

/// The currency of a code (upper case), or nothing when ISO 4217 lists no such active code or gives it no
/// minor unit (XAU, XTS, ...; XXX excepted).
/// Source: ISO 4217 list one, by way of the open data set "datasets/currency-codes" (2026-02-01).
std::optional<Currency> findCurrency(std::string_view code);

/// Every code findCurrency knows, in alphabetic order.
std::span<const std::string_view> currencyCodes();

/// A price as text for files: decimal point, no grouping, exactly the currency's decimals ("69.00", "-0.50").
std::string plainText(Price price, const Currency& currency);

/// Reads a plain decimal amount ("69", "69.5", "+1.00"; point only, no grouping, no exponent). Nothing when it is not one,
/// when it has more decimals than the currency that are not zeros, or when it lies beyond +-kGreatestPrice.
std::optional<Price> parsePlain(std::string_view text, const Currency& currency);

} // namespace rungwright
