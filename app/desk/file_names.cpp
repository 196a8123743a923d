// SPDX-License-Identifier: GPL-3.0-or-later
#include "file_names.h"

#include <QFileInfo>
#include <QTextBoundaryFinder>

namespace rungwright
{

namespace
{

constexpr qsizetype kPartBytes = 70; // three parts, two blanks and a suffix stay below 255

QString cleaned(const QString& part)
{
    QString clean;
    for (const QChar c : part) {
        const bool refused = c.category() == QChar::Other_Control || QStringLiteral("/\\:*?\"<>|").contains(c);
        clean += refused ? QChar(u'-') : c;
    }
    clean = clean.simplified();
    while (clean.startsWith(u'.') || clean.startsWith(u'-'))
        clean.remove(0, 1);
    return clean.trimmed();
}

/// Cut between two characters as a reader sees them.
QString cut(const QString& text)
{
    if (text.toUtf8().size() <= kPartBytes)
        return text;
    QTextBoundaryFinder finder(QTextBoundaryFinder::Grapheme, text);
    qsizetype end = 0;
    for (qsizetype next = finder.toNextBoundary(); next >= 0; next = finder.toNextBoundary()) {
        if (text.left(next).toUtf8().size() > kPartBytes)
            break;
        end = next;
    }
    return text.left(end).trimmed();
}

} // namespace

QString fileNameFrom(const QStringList& parts, const QString& suffix)
{
    QStringList kept;
    for (const QString& part : parts) {
        const QString clean = cut(cleaned(part));
        if (!clean.isEmpty())
            kept << clean;
    }
    return (kept.isEmpty() ? QStringLiteral("sheet") : kept.join(u' ')) + u'.' + suffix;
}

QString withSuffix(const QString& path, const QString& suffix)
{
    if (!QFileInfo(path).suffix().isEmpty())
        return path;
    const QString with = path + u'.' + suffix;
    return QFileInfo::exists(with) ? path : with;
}

} // namespace rungwright
