// SPDX-License-Identifier: GPL-3.0-or-later
#include "csv_records.h"
#include "encoding.h"
#include "json_text.h"
#include "json_walk.h"
#include "mapping_json.h"
#include "mapping_profile.h"
#include "whole_file.h"
#include "words.h"

namespace rungwright
{

namespace
{

using Key = QLatin1String;

constexpr qint64 kLargestProfile = qint64(4) << 20;
constexpr qsizetype kMostWords = 10'000;
constexpr int kMostColumns = static_cast<int>(kMostCells);

QString decoded(std::string_view utf8) { return QString::fromUtf8(utf8.data(), qsizetype(utf8.size())); }

template <std::size_t N>
QString listed(const std::array<std::string_view, N>& words)
{
    QStringList texts;
    for (const std::string_view word : words)
        texts << decoded(word);
    return Words::tr("one of %1").arg(texts.join(QStringLiteral(", ")));
}

class Reader
{
public:
    MappingProfile read(const QJsonValue& document)
    {
        const JsonWalk top(document, {},
                           {Key("format"), Key("version"), Key("name"), Key("encoding"), Key("delimiter"), Key("header_row"),
                            Key("header_lines"), Key("headers"), Key("columns"), Key("numbers"), Key("statuses"), Key("locked"),
                            Key("pass_over"), Key("floors_from_file"), Key("floors_may_be_missing")},
                           trouble);
        MappingProfile profile;
        ImportMapping& mapping = profile.mapping;
        profile.name = QString::fromStdString(top.name(Key("name")));
        if (profile.name.contains(u'\n') || profile.name.contains(u'\r'))
            top.refuse(Key("name"), Words::tr("a name of more than one line"), Words::tr("one line"));
        if (const auto encoding = encodingFromWord(top.name(Key("encoding")))) {
            mapping.encoding = *encoding;
        } else {
            QStringList known;
            for (const TextEncoding one : kTextEncodings)
                known << decoded(encodingWord(one));
            top.refuse(Key("encoding"), Words::tr("not an encoding"), Words::tr("one of %1").arg(known.join(QStringLiteral(", "))));
        }
        mapping.delimiter = kDelimiters[choice(top, Key("delimiter"), kDelimiterWords)];
        mapping.headerRow = top.integer(Key("header_row"), 1, 1'000'000).value_or(1);
        mapping.headerLines = top.integer(Key("header_lines"), 1, 2).value_or(1);
        mapping.headers = words(top, Key("headers"));
        if (top.has(Key("columns")))
            columns(top.value(Key("columns")), mapping);
        if (top.has(Key("numbers")))
            mapping.numbers = numbers(top.value(Key("numbers")));
        else
            top.refuse(Key("numbers"), Words::tr("missing"),
                       Words::tr("an object that says how numbers are written: \"decimal\" and \"grouping\""));
        each(top, Key("statuses"),
             [&](const QJsonValue& value, const QString& place) { mapping.statuses.push_back(status(value, place)); });
        if (top.has(Key("locked"))) {
            const JsonWalk locked(top.value(Key("locked")), QStringLiteral("locked"), {Key("yes"), Key("no")}, trouble);
            mapping.yesWords = words(locked, Key("yes"));
            mapping.noWords = words(locked, Key("no"));
        }
        each(top, Key("pass_over"), [&](const QJsonValue& value, const QString& place) { mapping.skip.push_back(rule(value, place)); });
        mapping.floorsFromFile = top.yes(Key("floors_from_file"));
        mapping.floorsMayBeMissing = top.yes(Key("floors_may_be_missing"));
        return profile;
    }

    JsonTrouble trouble;

private:
    template <class Take>
    void each(const JsonWalk& walk, Key key, Take take)
    {
        const QJsonArray list = walk.list(key, false);
        if (list.size() > kMostWords)
            walk.refuse(key, Words::tr("too long a list"), Words::tr("at most %1 entries").arg(kMostWords));
        for (qsizetype i = 0; i < list.size() && !trouble.any(); ++i)
            take(list.at(i), walk.placeOf(key, i));
    }

    template <std::size_t N>
    std::size_t choice(const JsonWalk& walk, Key key, const std::array<std::string_view, N>& known) const
    {
        const auto found = placeOfWord(known, walk.name(key));
        if (!found)
            walk.refuse(key, Words::tr("not a word for it"), listed(known));
        return found.value_or(0);
    }

    QStringList words(const JsonWalk& walk, Key key)
    {
        QStringList list;
        each(walk, key, [&](const QJsonValue& value, const QString& place) {
            const QString text = value.toString();
            if (!value.isString() || text.contains(QChar(0)) || !text.isValidUtf16())
                trouble.set(place, Words::tr("not a text"), shownValue(value), Words::tr("a text in quotation marks"));
            list << text;
        });
        return list;
    }

    static TheirColumn column(const JsonWalk& walk)
    {
        if (!walk.has(Key("header")))
            walk.refuse(Key("header"), Words::tr("missing"), Words::tr("the text of a column's header"));
        return {QString::fromStdString(walk.text(Key("header"))), walk.integer(Key("occurrence"), 1, kMostColumns).value_or(1)};
    }

    void columns(const QJsonValue& value, ImportMapping& mapping)
    {
        const JsonWalk walk(value, QStringLiteral("columns"),
                            {Key("site"), Key("tier"), Key("unit"), Key("asking_price"), Key("status"), Key("advertised_floor"),
                             Key("currency"), Key("grade"), Key("area"), Key("vacancy_chance"), Key("locked")},
                            trouble);
        for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
            const Key key(kColumnNames[i].data(), qsizetype(kColumnNames[i].size()));
            if (trouble.any() || !walk.has(key))
                continue;
            const JsonWalk source(walk.value(key), walk.placeOf(key), {Key("header"), Key("occurrence"), Key("constant")}, trouble);
            if (!source.has(Key("constant")))
                mapping.sources[i] = {ColumnSource::Kind::column, column(source), {}};
            else if (source.has(Key("header")) || source.has(Key("occurrence")))
                source.refuse(Key("constant"), Words::tr("a constant and a column for one of ours"), Words::tr("one of the two"));
            else
                mapping.sources[i] = ColumnSource::always(QString::fromStdString(source.text(Key("constant"))));
        }
    }

    NumberStyle numbers(const QJsonValue& value)
    {
        const JsonWalk walk(value, QStringLiteral("numbers"), {Key("decimal"), Key("grouping"), Key("marks"), Key("chance_in_percent")},
                            trouble);
        NumberStyle style;
        style.decimal = static_cast<DecimalMark>(choice(walk, Key("decimal"), kDecimalWords));
        style.grouping = static_cast<Grouping>(choice(walk, Key("grouping"), kGroupingWords));
        each(walk, Key("marks"), [&](const QJsonValue& entry, const QString& place) {
            const JsonWalk mark(entry, place, {Key("text"), Key("currency")}, trouble);
            style.marks.push_back({QString::fromStdString(mark.name(Key("text"))), QString::fromStdString(mark.text(Key("currency")))});
        });
        style.chanceInPercent = walk.yes(Key("chance_in_percent"));
        return style;
    }

    StatusWord status(const QJsonValue& value, const QString& place)
    {
        const JsonWalk walk(value, place, {Key("word"), Key("status")}, trouble);
        if (!walk.has(Key("word")))
            walk.refuse(Key("word"), Words::tr("missing"), Words::tr("a word of the list, or \"\" for an empty cell"));
        StatusWord word{QString::fromStdString(walk.text(Key("word"))), Status::vacant};
        if (const auto status = statusFromWord(walk.name(Key("status"))))
            word.status = *status;
        else
            walk.refuse(Key("status"), Words::tr("not a status"), Words::tr("vacant, occupied, reserved or closed"));
        return word;
    }

    SkipRule rule(const QJsonValue& value, const QString& place)
    {
        const JsonWalk walk(value, place, {Key("header"), Key("occurrence"), Key("when"), Key("text")}, trouble);
        SkipRule rule;
        rule.column = column(walk);
        rule.kind = static_cast<SkipRule::Kind>(choice(walk, Key("when"), kSkipWords));
        rule.text = rule.kind == SkipRule::Kind::beginsWith ? QString::fromStdString(walk.name(Key("text"))) : QString();
        if (rule.kind == SkipRule::Kind::isEmpty && walk.has(Key("text")))
            walk.refuse(Key("text"), Words::tr("a text where none is compared"), Words::tr("no text, or \"when\": \"begins_with\""));
        return rule;
    }
};

// Is this a mapping at all, and one of a version this program knows? Asked before anything else is looked at.
QString envelopeTrouble(const QJsonDocument& document)
{
    const QJsonValue format = document.object().value(Key("format"));
    if (!document.isObject() || format.toString() != Key("rungwright-mapping"))
        return Words::tr(
            "this is not an import mapping: it lacks \"format\": \"rungwright-mapping\". Choose a mapping that was saved here");
    const QJsonValue version = document.object().value(Key("version"));
    const double number = version.toDouble();
    if (version.isDouble() && number > kMappingVersion)
        return Words::tr("the mapping is of format version %1, and this program knows versions up to %2. Open it with a newer Rungwright")
            .arg(QString::number(number, 'g', 12), QString::number(kMappingVersion));
    if (!version.isDouble() || number != kMappingVersion)
        return Words::tr("version: not a version; found %1; wanted: %2").arg(shownValue(version), QString::number(kMappingVersion));
    return {};
}

} // namespace

Outcome<MappingProfile> mappingFromJson(const QByteArray& json, const QString& fileName)
{
    const auto refused = [](const QString& message) { return Trouble{message.toStdString()}; };
    TextDecoder decoder;
    std::string utf8;
    if (!decodeText(json, decoder, utf8))
        return refused(
            Words::tr("%1:%2: byte %3 of the file: %4")
                .arg(fileName, QString::number(decoder.troubleLine()), QString::number(decoder.troubleByte()), decoder.trouble()));
    QJsonDocument document;
    QString trouble;
    if (!parseJson(utf8, fileName, document, trouble))
        return refused(trouble);
    trouble = envelopeTrouble(document);
    if (!trouble.isEmpty())
        return refused(Words::tr("%1: %2").arg(fileName, trouble));
    Reader reader;
    MappingProfile profile = reader.read(document.object());
    trouble = reader.trouble.any() ? reader.trouble.text() : mappingTrouble(profile.mapping);
    if (!trouble.isEmpty())
        return refused(Words::tr("%1: %2").arg(fileName, trouble));
    return profile;
}

Outcome<MappingProfile> loadMapping(const QString& path)
{
    const Outcome<QByteArray> bytes = readWhole(path, kLargestProfile);
    if (!bytes)
        return Trouble{bytes.trouble()};
    return mappingFromJson(bytes.value(), path);
}

} // namespace rungwright
