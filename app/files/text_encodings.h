// SPDX-License-Identifier: GPL-3.0-or-later
// The encodings a list of others' may come in, and which one a file seems to be in.
#pragma once

#include <QByteArrayView>
#include <QString>

#include <array>
#include <optional>
#include <string>
#include <string_view>

namespace rungwright
{

enum class TextEncoding : unsigned char { utf8, utf16le, utf16be, windows1252, iso8859_1, iso8859_15 };

inline constexpr std::array kTextEncodings{TextEncoding::utf8,        TextEncoding::utf16le,   TextEncoding::utf16be,
                                           TextEncoding::windows1252, TextEncoding::iso8859_1, TextEncoding::iso8859_15};

/// "UTF-8", "UTF-16LE", "UTF-16BE", "Windows-1252", "ISO-8859-1", "ISO-8859-15": on screen and in profiles.
std::string_view encodingWord(TextEncoding encoding);
std::optional<TextEncoding> encodingFromWord(std::string_view word);
/// One byte a character.
bool isSingleByte(TextEncoding encoding);

/// The character of a byte; 0 for the five bytes that stand for nothing in Windows-1252 (81 8D 8F 90 9D). Single-byte encodings only.
char32_t characterOf(TextEncoding encoding, unsigned char byte);

/// What the bytes seem to be, and why, in words fit to show.
struct EncodingGuess {
    TextEncoding encoding = TextEncoding::utf8;
    bool sure = true; ///< False when another encoding would read the bytes as well, and differently.
    QString why;
};

/// Looks at byte-order marks, NULs, and whether the bytes are UTF-8; the last character may be torn when `whole` is false. Bytes 80 to 9F
/// speak for Windows-1252; of the others only what stands between letters or beside figures tells ISO 8859-15 apart.
EncodingGuess guessEncoding(QByteArrayView bytes, bool whole);

} // namespace rungwright
