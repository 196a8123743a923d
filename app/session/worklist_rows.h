// SPDX-License-Identifier: GPL-3.0-or-later
// One row of figures for every tier, and what it is flagged for.
#pragma once

#include "gap/measure.h"
#include "scenario.h"

#include <QString>

#include <array>
#include <atomic>
#include <bit>
#include <cstdint>
#include <functional>
#include <optional>
#include <vector>

namespace rungwright
{

/// What a tier is flagged for. Which of them depend on the user's thresholds is said beside them.
enum class Flag : unsigned char {
    noneOnOffer,    ///< No unit is on offer.
    noFloor,        ///< No advertised floor is known.
    floorNotOnSale, ///< Units are on offer, none of them at the advertised floor or below.
    belowFloor,     ///< A unit on offer is asked for less than the floor.
    wideGap,        ///< The gap is at least FlagThresholds::gapShare of the floor.
    leansLeft,      ///< g1 lies below FlagThresholds::leansLeft.
    lastUnits,      ///< At most FlagThresholds::lastUnits on offer, and at least one.
    inversions,     ///< A unit of higher grade is asked for less than one of lower grade.
};

inline constexpr std::array kFlags{Flag::noneOnOffer, Flag::noFloor,   Flag::floorNotOnSale, Flag::belowFloor,
                                   Flag::wideGap,     Flag::leansLeft, Flag::lastUnits,      Flag::inversions};

class FlagSet
{
public:
    bool has(Flag flag) const { return m_bits & bit(flag); }
    void set(Flag flag, bool on = true) { m_bits = static_cast<std::uint8_t>(on ? m_bits | bit(flag) : m_bits & ~bit(flag)); }
    bool empty() const { return m_bits == 0; }
    int count() const { return std::popcount(m_bits); }
    bool meets(FlagSet other) const { return m_bits & other.m_bits; }
    std::uint8_t bits() const { return m_bits; }
    bool operator==(const FlagSet&) const = default;

private:
    static constexpr unsigned bit(Flag flag) { return 1U << static_cast<unsigned>(flag); }
    std::uint8_t m_bits = 0;
};

/// "floor not on sale"; and several, in the order of kFlags, with commas between.
QString flagWord(Flag flag);
QString flagWords(FlagSet flags);

/// The figures of a tier's current ladder under the tier's own model, bare: money in minor units. What is undefined is empty.
struct WorklistRow {
    std::uint32_t onOffer = 0;
    std::uint32_t rentable = 0;
    std::uint32_t atFloor = 0;    ///< On offer at the advertised floor or below.
    std::uint32_t belowFloor = 0; ///< On offer below it.
    bool inversions = false;
    bool measured = false; ///< False while the figures are still being computed: nothing else is to be believed.
    Price floor;           ///< 0 = none is known.
    std::optional<double> cheapest;
    std::optional<double> gap;
    std::optional<double> share; ///< Gap share.
    std::optional<double> lean;  ///< g1.

    bool operator==(const WorklistRow&) const = default;
};

WorklistRow measureRow(Measurer& measurer, const TierCase& tierCase);
/// None for a row that is not measured yet.
FlagSet flagsOf(const WorklistRow& row, const FlagThresholds& thresholds);

/// Rows from `first` on, measured.
using RowsReady = std::function<void(std::size_t first, std::vector<WorklistRow> rows)>;
/// Measures every tier by `threads` threads (0 = as many as the machine has), the calling one included, and hands over pieces as they get
/// ready, from any of the threads and in no order. False when `cancel` put an early end to it.
bool measureRows(const TierList& tiers, unsigned threads, const std::atomic<bool>& cancel, const RowsReady& ready);

/// Whether tiers are so many that a window would stand still while they are measured.
bool takesLong(const TierList& tiers);

} // namespace rungwright
