// SPDX-License-Identifier: GPL-3.0-or-later
// Mappings kept: as small JSON files, and in a folder of them.
#pragma once

#include "mapping.h"
#include "outcome.h"

#include <QByteArray>

namespace rungwright
{

inline constexpr int kMappingVersion = 1;

/// A mapping under the name the user gave it.
struct MappingProfile {
    QString name; ///< Not empty, no line ends.
    ImportMapping mapping;

    bool operator==(const MappingProfile&) const = default;
};

/// UTF-8 JSON ("format": "rungwright-mapping"), keys in a fixed order: two writings of equal profiles are byte-identical.
QByteArray mappingToJson(const MappingProfile& profile);
/// Reads what mappingToJson writes. Messages start with `fileName` and name line and column for malformed JSON, or the place
/// ("columns.status.header") for a wrong value, what was found and what is wanted. A newer version is refused. What is read passes
/// mappingTrouble().
Outcome<MappingProfile> mappingFromJson(const QByteArray& json, const QString& fileName);

Outcome<MappingProfile> loadMapping(const QString& path);
/// Whole or not at all, and only what can be read again. A mapping that is not complete (mappingTrouble) is not saved.
Outcome<bool> saveMapping(const MappingProfile& profile, const QString& path);

/// A folder of profiles, `*.mapping.json`. Reads the folder anew at every call: it holds few and small files.
class MappingShelf
{
public:
    /// The folder need not exist yet; saving makes it.
    explicit MappingShelf(QString folder) : m_folder(std::move(folder)) {}

    struct Entry {
        QString path;
        MappingProfile profile;
    };

    /// By name, in any case of letters. Files that cannot be read are left out; `troubles` (if given) gets a line for each.
    std::vector<Entry> list(QStringList* troubles = nullptr) const;
    /// The profiles that may fit a file with these headers, the best first: the same headers in the same order, the same in another order,
    /// then those whose headers are all there, the one with fewest new columns first. Headers are compared trimmed, in any case of letters.
    std::vector<Entry> matching(const QStringList& headers) const;
    /// The profile for the layout of this sample: each profile's own encoding, delimiter and header row are tried on it.
    std::vector<Entry> matchingSample(const QByteArray& beginning, bool whole) const;
    /// Replaces the profile of that name (in any case of letters), else adds a file. The path written to.
    Outcome<QString> save(const MappingProfile& profile) const;
    /// True when it is gone afterwards. Only paths that list() gives are removed.
    Outcome<bool> remove(const QString& path) const;

private:
    QString m_folder;
};

} // namespace rungwright
