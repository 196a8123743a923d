// SPDX-License-Identifier: GPL-3.0-or-later
// One-byte encodings against the tables of iconv, and which encoding a file seems to be in.
#include "encoding.h"

#include <QtTest>

using namespace rungwright;

namespace
{

// Bytes 80 to FF through `iconv -f CP1252 -t UTF-32BE`, one byte at a time; 0 where iconv refuses the byte. GNU libc 2.36 (Debian 12).
constexpr std::array<char32_t, 128> kWindows1252{
    0x20AC, 0,      0x201A, 0x0192, 0x201E, 0x2026, 0x2020, 0x2021, 0x02C6, 0x2030, 0x0160, 0x2039, 0x0152, 0,      0x017D, 0,
    0,      0x2018, 0x2019, 0x201C, 0x201D, 0x2022, 0x2013, 0x2014, 0x02DC, 0x2122, 0x0161, 0x203A, 0x0153, 0,      0x017E, 0x0178,
    0x00A0, 0x00A1, 0x00A2, 0x00A3, 0x00A4, 0x00A5, 0x00A6, 0x00A7, 0x00A8, 0x00A9, 0x00AA, 0x00AB, 0x00AC, 0x00AD, 0x00AE, 0x00AF,
    0x00B0, 0x00B1, 0x00B2, 0x00B3, 0x00B4, 0x00B5, 0x00B6, 0x00B7, 0x00B8, 0x00B9, 0x00BA, 0x00BB, 0x00BC, 0x00BD, 0x00BE, 0x00BF,
    0x00C0, 0x00C1, 0x00C2, 0x00C3, 0x00C4, 0x00C5, 0x00C6, 0x00C7, 0x00C8, 0x00C9, 0x00CA, 0x00CB, 0x00CC, 0x00CD, 0x00CE, 0x00CF,
    0x00D0, 0x00D1, 0x00D2, 0x00D3, 0x00D4, 0x00D5, 0x00D6, 0x00D7, 0x00D8, 0x00D9, 0x00DA, 0x00DB, 0x00DC, 0x00DD, 0x00DE, 0x00DF,
    0x00E0, 0x00E1, 0x00E2, 0x00E3, 0x00E4, 0x00E5, 0x00E6, 0x00E7, 0x00E8, 0x00E9, 0x00EA, 0x00EB, 0x00EC, 0x00ED, 0x00EE, 0x00EF,
    0x00F0, 0x00F1, 0x00F2, 0x00F3, 0x00F4, 0x00F5, 0x00F6, 0x00F7, 0x00F8, 0x00F9, 0x00FA, 0x00FB, 0x00FC, 0x00FD, 0x00FE, 0x00FF};

// Bytes 80 to FF through `iconv -f ISO-8859-15 -t UTF-32BE`, GNU libc 2.36 (Debian 12). For ISO-8859-1 the same gives each byte's own
// number.
constexpr std::array<char32_t, 128> kIso8859_15{
    0x0080, 0x0081, 0x0082, 0x0083, 0x0084, 0x0085, 0x0086, 0x0087, 0x0088, 0x0089, 0x008A, 0x008B, 0x008C, 0x008D, 0x008E, 0x008F,
    0x0090, 0x0091, 0x0092, 0x0093, 0x0094, 0x0095, 0x0096, 0x0097, 0x0098, 0x0099, 0x009A, 0x009B, 0x009C, 0x009D, 0x009E, 0x009F,
    0x00A0, 0x00A1, 0x00A2, 0x00A3, 0x20AC, 0x00A5, 0x0160, 0x00A7, 0x0161, 0x00A9, 0x00AA, 0x00AB, 0x00AC, 0x00AD, 0x00AE, 0x00AF,
    0x00B0, 0x00B1, 0x00B2, 0x00B3, 0x017D, 0x00B5, 0x00B6, 0x00B7, 0x017E, 0x00B9, 0x00BA, 0x00BB, 0x0152, 0x0153, 0x0178, 0x00BF,
    0x00C0, 0x00C1, 0x00C2, 0x00C3, 0x00C4, 0x00C5, 0x00C6, 0x00C7, 0x00C8, 0x00C9, 0x00CA, 0x00CB, 0x00CC, 0x00CD, 0x00CE, 0x00CF,
    0x00D0, 0x00D1, 0x00D2, 0x00D3, 0x00D4, 0x00D5, 0x00D6, 0x00D7, 0x00D8, 0x00D9, 0x00DA, 0x00DB, 0x00DC, 0x00DD, 0x00DE, 0x00DF,
    0x00E0, 0x00E1, 0x00E2, 0x00E3, 0x00E4, 0x00E5, 0x00E6, 0x00E7, 0x00E8, 0x00E9, 0x00EA, 0x00EB, 0x00EC, 0x00ED, 0x00EE, 0x00EF,
    0x00F0, 0x00F1, 0x00F2, 0x00F3, 0x00F4, 0x00F5, 0x00F6, 0x00F7, 0x00F8, 0x00F9, 0x00FA, 0x00FB, 0x00FC, 0x00FD, 0x00FE, 0x00FF};

struct Decoded {
    bool fine = false;
    QString text;
    QString trouble;
    qint64 byte = 0;
    qint64 line = 0;
};

Decoded decoded(const QByteArray& bytes, std::optional<TextEncoding> said)
{
    TextDecoder decoder(said);
    std::string out;
    Decoded result;
    result.fine = decodeText(bytes, decoder, out);
    result.text = QString::fromStdString(out);
    result.trouble = decoder.trouble();
    result.byte = decoder.troubleByte();
    result.line = decoder.troubleLine();
    return result;
}

char32_t expected(TextEncoding encoding, unsigned byte)
{
    if (byte < 0x80 || encoding == TextEncoding::iso8859_1)
        return byte;
    return (encoding == TextEncoding::windows1252 ? kWindows1252 : kIso8859_15)[byte - 0x80];
}

} // namespace

class TestTextEncodings : public QObject
{
    Q_OBJECT

private slots:
    void everyByte()
    {
        for (const TextEncoding encoding : {TextEncoding::windows1252, TextEncoding::iso8859_1, TextEncoding::iso8859_15}) {
            for (unsigned byte = 1; byte < 256; ++byte) {
                const char32_t want = expected(encoding, byte);
                QCOMPARE(characterOf(encoding, static_cast<unsigned char>(byte)), want);
                const Decoded got = decoded(QByteArray("ab\nc") + static_cast<char>(byte), encoding);
                QCOMPARE(got.fine, want != 0);
                if (got.fine)
                    QCOMPARE(got.text, QStringLiteral("ab\nc") + QString::fromUcs4(&want, 1));
                if (!got.fine) {
                    QVERIFY2(got.trouble.contains(QStringLiteral("stands for nothing in Windows-1252")), qPrintable(got.trouble));
                    QCOMPARE(got.byte, qint64(5));
                    QCOMPARE(got.line, qint64(2));
                }
            }
            QVERIFY(!decoded(QByteArray("a\0b", 3), encoding).fine);
        }
    }

    void utf16NeedsNoMarkOnceSaid()
    {
        const QByteArray little("G\0r\0\xF6\0\xDF\0e\0", 10);
        QCOMPARE(decoded(little, TextEncoding::utf16le).text, QStringLiteral("Größe"));
        QCOMPARE(decoded("\xFF\xFE" + little, TextEncoding::utf16le).text, QStringLiteral("Größe"));
        QVERIFY(!decoded(little, std::nullopt).fine);
        const QByteArray big("\0G\0r", 4);
        QCOMPARE(decoded(big, TextEncoding::utf16be).text, QStringLiteral("Gr"));
    }

    void contradictedMarksAreRefused()
    {
        const Decoded utf8 = decoded("\xEF\xBB\xBFsite", TextEncoding::windows1252);
        QVERIFY(!utf8.fine);
        QVERIFY2(utf8.trouble.contains(QStringLiteral("byte-order mark of UTF-8, but is to be read as Windows-1252")),
                 qPrintable(utf8.trouble));
        QVERIFY(!decoded(QByteArray("\xFF\xFEs\0", 4), TextEncoding::utf8).fine);
        QVERIFY(!decoded(QByteArray("\xFF\xFEs\0", 4), TextEncoding::utf16be).fine);
        QVERIFY(decoded("\xEF\xBB\xBFsite", TextEncoding::utf8).fine);
    }

    void guesses_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<int>("encoding");
        const auto row = [](const char* name, const QByteArray& bytes, TextEncoding encoding) {
            QTest::newRow(name) << bytes << static_cast<int>(encoding);
        };
        row("plain", "site,tier\n", TextEncoding::utf8);
        row("utf-8",
            "Gr\xC3\xB6\xC3\x9F"
            "e",
            TextEncoding::utf8);
        row("utf-8 with mark", "\xEF\xBB\xBFsite", TextEncoding::utf8);
        row("utf-16le with mark", QByteArray("\xFF\xFEs\0i\0", 6), TextEncoding::utf16le);
        row("utf-16be with mark", QByteArray("\xFE\xFF\0s\0i", 6), TextEncoding::utf16be);
        row("utf-16le", QByteArray("s\0i\0t\0e\0", 8), TextEncoding::utf16le);
        row("utf-16be", QByteArray("\0s\0i\0t\0e", 8), TextEncoding::utf16be);
        row("euro sign of windows", "Miete 69 \x80", TextEncoding::windows1252);
        row("dash of windows",
            "Hafen \x96 S\xFC"
            "d",
            TextEncoding::windows1252);
        row("euro sign of 8859-15", "Miete 69 \xA4", TextEncoding::iso8859_15);
        row("ligature of 8859-15",
            "B\xBD"
            "uf",
            TextEncoding::iso8859_15);
        row("a half, standing alone",
            "Gr\xF6\xDF"
            "e 2 \xBD m\xB2",
            TextEncoding::windows1252);
        row("letters that all share",
            "Gr\xF6\xDF"
            "e",
            TextEncoding::windows1252);
    }
    void guesses()
    {
        QFETCH(QByteArray, bytes);
        QFETCH(int, encoding);
        QCOMPARE(static_cast<int>(guessEncoding(bytes, true).encoding), encoding);
    }

    void tornEndsAreNoTrouble()
    {
        QCOMPARE(guessEncoding("Gr\xC3\xB6\xC3", false).encoding, TextEncoding::utf8);
        QVERIFY(guessEncoding("Gr\xC3\xB6\xC3", true).encoding != TextEncoding::utf8);
    }

    void wordsGoThereAndBack()
    {
        for (const TextEncoding encoding : kTextEncodings)
            QCOMPARE(encodingFromWord(encodingWord(encoding)), std::optional(encoding));
        QVERIFY(!encodingFromWord("latin"));
    }
};

QTEST_GUILESS_MAIN(TestTextEncodings)
#include "test_text_encodings.moc"
