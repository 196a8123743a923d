// SPDX-License-Identifier: GPL-3.0-or-later
// The scenarios opened last, newest first.
#pragma once

#include <QSettings>
#include <QStringList>

namespace rungwright
{

inline constexpr int kRecentFilesKept = 10;

/// Kept in the user's settings; files that are gone are left out of list().
class RecentFiles
{
public:
    explicit RecentFiles(QSettings& settings) : m_settings(settings) {}
    QStringList list() const;
    void add(const QString& path);
    void clear();

private:
    QSettings& m_settings;
};

} // namespace rungwright
