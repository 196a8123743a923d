// SPDX-License-Identifier: GPL-3.0-or-later
#include "words.h"

namespace rungwright
{

namespace
{

// A terminal obeys control characters and a table shows them as nothing: both mislead, so they are spelled out.
QString withoutControls(const QString& text)
{
    QString out;
    out.reserve(text.size());
    for (const QChar c : text) {
        if (c == u'\n')
            out += QStringLiteral("\\n");
        else if (c == u'\r')
            out += QStringLiteral("\\r");
        else if (c == u'\t')
            out += QStringLiteral("\\t");
        else if (c.category() == QChar::Other_Control)
            out += QStringLiteral("\\x%1").arg(c.unicode(), 2, 16, QLatin1Char('0'));
        else
            out += c;
    }
    return out;
}

} // namespace

QString shownText(const QString& text, int most)
{
    // The ends are cut off first, so that a megabyte of text is not walked through for sixty characters of it.
    const qsizetype generous = 2 * qsizetype(most);
    QString ends = text;
    if (text.size() > 2 * generous)
        ends = text.left(generous) + text.right(generous);
    QString shown = withoutControls(ends);
    const bool cut = shown.size() > most || ends.size() < text.size();
    if (!cut)
        return shown;
    qsizetype head = (most - 1) / 2;
    qsizetype tail = shown.size() - (most - 1 - head);
    if (shown.at(head - 1).isHighSurrogate())
        --head;
    if (shown.at(tail).isLowSurrogate())
        ++tail;
    return shown.left(head) + QChar(0x2026) + shown.mid(tail);
}

QString shownText(std::string_view utf8, int most) { return shownText(QString::fromUtf8(utf8.data(), qsizetype(utf8.size())), most); }

} // namespace rungwright
