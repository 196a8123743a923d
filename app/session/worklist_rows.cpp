// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_rows.h"

#include <QCoreApplication>
#include <QStringList>

#include <algorithm>
#include <thread>
#include <utility>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("Worklist", text); }

/// Tiers a piece: small enough to see figures come in, large enough that handing over costs nothing.
constexpr std::size_t kPiece = 128;
/// About what is measured in the time of a few frames.
constexpr std::size_t kManyUnits = 5'000;
constexpr std::size_t kManyTiers = 200;

} // namespace

QString flagWord(Flag flag)
{
    switch (flag) {
    case Flag::noneOnOffer:
        return tr("none on offer");
    case Flag::noFloor:
        return tr("no floor");
    case Flag::floorNotOnSale:
        return tr("floor not on sale");
    case Flag::belowFloor:
        return tr("below floor");
    case Flag::wideGap:
        return tr("wide gap");
    case Flag::leansLeft:
        return tr("leans left");
    case Flag::lastUnits:
        return tr("last units");
    case Flag::inversions:
        return tr("inversions");
    }
    return {};
}

QString flagWords(FlagSet flags)
{
    QStringList words;
    for (const Flag flag : kFlags) {
        if (flags.has(flag))
            words << flagWord(flag);
    }
    return words.join(QStringLiteral(", "));
}

WorklistRow measureRow(Measurer& measurer, const TierCase& tierCase)
{
    const Measurement& m = measurer.measure(tierCase.tier, askingPrices(tierCase.tier.units), tierCase.model, MeasureParts::figuresOnly);
    WorklistRow row;
    row.onOffer = static_cast<std::uint32_t>(m.onOffer);
    row.rentable = static_cast<std::uint32_t>(m.rentable);
    row.atFloor = static_cast<std::uint32_t>(m.atFloor);
    row.belowFloor = static_cast<std::uint32_t>(m.belowFloor);
    row.inversions = m.figures.inversions > 0;
    row.measured = true;
    row.floor = tierCase.tier.advertisedFloor;
    row.cheapest = m.gap.expectedCheapest;
    row.gap = m.gap.gap;
    row.share = m.gap.gapShare;
    row.lean = m.figures.skew.moment;
    return row;
}

FlagSet flagsOf(const WorklistRow& row, const FlagThresholds& thresholds)
{
    FlagSet flags;
    if (!row.measured)
        return flags;
    const bool hasFloor = row.floor.minor > 0;
    flags.set(Flag::noneOnOffer, row.onOffer == 0);
    flags.set(Flag::noFloor, !hasFloor);
    flags.set(Flag::floorNotOnSale, hasFloor && row.onOffer > 0 && row.atFloor == 0);
    flags.set(Flag::belowFloor, row.belowFloor > 0);
    flags.set(Flag::wideGap, row.share && *row.share >= thresholds.gapShare);
    flags.set(Flag::leansLeft, row.lean && *row.lean < thresholds.leansLeft);
    flags.set(Flag::lastUnits, row.onOffer > 0 && static_cast<std::int64_t>(row.onOffer) <= thresholds.lastUnits);
    flags.set(Flag::inversions, row.inversions);
    return flags;
}

bool measureRows(const TierList& tiers, unsigned threads, const std::atomic<bool>& cancel, const RowsReady& ready)
{
    const std::size_t pieces = (tiers.size() + kPiece - 1) / kPiece;
    std::atomic<std::size_t> next = 0;
    const auto run = [&] {
        Measurer measurer;
        for (std::size_t piece = next++; piece < pieces; piece = next++) {
            const std::size_t first = piece * kPiece;
            const std::size_t end = std::min(tiers.size(), first + kPiece);
            std::vector<WorklistRow> rows;
            rows.reserve(end - first);
            for (std::size_t i = first; i < end; ++i) {
                if (cancel)
                    return;
                rows.push_back(measureRow(measurer, tiers[i]));
            }
            ready(first, std::move(rows));
        }
    };
    {
        std::vector<std::jthread> others;
        const std::size_t useful = std::min<std::size_t>(threads > 0 ? threads : std::max(1U, std::thread::hardware_concurrency()), pieces);
        for (std::size_t i = 1; i < useful; ++i)
            others.emplace_back(run);
        run();
    }
    return !cancel;
}

bool takesLong(const TierList& tiers)
{
    if (tiers.size() > kManyTiers)
        return true;
    std::size_t units = 0;
    for (const TierCase& tierCase : tiers)
        units += tierCase.tier.units.size();
    return units > kManyUnits;
}

} // namespace rungwright
