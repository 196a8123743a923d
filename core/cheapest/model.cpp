// SPDX-License-Identifier: GPL-3.0-or-later
#include "cheapest/model.h"

#include <algorithm>
#include <utility>

namespace rungwright
{

namespace
{

constexpr std::array<std::pair<ModelKind, std::string_view>, kModels.size()> kModelWords{{
    {ModelKind::perceived, "perceived"},
    {ModelKind::fitted, "fitted"},
    {ModelKind::remainder, "remainder"},
    {ModelKind::unit, "unit"},
    {ModelKind::turnover, "turnover"},
    {ModelKind::onHand, "on-hand"},
}};

} // namespace

std::string_view modelWord(ModelKind kind)
{
    return std::ranges::find(kModelWords, kind, &std::pair<ModelKind, std::string_view>::first)->second;
}

std::optional<ModelKind> modelFromWord(std::string_view word)
{
    const auto found = std::ranges::find(kModelWords, word, &std::pair<ModelKind, std::string_view>::second);
    return found == kModelWords.end() ? std::nullopt : std::optional(found->first);
}

Among modelUnits(ModelKind kind)
{
    switch (kind) {
    case ModelKind::perceived:
    case ModelKind::fitted:
    case ModelKind::onHand:
        return Among::onOffer;
    case ModelKind::remainder:
    case ModelKind::unit:
    case ModelKind::turnover:
        return Among::rentable;
    }
    return Among::rentable;
}

bool takesLeft(ModelKind kind) { return kind == ModelKind::perceived || kind == ModelKind::fitted || kind == ModelKind::remainder; }

} // namespace rungwright
