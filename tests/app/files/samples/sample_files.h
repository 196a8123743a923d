// SPDX-License-Identifier: GPL-3.0-or-later
// Every sample file by name.
#pragma once

#include <QByteArray>
#include <QString>

#include <vector>

namespace rungwright::samples
{

struct SampleFile {
    QString name;
    QByteArray bytes;
};

std::vector<SampleFile> sampleFiles();

} // namespace rungwright::samples
