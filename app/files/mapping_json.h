// SPDX-License-Identifier: GPL-3.0-or-later
// How a mapping's choices are spelled in a profile.
#pragma once

#include "mapping.h"

#include <array>
#include <optional>
#include <string_view>

namespace rungwright
{

/// The word of each choice in a list, in the order of the choices.
inline constexpr std::array<std::string_view, kDelimiters.size()> kDelimiterWords{"comma", "semicolon", "tab", "bar"};
inline constexpr std::array<std::string_view, 2> kDecimalWords{"point", "comma"};
inline constexpr std::array<std::string_view, 5> kGroupingWords{"none", "comma", "point", "space", "apostrophe"};
inline constexpr std::array<std::string_view, 2> kSkipWords{"empty", "begins_with"};

template <std::size_t N>
std::optional<std::size_t> placeOfWord(const std::array<std::string_view, N>& words, std::string_view word)
{
    for (std::size_t i = 0; i < N; ++i) {
        if (words[i] == word)
            return i;
    }
    return {};
}

} // namespace rungwright
