// SPDX-License-Identifier: GPL-3.0-or-later
#include "csv_records.h"

#include "csv_lexer.h"
#include "encoding.h"
#include "words.h"

#include <algorithm>

namespace rungwright
{

namespace
{

constexpr qint64 kPiece = 262'144;

QString placed(const QString& fileName, const CsvLexer& lexer)
{
    if (lexer.troubleColumn() > 0)
        return Words::tr("%1:%2: character %3: %4")
            .arg(fileName, QString::number(lexer.troubleLine()), QString::number(lexer.troubleColumn()), lexer.trouble());
    return Words::tr("%1:%2: %3").arg(fileName, QString::number(lexer.troubleLine()), lexer.trouble());
}

QString placed(const QString& fileName, const TextDecoder& decoder)
{
    return Words::tr("%1:%2: byte %3 of the file: %4")
        .arg(fileName, QString::number(decoder.troubleLine()), QString::number(decoder.troubleByte()), decoder.trouble());
}

} // namespace

CsvEnd readCsv(QIODevice& device, const QString& fileName, const CsvSink& sink, const std::function<bool(double)>& progress)
{
    return readCsv(device, fileName, CsvLayout{}, sink, progress);
}

CsvEnd readCsv(QIODevice& device, const QString& fileName, const CsvLayout& layout, const CsvSink& sink,
               const std::function<bool(double)>& progress)
{
    CsvEnd end;
    TextDecoder decoder(layout.encoding);
    CsvLexer lexer(sink, layout.delimiter);
    std::string text;
    // Small files are read often and from memory, while a form is filled in: they get a small buffer.
    constexpr qint64 least = 4096;
    const qint64 size = device.isSequential() ? kPiece : std::clamp(device.size() - device.pos(), least, kPiece);
    QByteArray piece(size, Qt::Uninitialized);
    const qint64 whole = std::max<qint64>(1, device.size());
    qint64 soFar = 0;
    for (bool more = true; more;) {
        const qint64 got = device.read(piece.data(), size);
        if (got < 0) {
            end.trouble = Words::tr("%1: cannot be read: %2").arg(fileName, device.errorString());
            break;
        }
        more = got > 0;
        soFar += got;
        text.clear();
        const bool decoded = more ? decoder.feed(QByteArrayView(piece.constData(), got), text) : decoder.finish(text);
        // What was decoded before the bad byte is lexed first: of two troubles the earlier one is told.
        const bool lexed = lexer.feed(text) && (more || !decoded || lexer.finish());
        if (!lexed && lexer.stopped())
            break;
        if (!lexed || !decoded) {
            end.trouble = lexed ? placed(fileName, decoder) : placed(fileName, lexer);
            break;
        }
        if (progress && !progress(std::min(1.0, double(soFar) / double(whole)))) {
            end.cancelled = true;
            break;
        }
    }
    end.encoding = decoder.encodingName();
    return end;
}

} // namespace rungwright
