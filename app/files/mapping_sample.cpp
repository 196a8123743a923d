// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_sample.h"

#include "csv_lexer.h"
#include "encoding.h"
#include "whole_file.h"
#include "words.h"

#include <QFile>
#include <QFileInfo>

#include <algorithm>

namespace rungwright
{

Outcome<ListSample> takeSample(const QString& path, qint64 most)
{
    constexpr qint64 largestPipe = qint64(256) << 20;
    QFile file(path);
    if (QFileInfo(path).isDir())
        return Trouble{Words::tr("%1: is a folder, not a file").arg(path).toStdString()};
    if (!file.open(QIODevice::ReadOnly))
        return Trouble{Words::tr("%1: cannot be opened: %2").arg(path, file.errorString()).toStdString()};
    if (file.isSequential()) {
        Outcome<QByteArray> bytes = readRest(file, largestPipe);
        if (!bytes)
            return Trouble{bytes.trouble()};
        return ListSample{std::move(bytes).value(), true};
    }
    ListSample sample;
    sample.bytes = file.read(most);
    if (file.error() != QFileDevice::NoError)
        return Trouble{Words::tr("%1: cannot be read: %2").arg(path, file.errorString()).toStdString()};
    sample.whole = file.atEnd();
    if (!sample.whole) {
        // From an even place: UTF-16 has two bytes a character, or four.
        const qint64 from = std::max(most, file.size() - kTailBytes);
        if (file.seek(from - from % 2))
            sample.tail = file.readAll();
        if (file.error() != QFileDevice::NoError)
            return Trouble{Words::tr("%1: cannot be read: %2").arg(path, file.errorString()).toStdString()};
    }
    return sample;
}

QString eachSampleRecord(const ListSample& sample, const CsvLayout& layout, const CsvSink& sink)
{
    TextDecoder decoder(layout.encoding);
    CsvLexer lexer(sink, layout.delimiter);
    std::string text;
    const bool decoded = decoder.feed(sample.bytes, text) && (!sample.whole || decoder.finish(text));
    // Of a torn record the last line is known to be incomplete: it is left out by not ending the lexer.
    const bool lexed = lexer.feed(text) && (!sample.whole || !decoded || lexer.finish());
    if (!lexed && lexer.stopped())
        return {};
    if (!lexed && lexer.troubleColumn() > 0)
        return Words::tr("line %1, character %2: %3")
            .arg(QString::number(lexer.troubleLine()), QString::number(lexer.troubleColumn()), lexer.trouble());
    if (!lexed)
        return Words::tr("line %1: %2").arg(QString::number(lexer.troubleLine()), lexer.trouble());
    if (!decoded)
        return Words::tr("line %1, byte %2 of the file: %3")
            .arg(QString::number(decoder.troubleLine()), QString::number(decoder.troubleByte()), decoder.trouble());
    return {};
}

} // namespace rungwright
