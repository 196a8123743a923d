// SPDX-License-Identifier: GPL-3.0-or-later
#include "json_text.h"

#include "words.h"

#include <algorithm>
#include <set>
#include <string_view>
#include <vector>

namespace rungwright
{

namespace
{

QString placeAt(const std::string& text, std::size_t offset, const QString& fileName)
{
    offset = std::min(offset, text.size());
    qint64 line = 1;
    qint64 column = 1;
    for (std::size_t i = 0; i < offset; ++i) {
        const char c = text[i];
        if (c == '\n' || (c == '\r' && (i + 1 == text.size() || text[i + 1] != '\n'))) {
            ++line;
            column = 1;
        } else if ((static_cast<unsigned char>(c) & 0xC0U) != 0x80U) {
            ++column;
        }
    }
    return QStringLiteral("%1:%2: ").arg(fileName, QString::number(line)) + Words::tr("character %1: ").arg(column);
}

// Just past the string literal that begins at `at`. The text is known to be JSON.
std::size_t pastString(std::string_view text, std::size_t at)
{
    for (++at; at < text.size() && text[at] != '"'; ++at) {
        if (text[at] == '\\')
            ++at;
    }
    return at + 1;
}

struct TroubleAt {
    std::size_t offset;
    QString what;
};

// Walks a valid document's keys. No recursion: depth is the document's, not the stack's.
std::optional<TroubleAt> findKeyTrouble(std::string_view text)
{
    std::vector<std::set<std::string_view>> open; // One set of keys for every open object; lists get an empty one.
    for (std::size_t i = 0; i < text.size();) {
        const char c = text[i];
        if (c == '{' || c == '[') {
            open.emplace_back();
        } else if (c == '}' || c == ']') {
            open.pop_back();
        } else if (c == '"') {
            const std::size_t end = pastString(text, i);
            const std::size_t next = text.find_first_not_of(" \t\r\n", end);
            if (next != std::string_view::npos && text[next] == ':') {
                const std::string_view key = text.substr(i + 1, end - i - 2);
                const QString shown = shownText(key);
                // An escaped spelling could hide that two keys are one; no key of ours needs escapes.
                if (key.find('\\') != std::string_view::npos)
                    return TroubleAt{
                        i,
                        Words::tr("the key '%1' is written with an escape; found a backslash; wanted: the key's plain letters").arg(shown)};
                if (!open.back().insert(key).second)
                    return TroubleAt{
                        i, Words::tr("the key '%1' is written twice in one object; wanted: once, so that it is clear which counts")
                               .arg(shown)};
            }
            i = end;
            continue;
        }
        ++i;
    }
    return {};
}

// QJsonDocument's offset lies just behind the character it stumbled over, and somewhere inside a word or number it does not know; what
// helps is the place of that character, or where the word begins.
std::size_t placeOf(const QJsonParseError& error, std::string_view text)
{
    auto at = static_cast<std::size_t>(std::max(0, error.offset));
    if (error.error == QJsonParseError::GarbageAtEnd || at == 0 || at > text.size())
        return at;
    --at;
    if (error.error != QJsonParseError::IllegalValue && error.error != QJsonParseError::IllegalNumber)
        return at;
    constexpr std::string_view between = " \t\r\n,:[]{}";
    const auto separates = [&](std::size_t i) { return i >= text.size() || between.find(text[i]) != std::string_view::npos; };
    if (separates(at) && !separates(at + 1))
        return at + 1;
    while (at > 0 && separates(at))
        --at;
    while (at > 0 && !separates(at - 1))
        --at;
    return at;
}

QString reasonOf(const QJsonParseError& error)
{
    switch (error.error) {
    case QJsonParseError::UnterminatedObject:
        return Words::tr("an object { is not closed, or a comma is missing in it");
    case QJsonParseError::MissingNameSeparator:
        return Words::tr("a key must be followed by a colon");
    case QJsonParseError::UnterminatedArray:
        return Words::tr("a list [ is not closed, or a comma is missing in it");
    case QJsonParseError::MissingValueSeparator:
        return Words::tr("a comma is missing");
    case QJsonParseError::IllegalValue:
        return Words::tr("a value that JSON does not know");
    case QJsonParseError::TerminationByNumber:
    case QJsonParseError::IllegalNumber:
        return Words::tr("a number that JSON does not know, or one too large");
    case QJsonParseError::IllegalEscapeSequence:
        return Words::tr("a backslash escape that JSON does not know");
    case QJsonParseError::IllegalUTF8String:
        return Words::tr("a text that is not UTF-8");
    case QJsonParseError::UnterminatedString:
        return Words::tr("a text whose closing quotation mark is missing");
    case QJsonParseError::MissingObject:
        return Words::tr("an object was to begin here");
    case QJsonParseError::DeepNesting:
        return Words::tr("lists and objects nested too deep");
    case QJsonParseError::DocumentTooLarge:
        return Words::tr("the document is too large");
    case QJsonParseError::GarbageAtEnd:
        return Words::tr("something follows after the end of the document");
    case QJsonParseError::NoError:
        break;
    }
    return error.errorString();
}

} // namespace

bool parseJson(const std::string& text, const QString& fileName, QJsonDocument& document, QString& trouble)
{
    QJsonParseError error;
    document = QJsonDocument::fromJson(QByteArray::fromRawData(text.data(), qsizetype(text.size())), &error);
    if (error.error != QJsonParseError::NoError) {
        trouble = placeAt(text, placeOf(error, text), fileName) + Words::tr("not valid JSON: %1").arg(reasonOf(error));
        return false;
    }
    if (const auto found = findKeyTrouble(text)) {
        trouble = placeAt(text, found->offset, fileName) + found->what;
        return false;
    }
    return true;
}

std::string quotedJson(std::string_view text)
{
    constexpr std::string_view hex = "0123456789abcdef";
    std::string out = "\"";
    for (const char c : text) {
        const auto byte = static_cast<unsigned char>(c);
        if (c == '"' || c == '\\')
            (out += '\\') += c;
        else if (c == '\n')
            out += "\\n";
        else if (c == '\r')
            out += "\\r";
        else if (c == '\t')
            out += "\\t";
        else if (byte < 0x20 || byte == 0x7F)
            ((out += "\\u00") += hex[byte >> 4]) += hex[byte & 0xF];
        else
            out += c;
    }
    return out += '"';
}

} // namespace rungwright
