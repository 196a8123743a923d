// SPDX-License-Identifier: GPL-3.0-or-later
#include "list_reading.h"

#include "encoding.h"
#include "file_kind.h"
#include "scenario_json.h"

#include <QFileInfo>

namespace rungwright
{

namespace
{

bool isUtf8(const ListSample& sample)
{
    TextDecoder decoder;
    std::string text;
    return decoder.feed(sample.bytes, text) && (!sample.whole || decoder.finish(text));
}

} // namespace

FirstLook lookAt(const QString& path)
{
    FirstLook look;
    Outcome<ListSample> sample = takeSample(path);
    if (!sample.ok()) {
        look.trouble = QString::fromStdString(sample.trouble());
        return look;
    }
    look.sample = std::move(sample).value();
    look.isScenario = looksLikeScenario(look.sample.bytes, path);
    if (look.isScenario)
        return look;
    const bool utf8 = isUtf8(look.sample);
    // Every one-byte encoding would take a NUL or an empty file for text; only UTF-16 has a use for NULs.
    const EncodingGuess guess = guessEncoding(look.sample.bytes, look.sample.whole);
    const bool wide = guess.encoding == TextEncoding::utf16le || guess.encoding == TextEncoding::utf16be;
    look.readable = !look.sample.bytes.trimmed().isEmpty() && (wide || !look.sample.bytes.contains('\0'));
    look.ownFormat = !look.readable || (utf8 && isOwnFormat(look.sample.bytes));
    if (look.readable && !look.ownFormat)
        look.proposal = proposeMapping(look.sample);
    return look;
}

ReadList readList(const ListRequest& request, const Progress& progress, const TellSoFar& tell)
{
    ReadList read;
    if (request.mapping) {
        MappedListResult mapped;
        if (request.bytes.isEmpty()) {
            mapped = loadMappedList(request.path, *request.mapping, request.floors, request.options, progress);
        } else {
            QByteArray floors;
            if (!request.floors.isEmpty()) {
                Outcome<ListSample> whole = takeSample(request.floors, QFileInfo(request.floors).size() + 1);
                if (!whole.ok()) {
                    read.said.fileTrouble = QString::fromStdString(whole.trouble());
                    return read;
                }
                floors = std::move(whole).value().bytes;
            }
            mapped = readMappedList(request.bytes, request.path, *request.mapping, floors, request.floors, request.options, progress);
        }
        read.said = std::move(mapped.list);
        read.notes = std::move(mapped.notes);
    } else if (request.bytes.isEmpty()) {
        read.said = loadUnitList(request.path, request.options, progress, tell);
    } else {
        read.said = readUnitList(request.bytes, request.path, request.options, progress);
    }
    read.tierCount = read.said.tiers.size();
    if (request.forRefresh)
        read.listed = std::make_shared<std::vector<TierCase>>(std::move(read.said.tiers));
    else
        read.tiers = TierList(std::move(read.said.tiers));
    read.said.tiers = {};
    return read;
}

ReadScenario readScenario(const QString& path, const QByteArray& bytes)
{
    ReadScenario read;
    auto scenario = bytes.isEmpty() ? loadScenario(path) : scenarioFromJson(bytes, path);
    if (scenario.ok())
        read.scenario = std::move(scenario).value();
    else
        read.trouble = QString::fromStdString(scenario.trouble());
    return read;
}

} // namespace rungwright
