// SPDX-License-Identifier: GPL-3.0-or-later
#include "encoding.h"

#include "words.h"

#include <algorithm>

namespace rungwright
{

namespace
{

unsigned char byteAt(const std::string& raw, std::size_t i) { return static_cast<unsigned char>(raw[i]); }

bool isContinuation(unsigned char c) { return (c & 0xC0U) == 0x80U; }

// Length of the sequence a first byte announces; 0 for bytes that start none (RFC 3629, section 4).
std::size_t announcedLength(unsigned char c)
{
    if (c < 0x80)
        return 1;
    if (c >= 0xC2 && c <= 0xDF)
        return 2;
    if (c >= 0xE0 && c <= 0xEF)
        return 3;
    if (c >= 0xF0 && c <= 0xF4)
        return 4;
    return 0;
}

// The well-formed ranges of RFC 3629, section 4: no overlong forms, no surrogates, nothing beyond U+10FFFF.
bool wellFormed(const std::string& raw, std::size_t i, std::size_t length)
{
    const unsigned char first = byteAt(raw, i);
    const unsigned char second = byteAt(raw, i + 1);
    if (!isContinuation(second) || (first == 0xE0 && second < 0xA0) || (first == 0xED && second > 0x9F) ||
        (first == 0xF0 && second < 0x90) || (first == 0xF4 && second > 0x8F))
        return false;
    for (std::size_t k = 2; k < length; ++k) {
        if (!isContinuation(byteAt(raw, i + k)))
            return false;
    }
    return true;
}

void appendUtf8(char32_t c, std::string& out)
{
    if (c < 0x80) {
        out += static_cast<char>(c);
    } else if (c < 0x800) {
        out += static_cast<char>(0xC0U | (c >> 6));
        out += static_cast<char>(0x80U | (c & 0x3FU));
    } else if (c < 0x10000) {
        out += static_cast<char>(0xE0U | (c >> 12));
        out += static_cast<char>(0x80U | ((c >> 6) & 0x3FU));
        out += static_cast<char>(0x80U | (c & 0x3FU));
    } else {
        out += static_cast<char>(0xF0U | (c >> 18));
        out += static_cast<char>(0x80U | ((c >> 12) & 0x3FU));
        out += static_cast<char>(0x80U | ((c >> 6) & 0x3FU));
        out += static_cast<char>(0x80U | (c & 0x3FU));
    }
}

QString hexBytes(const std::string& raw, std::size_t from)
{
    const auto count = qsizetype(std::min<std::size_t>(4, raw.size() - from));
    return QString::fromLatin1(QByteArray(raw.data() + from, count).toHex(' ').toUpper());
}

} // namespace

QString TextDecoder::encodingName() const
{
    switch (m_kind) {
    case Kind::utf8Bom:
        return QStringLiteral("UTF-8 with BOM");
    case Kind::utf16le:
        return QStringLiteral("UTF-16LE");
    case Kind::utf16be:
        return QStringLiteral("UTF-16BE");
    case Kind::singleByte: {
        const std::string_view word = encodingWord(*m_said);
        return QString::fromUtf8(word.data(), qsizetype(word.size()));
    }
    case Kind::unknown:
    case Kind::utf8:
        break;
    }
    return QStringLiteral("UTF-8");
}

bool TextDecoder::feed(QByteArrayView bytes, std::string& out)
{
    if (!m_trouble.isEmpty())
        return false;
    m_raw.append(bytes.data(), static_cast<std::size_t>(bytes.size()));
    if (m_kind == Kind::unknown) {
        if (m_raw.size() < 4)
            return true;
        if (!start(false))
            return false;
    }
    return decode(false, out);
}

bool TextDecoder::finish(std::string& out)
{
    if (!m_trouble.isEmpty())
        return false;
    if (m_kind == Kind::unknown && !start(true))
        return false;
    return decode(true, out);
}

bool TextDecoder::start(bool atEnd)
{
    const auto begins = [this](std::string_view mark) { return std::string_view(m_raw).substr(0, mark.size()) == mark; };
    using namespace std::string_view_literals;
    std::size_t mark = 0;
    if ((begins("\xFF\xFE\0\0"sv) && !(atEnd && m_raw.size() < 4)) || begins("\0\0\xFE\xFF"sv))
        return refuse(Words::tr("the file is UTF-32, which is not read here. Save it as UTF-8 (in a spreadsheet: \"CSV UTF-8\")"));
    if (begins("\xEF\xBB\xBF"sv)) {
        m_kind = Kind::utf8Bom;
        mark = 3;
    } else if (begins("\xFF\xFE"sv)) {
        m_kind = Kind::utf16le;
        mark = 2;
    } else if (begins("\xFE\xFF"sv)) {
        m_kind = Kind::utf16be;
        mark = 2;
    } else {
        m_kind = Kind::utf8;
    }
    if (m_said && !followSaid())
        return false;
    m_raw.erase(0, mark);
    m_byte = static_cast<qint64>(mark);
    return true;
}

// A mark is stronger than what was said: it is never there by chance.
bool TextDecoder::followSaid()
{
    const bool marked = m_kind != Kind::utf8;
    const bool fits = *m_said == TextEncoding::utf8      ? m_kind == Kind::utf8Bom
                      : *m_said == TextEncoding::utf16le ? m_kind == Kind::utf16le
                      : *m_said == TextEncoding::utf16be ? m_kind == Kind::utf16be
                                                         : false;
    const std::string_view said = encodingWord(*m_said);
    if (marked && !fits) {
        const QString found = m_kind == Kind::utf8Bom ? QStringLiteral("UTF-8") : encodingName();
        return refuse(Words::tr("the file begins with the byte-order mark of %1, but is to be read as %2. Choose the encoding %1")
                          .arg(found, QString::fromUtf8(said.data(), qsizetype(said.size()))));
    }
    if (*m_said == TextEncoding::utf16le)
        m_kind = Kind::utf16le;
    else if (*m_said == TextEncoding::utf16be)
        m_kind = Kind::utf16be;
    else if (isSingleByte(*m_said))
        m_kind = Kind::singleByte;
    return true;
}

bool TextDecoder::decode(bool atEnd, std::string& out)
{
    if (m_kind == Kind::singleByte)
        return decodeSingleBytes(out);
    return m_kind == Kind::utf16le || m_kind == Kind::utf16be ? decodeUtf16(atEnd, out) : decodeUtf8(atEnd, out);
}

bool TextDecoder::decodeUtf8(bool atEnd, std::string& out)
{
    std::size_t i = 0;
    const std::size_t size = m_raw.size();
    while (i < size) {
        const unsigned char c = byteAt(m_raw, i);
        const std::size_t length = announcedLength(c);
        if (length > 1 && i + length > size && !atEnd)
            break; // The rest of the character comes with the next piece.
        if (length == 0 || i + length > size || (length > 1 && !wellFormed(m_raw, i, length))) {
            m_byte += static_cast<qint64>(i);
            out.append(m_raw, 0, i);
            return refuse(
                Words::tr("the bytes %1 are not UTF-8. Save the file as UTF-8 (in a spreadsheet: \"CSV UTF-8\"; in a text editor: the "
                          "encoding UTF-8)")
                    .arg(hexBytes(m_raw, i)));
        }
        if (c == 0) {
            m_byte += static_cast<qint64>(i);
            out.append(m_raw, 0, i);
            return refuseNul();
        }
        countLine(c);
        i += length;
    }
    out.append(m_raw, 0, i);
    m_byte += static_cast<qint64>(i);
    m_raw.erase(0, i);
    return true;
}

bool TextDecoder::decodeUtf16(bool atEnd, std::string& out)
{
    const auto unitAt = [this](std::size_t i) {
        const unsigned low = byteAt(m_raw, m_kind == Kind::utf16le ? i : i + 1);
        const unsigned high = byteAt(m_raw, m_kind == Kind::utf16le ? i + 1 : i);
        return static_cast<char32_t>(high << 8 | low);
    };
    std::size_t i = 0;
    const std::size_t size = m_raw.size();
    while (i + 2 <= size) {
        char32_t c = unitAt(i);
        std::size_t length = 2;
        const bool high = c >= 0xD800 && c <= 0xDBFF;
        if (high && i + 4 > size && !atEnd)
            break;
        if (high && i + 4 <= size) {
            const char32_t low = unitAt(i + 2);
            if (low >= 0xDC00 && low <= 0xDFFF) {
                c = 0x10000 + ((c - 0xD800) << 10) + (low - 0xDC00);
                length = 4;
            }
        }
        if (c >= 0xD800 && c <= 0xDFFF) {
            m_byte += static_cast<qint64>(i);
            return refuse(Words::tr("half a character (an unpaired surrogate) in a UTF-16 file. Save the file as UTF-8"));
        }
        if (c == 0) {
            m_byte += static_cast<qint64>(i);
            return refuseNul();
        }
        appendUtf8(c, out);
        countLine(c);
        i += length;
    }
    m_byte += static_cast<qint64>(i);
    m_raw.erase(0, i);
    if (atEnd && !m_raw.empty())
        return refuse(Words::tr("the UTF-16 file ends in the middle of a character. Save it anew, as UTF-8"));
    return true;
}

bool TextDecoder::decodeSingleBytes(std::string& out)
{
    for (std::size_t i = 0; i < m_raw.size(); ++i) {
        const char32_t c = characterOf(*m_said, byteAt(m_raw, i));
        if (c == 0) {
            m_byte += static_cast<qint64>(i);
            if (byteAt(m_raw, i) == 0)
                return refuseNul();
            return refuse(Words::tr("the byte %1 stands for nothing in %2. Choose the encoding that the file was written in")
                              .arg(hexBytes(m_raw.substr(i, 1), 0), encodingName()));
        }
        appendUtf8(c, out);
        countLine(c);
    }
    m_byte += static_cast<qint64>(m_raw.size());
    m_raw.clear();
    return true;
}

bool TextDecoder::refuse(const QString& why)
{
    m_trouble = why;
    return false;
}

bool TextDecoder::refuseNul()
{
    return refuse(
        Words::tr("a NUL character, which text does not hold: the file is damaged, is not a text file, or is UTF-16 without a byte-order "
                  "mark. Save it as UTF-8 (in a spreadsheet: \"CSV UTF-8\")"));
}

void TextDecoder::countLine(char32_t c)
{
    // CR LF, LF alone and CR alone each end one line.
    if (c == U'\r' || (c == U'\n' && !m_afterCr))
        ++m_line;
    m_afterCr = c == U'\r';
}

bool decodeText(QByteArrayView bytes, TextDecoder& decoder, std::string& out) { return decoder.feed(bytes, out) && decoder.finish(out); }

} // namespace rungwright
