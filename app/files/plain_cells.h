// SPDX-License-Identifier: GPL-3.0-or-later
// Cells as nearly every list has them, read fast. What these do not know is left to cell_values.h, whose values they give.
#pragma once

#include "cell_values.h"

#include <cstdint>
#include <limits>

namespace rungwright
{

/// trimmedText(), quick about a text that begins and ends with ASCII.
inline std::string_view plainTrimmed(std::string_view text)
{
    // No white space of Unicode ends in a byte from B0 on; what begins beyond ASCII is looked at the slow way.
    const auto isDark = [](char c) { return c > ' ' && c <= '~'; };
    return text.empty() || (isDark(text.front()) && (isDark(text.back()) || static_cast<unsigned char>(text.back()) >= 0xB0))
               ? text
               : trimmedText(text);
}

/// Digits, or digits, a point and digits: `value` without the point, and the number of digits behind it. False for anything else and for
/// more than 18 digits.
inline bool plainDigits(std::string_view text, std::uint64_t& value, std::size_t& decimals)
{
    if (text.empty() || text.size() > 18)
        return false;
    std::uint64_t sum = 0;
    std::size_t i = 0;
    const auto takeDigits = [&] {
        const std::size_t from = i;
        for (; i < text.size() && static_cast<unsigned char>(text[i] - '0') < 10; ++i)
            sum = sum * 10 + static_cast<unsigned char>(text[i] - '0');
        return i - from;
    };
    if (takeDigits() == 0)
        return false;
    decimals = 0;
    if (i < text.size() && text[i] == '.') {
        ++i;
        decimals = takeDigits();
        if (decimals == 0)
            return false;
    }
    value = sum;
    return i == text.size();
}

/// A price that fits in 32 bits of minor units; false for any other, and for one that readPrice() refuses.
inline bool plainPrice(std::string_view text, int currencyDecimals, std::uint32_t& out)
{
    std::uint64_t value = 0;
    std::size_t decimals = 0;
    if (!plainDigits(text, value, decimals))
        return false;
    const auto wanted = static_cast<std::size_t>(currencyDecimals);
    for (; decimals > wanted; --decimals) {
        if (value % 10 != 0)
            return false;
        value /= 10;
    }
    for (; decimals < wanted; ++decimals) {
        if (value > std::numeric_limits<std::uint32_t>::max())
            return false;
        value *= 10;
    }
    if (value == 0 || value > std::numeric_limits<std::uint32_t>::max())
        return false;
    out = static_cast<std::uint32_t>(value);
    return true;
}

/// The double nearest to a plain number. Both the digits and the power of ten are exact doubles here, so that the one division is rounded
/// as the nearest double is: Clinger, PLDI 1990 (from memory).
inline bool plainNumber(std::string_view text, double& out)
{
    constexpr double powers[] = {1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17};
    std::uint64_t value = 0;
    std::size_t decimals = 0;
    if (!plainDigits(text, value, decimals) || value >= std::uint64_t(1) << 53)
        return false;
    out = static_cast<double>(value) / powers[decimals];
    return true;
}

} // namespace rungwright
