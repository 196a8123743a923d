// SPDX-License-Identifier: GPL-3.0-or-later
// Names to suggest for files.
#pragma once

#include <QString>
#include <QStringList>

namespace rungwright
{

/// "North quay Berths 8 m Lower end.csv": the parts one after the other, without what file systems refuse or a shell could trip over, each
/// part and the whole cut to what they take (255 bytes). Empty parts are left out; a name of nothing becomes "sheet".
QString fileNameFrom(const QStringList& parts, const QString& suffix);

/// `path` as it is when its file name has a suffix; else with `suffix` added, unless that would be a file that is already there: nobody
/// agreed to overwrite that one.
QString withSuffix(const QString& path, const QString& suffix);

} // namespace rungwright
