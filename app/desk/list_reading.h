// SPDX-License-Identifier: GPL-3.0-or-later
// What goes on off the window's thread when a file is brought in: looking at it, reading it. No widgets.
#pragma once

#include "list_so_far.h"
#include "mapped_list.h"
#include "mapping_propose.h"
#include "scenario.h"

#include <memory>
#include <optional>
#include <vector>

namespace rungwright
{

/// A file looked at for the first time.
struct FirstLook {
    bool isScenario = false;
    bool ownFormat = false;   ///< A unit list of our own format, plainly.
    bool readable = true;     ///< False for what is no text at all: then the unit list reader has the words for it.
    ListSample sample;        ///< Of a list.
    MappingProposal proposal; ///< Of a list that is not of our own format; of one that is, proposeMapping() makes it once it is wanted.
    QString trouble;          ///< Not empty: it cannot be read.
};
FirstLook lookAt(const QString& path);

/// How a list is to be read.
struct ListRequest {
    QString path;
    std::optional<ImportMapping> mapping; ///< None: our own format.
    QString floors;                       ///< Path of the file of floors, for a mapping that asks for one.
    UnitListOptions options;
    QByteArray bytes; ///< The whole list where it is small or came from a pipe; else empty, and it is read from `path`.
    bool forRefresh = false;
};

/// A list that was read: what it says of itself, and its tiers.
struct ReadList {
    UnitListResult said;                           ///< Without its tiers.
    TierList tiers;                                ///< Empty for a refresh, which wants
    std::shared_ptr<std::vector<TierCase>> listed; ///< these.
    std::size_t tierCount = 0;
    QStringList notes; ///< What a mapping passed over, and the like.
};
/// `tell` hears of the rows of a long list while it is read, from the calling thread.
ReadList readList(const ListRequest& request, const Progress& progress, const TellSoFar& tell = {});

/// A scenario read from a file.
struct ReadScenario {
    Scenario scenario;
    QString trouble; ///< Not empty: nothing could be taken.
};
/// From `bytes` when there are any, else from the file.
ReadScenario readScenario(const QString& path, const QByteArray& bytes = {});

} // namespace rungwright
