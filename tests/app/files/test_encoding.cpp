// SPDX-License-Identifier: GPL-3.0-or-later
// UTF-8 and UTF-16 in; everything else refused with line, byte and remedy.
#include "encoding.h"

#include "file_helpers.h"

#include <QStringEncoder>
#include <QtTest>

using namespace rungwright;

class TestEncoding : public QObject
{
    Q_OBJECT

private:
    static bool accepts(const QByteArray& bytes)
    {
        TextDecoder decoder;
        std::string out;
        return decodeText(bytes, decoder, out);
    }

private slots:
    void readsEachEncoding_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<QString>("name");
        const QString text = QStringLiteral("a\u00e9\u0645\u5009\U0001F4E6\r\nb");
        const QByteArray utf8 = text.toUtf8();
        QTest::newRow("UTF-8") << utf8 << "UTF-8";
        QTest::newRow("UTF-8 with BOM") << "\xEF\xBB\xBF" + utf8 << "UTF-8 with BOM";
        const auto utf16 = [&text](QStringConverter::Encoding encoding) {
            QStringEncoder encoder(encoding, QStringConverter::Flag::WriteBom);
            return QByteArray(encoder(text));
        };
        QTest::newRow("UTF-16LE") << utf16(QStringConverter::Utf16LE) << "UTF-16LE";
        QTest::newRow("UTF-16BE") << utf16(QStringConverter::Utf16BE) << "UTF-16BE";
    }

    // Qt's encoder wrote the bytes; whatever the size of the pieces, the text must come out the same.
    void readsEachEncoding()
    {
        QFETCH(QByteArray, bytes);
        QFETCH(QString, name);
        const std::string expected = QStringLiteral("a\u00e9\u0645\u5009\U0001F4E6\r\nb").toStdString();
        for (qsizetype size = 1; size <= bytes.size(); ++size) {
            TextDecoder decoder;
            std::string out;
            for (qsizetype at = 0; at < bytes.size(); at += size)
                QVERIFY(decoder.feed(QByteArrayView(bytes).sliced(at, std::min(size, bytes.size() - at)), out));
            QVERIFY(decoder.finish(out));
            QCOMPARE(out, expected);
            QCOMPARE(decoder.encodingName(), name);
        }
    }

    void shortFiles()
    {
        QVERIFY(accepts(""));
        QVERIFY(accepts("a"));
        QVERIFY(accepts("\xEF\xBB\xBF"));
        QVERIFY(accepts("\xFF\xFE"));
        QVERIFY(!accepts("\xFF"));
        QVERIFY(!accepts("\xEF\xBB"));
        QVERIFY(!accepts(QByteArray("\xFF\xFE"
                                    "a",
                                    3)));
    }

    // Every sequence of one to three bytes, and many of four, judged as Qt's own validator judges them.
    void agreesWithQtOnWhatUtf8Is()
    {
        const auto same = [](const QByteArray& bytes) {
            return accepts(bytes) == QUtf8StringView(bytes.constData(), bytes.size()).isValidUtf8();
        };
        for (int a = 1; a < 256; ++a) {
            QVERIFY2(same(QByteArray(1, char(a))), QByteArray::number(a, 16));
            for (int b = 1; b < 256; ++b) {
                // A leading FF FE, FE FF is a byte-order mark of UTF-16, so every case stands behind a letter.
                const QByteArray two{"x" + QByteArray(1, char(a)) + char(b)};
                QVERIFY2(same(two), two.toHex());
                // Bytes below 80 and above F4 are settled by the shorter cases; third bytes are taken at the edges of their ranges.
                for (const int c : {0x01, 0x7F, 0x80, 0x8F, 0x90, 0x9F, 0xA0, 0xBF, 0xC0, 0xFF}) {
                    if (a < 0xE0)
                        break;
                    QVERIFY2(same(two + char(c)), (two + char(c)).toHex());
                    for (const int d : {0x7F, 0x80, 0xBF, 0xC0})
                        QVERIFY2(same(two + char(c) + char(d)), (two + char(c) + char(d)).toHex());
                }
            }
        }
    }

    void tellsWhereAndWhatToDo_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<qint64>("line");
        QTest::addColumn<qint64>("byte");
        QTest::addColumn<QString>("says");
        // "Café" as Latin-1 on the third line: its E9 is the 12th byte.
        QTest::newRow("Latin-1") << QByteArray("ab\ncd\r\nCaf\xE9\n") << qint64(3) << qint64(11)
                                 << "E9 0A are not UTF-8. Save the file as UTF-8";
        QTest::newRow("lone CR counts") << QByteArray("a\rb\rc\xC0") << qint64(3) << qint64(6) << "C0 are not UTF-8";
        QTest::newRow("cut at the end") << QByteArray("a\n\xE5\x80") << qint64(2) << qint64(3) << "E5 80 are not UTF-8";
        QTest::newRow("NUL") << QByteArray("a\nb\0c", 5) << qint64(2) << qint64(4) << "NUL";
        QTest::newRow("UTF-16 without mark") << QByteArray("a\0b\0", 4) << qint64(1) << qint64(2) << "UTF-16 without a byte-order mark";
        QTest::newRow("UTF-32LE") << QByteArray("\xFF\xFE\0\0a\0\0\0", 8) << qint64(1) << qint64(1) << "UTF-32";
        QTest::newRow("UTF-32BE") << QByteArray("\0\0\xFE\xFF\0\0\0a", 8) << qint64(1) << qint64(1) << "UTF-32";
        QTest::newRow("half a pair") << QByteArray("\xFF\xFE\x0A\0\0\xD8g\0", 8) << qint64(2) << qint64(5) << "surrogate";
        QTest::newRow("low half alone") << QByteArray("\xFE\xFF\xDC\0\0g", 6) << qint64(1) << qint64(3) << "surrogate";
        QTest::newRow("half at the end") << QByteArray("\xFF\xFE"
                                                       "a\0\x3D\xD8",
                                                       6)
                                         << qint64(1) << qint64(5) << "surrogate";
        QTest::newRow("odd length") << QByteArray("\xFF\xFE"
                                                  "a\0b",
                                                  5)
                                    << qint64(1) << qint64(5) << "middle of a character";
    }

    void tellsWhereAndWhatToDo()
    {
        QFETCH(QByteArray, bytes);
        QFETCH(qint64, line);
        QFETCH(qint64, byte);
        QFETCH(QString, says);
        for (qsizetype size = 1; size <= bytes.size(); ++size) {
            TextDecoder decoder;
            std::string out;
            bool fine = true;
            for (qsizetype at = 0; at < bytes.size() && fine; at += size)
                fine = decoder.feed(QByteArrayView(bytes).sliced(at, std::min(size, bytes.size() - at)), out);
            QVERIFY(!fine || !decoder.finish(out));
            QCOMPARE(decoder.troubleLine(), line);
            QCOMPARE(decoder.troubleByte(), byte);
            if (size == bytes.size())
                QVERIFY2(decoder.trouble().contains(says), qPrintable(decoder.trouble()));
            QVERIFY(decoder.trouble().contains(QStringLiteral("UTF-8")));
        }
    }
};

QTEST_GUILESS_MAIN(TestEncoding)
#include "test_encoding.moc"
