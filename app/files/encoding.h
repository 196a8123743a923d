// SPDX-License-Identifier: GPL-3.0-or-later
// Bytes of a text file to UTF-8, piece by piece, with the place of the first byte that is not text.
#pragma once

#include "text_encodings.h"

#include <QByteArrayView>
#include <QString>

#include <optional>
#include <string>

namespace rungwright
{

/// Decodes UTF-8 (with or without byte-order mark) and UTF-16LE/BE (with one). Anything else is refused: UTF-32, bytes that are not
/// UTF-8, unpaired surrogates, and NUL, which no text file of ours holds and which UTF-16 without a mark is full of.
/// When the encoding is said beforehand, UTF-16 needs no mark, one-byte encodings are read too, and a mark that contradicts is refused.
class TextDecoder
{
public:
    explicit TextDecoder(std::optional<TextEncoding> said = {}) : m_said(said) {}

    /// Appends the text of the next bytes to `out`. False when they are refused; trouble() then says why, and nothing more is decoded.
    bool feed(QByteArrayView bytes, std::string& out);
    /// To be called once, after the last bytes: a character that the end cuts off is refused.
    bool finish(std::string& out);

    /// "UTF-8", "UTF-8 with BOM", "UTF-16LE", "UTF-16BE", or the encoding that was said.
    QString encodingName() const;
    /// What is wrong, found and wanted, without the place.
    const QString& trouble() const { return m_trouble; }
    /// Line (from 1) and byte of the file (from 1) on which the trouble stands.
    qint64 troubleLine() const { return m_line; }
    qint64 troubleByte() const { return m_byte + 1; }

private:
    enum class Kind : unsigned char { unknown, utf8, utf8Bom, utf16le, utf16be, singleByte };

    bool start(bool atEnd);
    bool followSaid();
    bool decode(bool atEnd, std::string& out);
    bool decodeUtf8(bool atEnd, std::string& out);
    bool decodeUtf16(bool atEnd, std::string& out);
    bool decodeSingleBytes(std::string& out);
    bool refuse(const QString& why);
    bool refuseNul();
    void countLine(char32_t c);

    std::optional<TextEncoding> m_said;
    Kind m_kind = Kind::unknown;
    std::string m_raw; ///< Bytes not yet decoded: the first four at the start, later the torn end of a piece.
    qint64 m_line = 1;
    qint64 m_byte = 0; ///< Bytes of the file decoded so far.
    bool m_afterCr = false;
    QString m_trouble;
};

/// The whole of a file's bytes as UTF-8. False on refused bytes; `decoder` then tells.
bool decodeText(QByteArrayView bytes, TextDecoder& decoder, std::string& out);

} // namespace rungwright
