// SPDX-License-Identifier: GPL-3.0-or-later
// What a command was asked to do, and how it ended.
#pragma once

#include "cheapest/model.h"
#include "reshape_wish.h"

#include <QString>
#include <QStringList>

#include <optional>

namespace rungwright
{

/// The exit status of every command.
enum class ExitStatus : int {
    done = 0,
    wrongUsage = 2,   ///< An option, a value or a name on the command line that does not hold.
    inputRefused = 3, ///< FILE cannot be read, or what it holds is refused.
    cannotWrite = 4,  ///< The file or standard output could not be written whole.
    tiersWithout = 5, ///< Some tiers have no ladder as wished; the others are written.
};

/// One command line, read. What was not said is empty.
struct Request {
    QString file;
    std::optional<QString> site;
    std::optional<QString> tier;
    std::optional<QString> candidate;
    std::optional<ModelKind> model;
    std::optional<int> left;    ///< >= 1.
    std::optional<double> load; ///< Finite, > 0.
    QString currency;           ///< A code findCurrency() knows, or empty.
    std::optional<int> threads; ///< >= 1; without it as many as the machine has.
    QString out;
    QString mapping;     ///< Path of the profile FILE is read through; empty for a list of our own format.
    QString floors;      ///< Path of a file of floors beside a mapped list; empty for none.
    ReshapeWish reshape; ///< Of the command `reshape` only.
    bool json = false;
    bool withoutBadRows = false;
    bool help = false; ///< Only help was asked for; the rest is empty.
};

} // namespace rungwright
