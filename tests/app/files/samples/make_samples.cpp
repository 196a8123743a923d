// SPDX-License-Identifier: GPL-3.0-or-later
// Writes the sample scenarios and unit lists into a folder: make_samples sample-scenarios
#include "sample_files.h"

#include <QDir>
#include <QTextStream>

int main(int count, char** words)
{
    QTextStream err(stderr);
    if (count != 2) {
        err << "make_samples FOLDER: writes the sample scenarios and unit lists there\n";
        return 2;
    }
    const QDir folder(QString::fromLocal8Bit(words[1]));
    for (const rungwright::samples::SampleFile& file : rungwright::samples::sampleFiles()) {
        QFile out(folder.filePath(file.name));
        if (!out.open(QIODevice::WriteOnly) || out.write(file.bytes) != file.bytes.size() || !out.flush()) {
            err << out.fileName() << ": " << out.errorString() << "\n";
            return 4;
        }
    }
    return 0;
}
