// SPDX-License-Identifier: GPL-3.0-or-later
#include "file_kind.h"

namespace rungwright
{

bool looksLikeScenario(const QByteArray& bytes, const QString& fileName)
{
    const qsizetype start = bytes.startsWith("\xEF\xBB\xBF") ? 3 : 0;
    const QByteArray begin = bytes.mid(start, 4096).trimmed();
    if (begin.startsWith('{') || begin.startsWith('['))
        return true;
    if (!fileName.endsWith(QLatin1String(".json"), Qt::CaseInsensitive))
        return false;
    const QByteArray firstLine = begin.left(begin.indexOf('\n') < 0 ? begin.size() : begin.indexOf('\n'));
    return !firstLine.contains(',');
}

} // namespace rungwright
