// SPDX-License-Identifier: GPL-3.0-or-later
// A clean unit list held column by column, in a few bytes a unit, until it is made into tiers.
#pragma once

#include "ladder/currency.h"
#include "ladder/unit.h"

#include <cstdint>
#include <deque>
#include <limits>
#include <string>
#include <string_view>
#include <unordered_map>
#include <vector>

namespace rungwright
{

struct TierSoFar;

/// What of a list is kept. For figures alone a unit needs no name, only to be told from the others of its tier, and no area.
enum class KeepUnits : unsigned char { whole, forFigures };

/// A tier's key by its texts, wherever they stand.
struct TierKey {
    std::string_view site, name;
    bool operator==(const TierKey&) const = default;
};
struct TierKeyHash {
    std::size_t operator()(const TierKey& key) const
    {
        const std::hash<std::string_view> hash;
        return hash(key.site) * 0x9E3779B97F4A7C15U + hash(key.name);
    }
};

/// Rows of one piece of a file, read but not yet gathered. Columns have an entry a row, or none at all where no row has a value.
struct UnitPart {
    struct PartTier {
        std::string_view site, name; ///< In the piece's text.
        std::uint32_t floor = 0;     ///< Minor units; 0: none on these rows.
        std::uint32_t units = 0;
    };
    static constexpr std::int8_t kNoGrade = std::numeric_limits<std::int8_t>::min();
    static constexpr std::size_t kMostTiers = std::numeric_limits<std::uint16_t>::max();

    std::vector<PartTier> tiers;       ///< In order of first appearance, at most kMostTiers.
    std::vector<std::uint16_t> tier;   ///< Index into `tiers`.
    std::vector<std::uint32_t> asking; ///< Minor units.
    /// 48 bits of each name's hash: among a thousand tiers of a thousand units two names of a tier share one once in half a million lists.
    std::vector<std::uint32_t> hashLow;
    std::vector<std::uint16_t> hashHigh;
    std::vector<std::uint8_t> state;  ///< The status, and kLocked.
    std::vector<std::int8_t> grade;   ///< kNoGrade: none.
    std::vector<double> area, chance; ///< NaN: none.
    std::string names;                ///< One after the other; empty when forFigures.
    std::vector<std::uint32_t> nameEnds;

    static constexpr std::uint8_t kLocked = 0x80;
    std::size_t rows() const { return asking.size(); }
    std::string_view name(std::size_t row) const
    {
        const std::size_t begin = row == 0 ? 0 : nameEnds[row - 1];
        return std::string_view(names).substr(begin, nameEnds[row] - begin);
    }
};

/// Parts put together in file order, and then grouped by tier.
class UnitColumns
{
public:
    /// Takes the part over. False when a tier has two floors, or there are more rows than can be counted here.
    bool append(UnitPart part);
    /// After the last part. False when a tier has no floor, or there is no row. Then the tiers can be looked at, from several threads.
    bool group();

    std::size_t tiers() const { return m_tiers.size(); }
    std::size_t units() const { return m_rows; }
    /// The first tiers as far as they are appended, before or after group(). For the thread that appends.
    std::vector<TierSoFar> firstTiers(std::size_t most) const;
    /// False when two units of the tier have the same name or, hardly ever, only names of the same hash. `scratch` is the caller's.
    bool namesDiffer(std::size_t tier, std::vector<std::uint64_t>& scratch) const;
    /// Puts the tier into `out`, whose storage is used again. Without names where none were kept.
    void fill(std::size_t tier, Tier& out) const;

private:
    // A row's place is its part and its number in there, 16 bits each. A row has 16 bytes at least, so that a megabyte of them fits.
    static constexpr unsigned kRowBits = 16;
    static constexpr std::size_t kMostRows = std::size_t(1) << kRowBits;
    struct HeldTier {
        std::string site, name;
        std::uint32_t floor = 0;
        std::uint32_t units = 0;
    };

    struct HeldPart {
        UnitPart part;                    ///< Its `tier` is empty once grouped.
        std::vector<std::uint32_t> tiers; ///< From the part's tiers to ours; empty once grouped.
    };

    bool appendTiers(HeldPart& held);

    std::deque<HeldTier> m_tiers; ///< A deque: the keys below point into them.
    std::unordered_map<TierKey, std::uint32_t, TierKeyHash> m_byKey;
    std::deque<HeldPart> m_parts;
    std::size_t m_rows = 0;
    std::vector<std::uint32_t> m_order;  ///< Places of rows, tier by tier, in file order within each.
    std::vector<std::uint32_t> m_starts; ///< Of each tier in m_order, and the end.
};

} // namespace rungwright
