// SPDX-License-Identifier: GPL-3.0-or-later
// The commands that do the main job without a window. Results go to standard output or to --out, messages to standard error.
#pragma once

#include "request.h"

#include <span>

namespace rungwright
{

/// Figures of the chosen tiers, as a text table or as one JSON object.
ExitStatus measure(const Request& request);
/// The worklist as CSV: one row a tier, the greatest gap share first, tiers without one last.
ExitStatus scan(const Request& request);
/// The price sheet of one candidate as CSV, with the caution said.
ExitStatus sheet(const Request& request);
/// The bench of one tier as PNG, SVG or PDF.
ExitStatus picture(const Request& request);

/// Least change of the chosen tiers under price rules: candidates in a scenario, or a price sheet. Tiers without a ladder as wished are
/// told, each with its reason.
ExitStatus reshape(const Request& request);

struct Command {
    const char* word;
    const char* summary;
    std::span<const char* const> takes; ///< Names of the options it knows, --help aside.
    std::span<const char* const> needs; ///< Those that must be there.
    bool draws;                         ///< Draws with widgets, so it needs a (display-less) QApplication.
    ExitStatus (*run)(const Request&);
};

std::span<const Command> commands();
/// The command of that word, or nullptr.
const Command* findCommand(const QString& word);

} // namespace rungwright
