// SPDX-License-Identifier: GPL-3.0-or-later
#include "recent_files.h"

#include <QFileInfo>

namespace rungwright
{

namespace
{

const auto kKey = QStringLiteral("recentFiles");

} // namespace

QStringList RecentFiles::list() const
{
    QStringList there;
    for (const QString& path : m_settings.value(kKey).toStringList()) {
        if (QFileInfo::exists(path))
            there << path;
    }
    return there;
}

void RecentFiles::add(const QString& path)
{
    const QString absolute = QFileInfo(path).absoluteFilePath();
    QStringList paths = m_settings.value(kKey).toStringList();
    paths.removeAll(absolute);
    paths.prepend(absolute);
    m_settings.setValue(kKey, QStringList(paths.mid(0, kRecentFilesKept)));
}

void RecentFiles::clear() { m_settings.remove(kKey); }

} // namespace rungwright
