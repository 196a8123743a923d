// SPDX-License-Identifier: GPL-3.0-or-later
#include "streams.h"

#include <QFile>
#include <QFileInfo>

#include <cerrno>
#include <fcntl.h>
#include <unistd.h>
#include <utility>

namespace rungwright
{

namespace
{

/// 0, or the errno of what went wrong.
int writeAll(int descriptor, QByteArrayView bytes)
{
    while (!bytes.isEmpty()) {
        const ssize_t written = ::write(descriptor, bytes.data(), std::size_t(bytes.size()));
        if (written < 0 && errno == EINTR)
            continue;
        if (written < 0)
            return errno;
        bytes = bytes.sliced(written);
    }
    return 0;
}

int writeAll(int descriptor, const NextPiece& next)
{
    int error = 0;
    for (QByteArrayView piece = next(); error == 0 && !piece.isEmpty(); piece = next())
        error = writeAll(descriptor, piece);
    return error;
}

/// All of it as one piece.
NextPiece onePiece(const QByteArray& bytes)
{
    return [&bytes, given = false]() mutable { return std::exchange(given, true) ? QByteArrayView() : QByteArrayView(bytes); };
}

Trouble cannotWrite(const QString& what, const QString& why)
{
    return {QStringLiteral("%1: cannot be written: %2").arg(what, why).toStdString()};
}

Outcome<bool> writeThrough(const QString& path, const NextPiece& next)
{
    QFile file(path);
    if (!file.open(QIODevice::WriteOnly | QIODevice::Unbuffered))
        return cannotWrite(path, file.errorString());
    if (const int error = writeAll(file.handle(), next))
        return cannotWrite(path, qt_error_string(error));
    return true;
}

} // namespace

void guardStandardStreams()
{
    // The lowest free number is what open() gives, so a closed stream gets its own number back. Standard output is held by a
    // descriptor that cannot be written to: the first write reports the closed stream.
    for (const int stream : {STDIN_FILENO, STDOUT_FILENO, STDERR_FILENO}) {
        if (::fcntl(stream, F_GETFD) == -1 && errno == EBADF) [[maybe_unused]]
            const int held = ::open("/dev/null", stream == STDERR_FILENO ? O_WRONLY : O_RDONLY);
    }
}

void say(const QString& message)
{
    QString harmless = message;
    for (QChar& c : harmless) {
        if (c.category() == QChar::Other_Control && c != QLatin1Char('\n'))
            c = QLatin1Char(' ');
    }
    QByteArray text = harmless.toUtf8();
    if (!text.endsWith('\n'))
        text += '\n';
    writeAll(STDERR_FILENO, QByteArrayView(text));
}

ExitStatus refuse(ExitStatus status, const std::string& message)
{
    say(QString::fromStdString(message));
    return status;
}

Outcome<bool> writeToStandardOutput(const QByteArray& bytes) { return writeToStandardOutput(onePiece(bytes)); }

Outcome<bool> writeToStandardOutput(const NextPiece& next)
{
    if (const int error = writeAll(STDOUT_FILENO, next))
        return cannotWrite(QStringLiteral("standard output"), qt_error_string(error));
    // Some file systems report a full disk or a lost server only on close.
    const int copy = ::dup(STDOUT_FILENO);
    if (copy == -1 || ::close(copy) == -1)
        return cannotWrite(QStringLiteral("standard output"), qt_error_string(errno));
    return true;
}

Outcome<bool> writeOut(const QString& path, const QByteArray& bytes) { return writeOut(path, onePiece(bytes)); }

Outcome<bool> writeOut(const QString& path, const NextPiece& next)
{
    const QFileInfo there(path);
    return there.exists() && !there.isFile() && !there.isDir() ? writeThrough(path, next) : writeWhole(path, next);
}

bool sameFile(const QString& a, const QString& b)
{
    const QString first = QFileInfo(a).canonicalFilePath();
    return !first.isEmpty() && first == QFileInfo(b).canonicalFilePath();
}

} // namespace rungwright
