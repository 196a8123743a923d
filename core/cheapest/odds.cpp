// SPDX-License-Identifier: GPL-3.0-or-later
#include "cheapest/odds.h"

#include "cheapest/erlang.h"

#include <algorithm>
#include <cassert>
#include <cmath>

namespace rungwright
{

namespace
{

struct Counts {
    int rentable = 0;
    int onOffer = 0;
};

Counts countsOf(std::span<const Unit> units)
{
    return {static_cast<int>(std::ranges::count_if(units, &Unit::rentable)),
            static_cast<int>(std::ranges::count_if(units, &Unit::onOffer))};
}

void perceivedOdds(int n, std::vector<double>& odds)
{
    const auto m = static_cast<double>(odds.size());
    double reached = 1; // ((m-i)/m)^n: every draw lies beyond rung i.
    for (std::size_t i = 0; i < odds.size(); ++i) {
        const double next = std::pow((m - static_cast<double>(i) - 1) / m, n);
        odds[i] = reached - next;
        reached = next;
    }
}

void remainderOdds(int k, std::vector<double>& odds)
{
    const auto m = static_cast<double>(odds.size());
    double w = k / m;
    for (std::size_t i = 0; i < odds.size(); ++i) {
        odds[i] = w;
        const double place = static_cast<double>(i) + 1;
        w = place < m ? w * std::max(0.0, m - place - k + 1) / (m - place) : 0;
    }
}

double unitOdds(std::span<const Rung> ladder, std::span<const Unit> units, double tierShare, std::vector<double>& odds)
{
    double noneSoFar = 1;
    for (std::size_t i = 0; i < ladder.size(); ++i) {
        const double chance = units[ladder[i].unit].vacancyChance.value_or(tierShare);
        odds[i] = chance * noneSoFar;
        noneSoFar *= 1 - chance;
    }
    return noneSoFar;
}

/// B(i-1) - B(i) = B(i-1) (F(i-1) + 1) / (i + a B(i-1)) with F the mean number free (see meanFree()): nothing cancels.
double turnoverOdds(double a, std::vector<double>& odds)
{
    double loss = 1;
    double free = 0;
    for (std::size_t i = 0; i < odds.size(); ++i) {
        const auto servers = static_cast<double>(i + 1);
        const double share = 1 / (servers + a * loss);
        const double ratio = (free + 1) * share;
        odds[i] = loss * ratio;
        free = servers * ratio;
        loss *= a * share;
    }
    return loss;
}

} // namespace

Settled settled(std::span<const Rung> ladder, std::span<const Unit> units, const ModelSettings& settings)
{
    const Counts counts = countsOf(units);
    const bool amongOffered = modelUnits(settings.kind) == Among::onOffer;
    assert(static_cast<int>(ladder.size()) == (amongOffered ? counts.onOffer : counts.rentable));
    Settled inputs;
    if (ladder.empty()) {
        inputs.note = amongOffered ? OddsNote::nothingOnOffer : OddsNote::nothingRentable;
        return inputs;
    }
    switch (settings.kind) {
    case ModelKind::perceived:
    case ModelKind::fitted:
        inputs.left = std::max(1, settings.left.value_or(counts.onOffer));
        break;
    case ModelKind::remainder:
        if (!settings.left && counts.onOffer == 0)
            inputs.note = OddsNote::nothingOnOffer;
        else
            inputs.left = std::clamp(settings.left.value_or(counts.onOffer), 1, counts.rentable);
        break;
    case ModelKind::unit:
        inputs.share = static_cast<double>(counts.onOffer) / counts.rentable;
        if (std::ranges::all_of(ladder, [&](const Rung& rung) { return units[rung.unit].vacancyChance.value_or(inputs.share) <= 0; }))
            inputs.note = OddsNote::neverFree;
        break;
    case ModelKind::turnover:
        inputs.load =
            settings.load && *settings.load > 0 ? settings.load : loadForCarried(counts.rentable, counts.rentable - counts.onOffer);
        if (!inputs.load)
            inputs.note = counts.onOffer == 0 ? OddsNote::tierFull : OddsNote::tierEmpty;
        break;
    case ModelKind::onHand:
        break;
    }
    return inputs;
}

void cheapestOdds(std::span<const Rung> ladder, std::span<const Unit> units, const ModelSettings& settings, CheapestOdds& out)
{
    const Settled inputs = settled(ladder, units, settings);
    out.perRung.clear();
    out.none = 1;
    out.left = inputs.left;
    out.load = inputs.load;
    out.note = inputs.note;
    if (inputs.note)
        return;

    out.perRung.resize(ladder.size());
    out.none = 0;
    switch (settings.kind) {
    case ModelKind::perceived:
    case ModelKind::fitted:
        perceivedOdds(*inputs.left, out.perRung);
        break;
    case ModelKind::remainder:
        remainderOdds(*inputs.left, out.perRung);
        break;
    case ModelKind::unit:
        out.none = unitOdds(ladder, units, inputs.share, out.perRung);
        break;
    case ModelKind::turnover:
        out.none = turnoverOdds(*inputs.load, out.perRung);
        break;
    case ModelKind::onHand:
        out.perRung.front() = 1;
        break;
    }
}

std::vector<double> sharedAmongTies(std::span<const Rung> ladder, const CheapestOdds& odds)
{
    std::vector<double> shared = odds.perRung;
    assert(shared.empty() || shared.size() == ladder.size());
    for (std::size_t from = 0; from < shared.size();) {
        std::size_t to = from;
        double sum = 0;
        for (; to < shared.size() && ladder[to].price == ladder[from].price; ++to)
            sum += shared[to];
        const auto tied = static_cast<double>(to - from);
        std::fill(shared.begin() + static_cast<std::ptrdiff_t>(from), shared.begin() + static_cast<std::ptrdiff_t>(to), sum / tied);
        from = to;
    }
    return shared;
}

} // namespace rungwright
