// SPDX-License-Identifier: GPL-3.0-or-later
// Mounts for tests that want a disk that is full or may only be read.
#pragma once

#include <QByteArray>
#include <QFile>
#include <QString>

#include <sched.h>
#include <sys/mount.h>
#include <unistd.h>

namespace rungwright::tests
{

inline void writeLine(const char* path, const QByteArray& line)
{
    QFile file(QString::fromLatin1(path));
    if (file.open(QIODevice::WriteOnly))
        file.write(line);
}

// A mount table of our own, so that what is mounted here is seen by this process and its children only and goes with them. Root may
// have one; elsewhere a user namespace may give the right. To be called while there is one thread.
inline bool ownMountTable()
{
    const uid_t user = getuid();
    const gid_t group = getgid();
    if (unshare(CLONE_NEWNS) != 0) {
        if (unshare(CLONE_NEWUSER | CLONE_NEWNS) != 0)
            return false;
        writeLine("/proc/self/setgroups", "deny");
        writeLine("/proc/self/uid_map", "0 " + QByteArray::number(user) + " 1");
        writeLine("/proc/self/gid_map", "0 " + QByteArray::number(group) + " 1");
    }
    return mount("none", "/", nullptr, MS_REC | MS_PRIVATE, nullptr) == 0;
}

} // namespace rungwright::tests
