// SPDX-License-Identifier: GPL-3.0-or-later
#include "whole_file.h"

#include "words.h"

#include <QFileInfo>
#include <QSaveFile>

#include <algorithm>
#include <utility>

namespace rungwright
{

Outcome<QByteArray> readWhole(const QString& path, qint64 most)
{
    if (QFileInfo(path).isDir())
        return Trouble{Words::tr("%1: is a folder, not a file").arg(path).toStdString()};
    QFile file(path);
    if (!file.open(QIODevice::ReadOnly))
        return Trouble{Words::tr("%1: cannot be opened: %2").arg(path, file.errorString()).toStdString()};
    return readRest(file, most);
}

Outcome<QByteArray> readRest(QFile& file, qint64 most)
{
    constexpr qint64 piece = 1'048'576;
    const QString path = file.fileName();
    QByteArray bytes;
    for (QByteArray more = file.read(piece); !more.isEmpty(); more = file.read(piece)) {
        bytes += more;
        // Counted while reading, not asked beforehand: a pipe or a growing file does not know its size.
        if (bytes.size() > most)
            return Trouble{
                Words::tr("%1: is larger than %2 MB, which no such file should be").arg(path, QString::number(most >> 20)).toStdString()};
    }
    if (file.error() != QFileDevice::NoError)
        return Trouble{Words::tr("%1: cannot be read: %2").arg(path, file.errorString()).toStdString()};
    return bytes;
}

Outcome<bool> writeWhole(const QString& path, const QByteArray& bytes)
{
    bool given = false;
    return writeWhole(path, [&bytes, &given] { return std::exchange(given, true) ? QByteArrayView() : QByteArrayView(bytes); });
}

Outcome<bool> writeWhole(const QString& path, const NextPiece& next)
{
    const QFileInfo there(path);
    const bool existed = there.exists();
    // Replacing a device, a pipe or a terminal would take it away from everyone else.
    if (existed && !there.isFile() && !there.isDir())
        return Trouble{Words::tr("%1: cannot be written: it is not a regular file").arg(path).toStdString()};
    QSaveFile file(path);
    // Unbuffered: QSaveFile's commit() forgets an error that it meets while emptying the buffer (Qt 6.4), and would put a torn file in
    // place.
    bool done = file.open(QIODevice::WriteOnly | QIODevice::Unbuffered);
    // A disk that fills up takes a part without a word; only writing the rest brings the reason.
    for (QByteArrayView piece = done ? next() : QByteArrayView(); done && !piece.isEmpty();) {
        const qint64 taken = file.write(piece.data(), piece.size());
        done = taken > 0;
        piece = taken < piece.size() ? piece.sliced(std::max<qint64>(taken, 0)) : next();
    }
    if (done && file.commit())
        return true;
    const QString reason = file.errorString();
    file.cancelWriting();
    return Trouble{(existed ? Words::tr("%1: cannot be written: %2. The file that was there is unchanged").arg(path, reason)
                            : Words::tr("%1: cannot be written: %2. Nothing was left behind").arg(path, reason))
                       .toStdString()};
}

} // namespace rungwright
