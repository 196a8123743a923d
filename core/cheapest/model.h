// SPDX-License-Identifier: GPL-3.0-or-later
// The availability models: five answers, and one continuous form, to "what will the enquirer find?"
#pragma once

#include "ladder/ladder.h"

#include <array>
#include <optional>
#include <string_view>

namespace rungwright
{

enum class ModelKind : unsigned char {
    perceived, ///< Perceived range: N independent draws from the prices on offer.
    fitted,    ///< Fitted range: the same from a beta distribution on [floor, highest], by the method of moments.
    remainder, ///< Random remainder: k of the M rentable units left, all sets equally likely.
    unit,      ///< Unit by unit: each rentable unit free with its own chance, independently.
    turnover,  ///< Cheapest-first turnover: the stationary state of an Erlang loss system with ordered hunting.
    onHand,    ///< On hand: exactly what is on offer now.
};

inline constexpr std::array kModels{ModelKind::perceived, ModelKind::fitted,   ModelKind::remainder,
                                    ModelKind::unit,      ModelKind::turnover, ModelKind::onHand};

/// The model's word in files and commands: "perceived", "fitted", "remainder", "unit", "turnover", "on-hand".
std::string_view modelWord(ModelKind kind);
std::optional<ModelKind> modelFromWord(std::string_view word);

/// The units a model works on: those on offer for perceived, fitted and onHand; the rentable ones for the rest.
Among modelUnits(ModelKind kind);

/// True for the models whose gap depends on a number left that the user may set (perceived, fitted, remainder).
bool takesLeft(ModelKind kind);

/// A model and its settings. What is not set is inferred from the tier.
struct ModelSettings {
    ModelKind kind = ModelKind::perceived;
    /// N or k, >= 1. Default: the number on offer. remainder: at most M (a larger k counts as M).
    std::optional<int> left;
    /// Offered load a > 0 (arrival rate x mean stay) for turnover. Default: inferred from the units taken.
    std::optional<double> load;

    bool operator==(const ModelSettings&) const = default;
};

} // namespace rungwright
