// SPDX-License-Identifier: GPL-3.0-or-later
#include "text_encodings.h"

#include "encoding.h"
#include "words.h"

#include <algorithm>

namespace rungwright
{

namespace
{

// Bytes 80 to 9F of Windows-1252; 0 where it has nothing.
constexpr std::array<char16_t, 32> kWindows1252{0x20AC, 0,      0x201A, 0x0192, 0x201E, 0x2026, 0x2020, 0x2021, 0x02C6, 0x2030, 0x0160,
                                                0x2039, 0x0152, 0,      0x017D, 0,      0,      0x2018, 0x2019, 0x201C, 0x201D, 0x2022,
                                                0x2013, 0x2014, 0x02DC, 0x2122, 0x0161, 0x203A, 0x0153, 0,      0x017E, 0x0178};

struct Difference {
    unsigned char byte;
    char16_t character;
};

// Where ISO 8859-15 is not ISO 8859-1.
constexpr std::array<Difference, 8> kIso8859_15{
    {{0xA4, 0x20AC}, {0xA6, 0x0160}, {0xA8, 0x0161}, {0xB4, 0x017D}, {0xB8, 0x017E}, {0xBC, 0x0152}, {0xBD, 0x0153}, {0xBE, 0x0178}}};

bool differs(unsigned char byte)
{
    return std::any_of(kIso8859_15.begin(), kIso8859_15.end(), [byte](const Difference& one) { return one.byte == byte; });
}

bool isLetter(unsigned char c) { return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || c >= 0xC0; }

// Byte A4 is the euro sign in ISO 8859-15 and a sign hardly anyone writes in the others; the rest are letters there and fractions, bars and
// accents standing alone here, which nobody writes inside a word.
bool speaksFor8859_15(QByteArrayView bytes)
{
    for (qsizetype i = 0; i < bytes.size(); ++i) {
        const auto c = static_cast<unsigned char>(bytes[i]);
        if (c == 0xA4)
            return true;
        const bool before = i > 0 && isLetter(static_cast<unsigned char>(bytes[i - 1]));
        const bool after = i + 1 < bytes.size() && isLetter(static_cast<unsigned char>(bytes[i + 1]));
        if (differs(c) && (before || after))
            return true;
    }
    return false;
}

bool beginsWith(QByteArrayView bytes, std::string_view mark)
{
    return bytes.size() >= qsizetype(mark.size()) && std::equal(mark.begin(), mark.end(), bytes.begin());
}

bool isUtf8(QByteArrayView bytes, bool whole)
{
    TextDecoder decoder;
    std::string text;
    return decoder.feed(bytes, text) && (!whole || decoder.finish(text));
}

// In UTF-16 text of our languages every other byte is 0, nearly always.
std::optional<TextEncoding> utf16WithoutMark(QByteArrayView bytes)
{
    qsizetype even = 0;
    qsizetype odd = 0;
    for (qsizetype i = 0; i < bytes.size(); ++i) {
        if (bytes[i] == 0)
            ++(i % 2 == 0 ? even : odd);
    }
    if (odd > bytes.size() / 4 && odd > 8 * even)
        return TextEncoding::utf16le;
    if (even > bytes.size() / 4 && even > 8 * odd)
        return TextEncoding::utf16be;
    return {};
}

} // namespace

std::string_view encodingWord(TextEncoding encoding)
{
    switch (encoding) {
    case TextEncoding::utf8:
        return "UTF-8";
    case TextEncoding::utf16le:
        return "UTF-16LE";
    case TextEncoding::utf16be:
        return "UTF-16BE";
    case TextEncoding::windows1252:
        return "Windows-1252";
    case TextEncoding::iso8859_1:
        return "ISO-8859-1";
    case TextEncoding::iso8859_15:
        break;
    }
    return "ISO-8859-15";
}

std::optional<TextEncoding> encodingFromWord(std::string_view word)
{
    for (const TextEncoding encoding : kTextEncodings) {
        if (encodingWord(encoding) == word)
            return encoding;
    }
    return {};
}

bool isSingleByte(TextEncoding encoding)
{
    return encoding == TextEncoding::windows1252 || encoding == TextEncoding::iso8859_1 || encoding == TextEncoding::iso8859_15;
}

char32_t characterOf(TextEncoding encoding, unsigned char byte)
{
    if (encoding == TextEncoding::windows1252 && byte >= 0x80 && byte <= 0x9F)
        return kWindows1252[byte - 0x80U];
    if (encoding == TextEncoding::iso8859_15) {
        for (const Difference& one : kIso8859_15) {
            if (one.byte == byte)
                return one.character;
        }
    }
    return byte;
}

EncodingGuess guessEncoding(QByteArrayView bytes, bool whole)
{
    using namespace std::string_view_literals;
    if (beginsWith(bytes, "\xEF\xBB\xBF"sv))
        return {TextEncoding::utf8, true, Words::tr("it begins with the byte-order mark of UTF-8")};
    if (beginsWith(bytes, "\xFF\xFE"sv))
        return {TextEncoding::utf16le, true, Words::tr("it begins with the byte-order mark of UTF-16LE")};
    if (beginsWith(bytes, "\xFE\xFF"sv))
        return {TextEncoding::utf16be, true, Words::tr("it begins with the byte-order mark of UTF-16BE")};
    if (const auto encoding = utf16WithoutMark(bytes))
        return {*encoding, true, Words::tr("every other byte is 0, as in UTF-16")};
    if (isUtf8(bytes, whole))
        return {TextEncoding::utf8, true, Words::tr("its bytes are UTF-8")};
    const auto isHigh = [](char c, unsigned from, unsigned to) {
        const auto byte = static_cast<unsigned char>(c);
        return byte >= from && byte <= to;
    };
    // The bytes 80 to 9F are control characters in both parts of ISO 8859: nobody writes those.
    if (std::any_of(bytes.begin(), bytes.end(), [&](char c) { return isHigh(c, 0x80, 0x9F); }))
        return {TextEncoding::windows1252, true, Words::tr("it is not UTF-8, and holds signs that only Windows-1252 has")};
    if (speaksFor8859_15(bytes))
        return {TextEncoding::iso8859_15, false, Words::tr("it is not UTF-8, and holds bytes that make sense in ISO-8859-15 only")};
    return {TextEncoding::windows1252,
            !std::any_of(bytes.begin(), bytes.end(), [](char c) { return differs(static_cast<unsigned char>(c)); }),
            Words::tr("it is not UTF-8; Windows-1252 and ISO-8859-1 read its bytes alike")};
}

} // namespace rungwright
