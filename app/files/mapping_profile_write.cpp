// SPDX-License-Identifier: GPL-3.0-or-later
#include "json_text.h"
#include "mapping_json.h"
#include "mapping_profile.h"
#include "whole_file.h"
#include "words.h"

#include <algorithm>

namespace rungwright
{

namespace
{

std::string quoted(const QString& text) { return quotedJson(text.toStdString()); }

std::string truth(bool value) { return value ? "true" : "false"; }

template <std::size_t N, class Choice>
std::string wordOf(const std::array<std::string_view, N>& words, Choice choice)
{
    return quotedJson(words[static_cast<std::size_t>(choice)]);
}

std::string place(const TheirColumn& column)
{
    std::string out = "\"header\": " + quoted(column.header);
    if (column.occurrence != 1)
        out += ", \"occurrence\": " + std::to_string(column.occurrence);
    return out;
}

// "[" and "]" with one entry a line between them.
template <class List, class Each>
std::string lines(const List& list, const std::string& indent, Each each)
{
    std::string out;
    for (const auto& entry : list)
        out += (out.empty() ? "[\n" : ",\n") + indent + "  " + each(entry);
    return out.empty() ? "[]" : out + "\n" + indent + "]";
}

std::string words(const QStringList& list)
{
    std::string out;
    for (const QString& word : list)
        out += (out.empty() ? "" : ", ") + quoted(word);
    return "[" + out + "]";
}

std::string columns(const ImportMapping& mapping)
{
    std::string out;
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        const ColumnSource& source = mapping.sources[i];
        if (source.kind == ColumnSource::Kind::absent)
            continue;
        out += (out.empty() ? "" : ",\n") + ("    " + quotedJson(kColumnNames[i])) + ": {" +
               (source.kind == ColumnSource::Kind::column ? place(source.column) : "\"constant\": " + quoted(source.constant)) + "}";
    }
    return out;
}

std::string mark(const NumberMark& mark)
{
    return "{\"text\": " + quoted(mark.text) + (mark.currency.isEmpty() ? std::string() : ", \"currency\": " + quoted(mark.currency)) + "}";
}

std::string rule(const SkipRule& rule)
{
    const std::string text = rule.kind == SkipRule::Kind::beginsWith ? ", \"text\": " + quoted(rule.text) : std::string();
    return "{" + place(rule.column) + ", \"when\": " + wordOf(kSkipWords, rule.kind) + text + "}";
}

} // namespace

QByteArray mappingToJson(const MappingProfile& profile)
{
    const ImportMapping& mapping = profile.mapping;
    const auto delimiter = std::find(kDelimiters.begin(), kDelimiters.end(), mapping.delimiter) - kDelimiters.begin();
    std::string out = "{\n  \"format\": \"rungwright-mapping\",\n";
    const auto line = [&out](const char* key, const std::string& value) { (((out += "  \"") += key) += "\": ") += value + ",\n"; };
    line("version", std::to_string(kMappingVersion));
    line("name", quoted(profile.name));
    line("encoding", quotedJson(encodingWord(mapping.encoding)));
    line("delimiter", quotedJson(kDelimiterWords[std::min<std::size_t>(static_cast<std::size_t>(delimiter), kDelimiters.size() - 1)]));
    line("header_row", std::to_string(mapping.headerRow));
    line("header_lines", std::to_string(mapping.headerLines));
    line("headers", lines(mapping.headers, "  ", quoted));
    line("columns", "{\n" + columns(mapping) + "\n  }");
    line("numbers", "{\n    \"decimal\": " + wordOf(kDecimalWords, mapping.numbers.decimal) +
                        ",\n    \"grouping\": " + wordOf(kGroupingWords, mapping.numbers.grouping) +
                        ",\n    \"marks\": " + lines(mapping.numbers.marks, "    ", mark) +
                        ",\n    \"chance_in_percent\": " + truth(mapping.numbers.chanceInPercent) + "\n  }");
    line("statuses", lines(mapping.statuses, "  ", [](const StatusWord& word) {
             return "{\"word\": " + quoted(word.word) + ", \"status\": " + quotedJson(statusWord(word.status)) + "}";
         }));
    line("locked", "{\"yes\": " + words(mapping.yesWords) + ", \"no\": " + words(mapping.noWords) + "}");
    line("pass_over", lines(mapping.skip, "  ", rule));
    line("floors_from_file", truth(mapping.floorsFromFile));
    out += "  \"floors_may_be_missing\": " + truth(mapping.floorsMayBeMissing) + "\n}\n";
    return QByteArray::fromStdString(out);
}

Outcome<bool> saveMapping(const MappingProfile& profile, const QString& path)
{
    if (const QString wrong = mappingTrouble(profile.mapping); !wrong.isEmpty())
        return Trouble{Words::tr("not saved, because the mapping is not complete: %1").arg(wrong).toStdString()};
    const QByteArray bytes = mappingToJson(profile);
    // Better an error now, while the mapping is in hand, than a file tomorrow that cannot be opened.
    const Outcome<MappingProfile> read = mappingFromJson(bytes, path);
    if (!read)
        return Trouble{Words::tr("not saved, because the file could not be opened again: %1")
                           .arg(QString::fromStdString(read.trouble()))
                           .toStdString()};
    if (!(read.value() == profile))
        return Trouble{Words::tr("%1: not saved, because the file would not hold the same mapping").arg(path).toStdString()};
    return writeWhole(path, bytes);
}

} // namespace rungwright
