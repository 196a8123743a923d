// SPDX-License-Identifier: GPL-3.0-or-later
// The fast way to read a unit list against the careful one: on lists clean and broken, cut into pieces anywhere, by one thread and by many,
// both must give the same in every field and every message.
#include "encoding.h"
#include "fast_unit_list.h"
#include "file_helpers.h"
#include "plain_cells.h"
#include "plain_csv.h"

#include <QThread>
#include <QtTest>

#include <bit>
#include <charconv>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

QStringList texts(const UnitListResult& read)
{
    QStringList all{QString::fromStdString(read.currency.code),
                    QString::number(read.currency.decimals),
                    QString::number(read.rowsTaken),
                    QString::number(read.rowsFine),
                    QString::number(read.refusedCount),
                    read.unknownColumns.join(u'|'),
                    read.encoding,
                    read.fileTrouble};
    for (const RefusedRow& row : read.refused)
        all << QString::number(row.line) << QString::number(row.column) << row.columnName << row.text(QStringLiteral("F"));
    return all;
}

bool same(const UnitListResult& a, const UnitListResult& b) { return texts(a) == texts(b) && a.tiers == b.tiers; }

UnitListResult carefully(const QByteArray& bytes, const UnitListOptions& options)
{
    return readUnitListCarefully(bytes, QStringLiteral("F"), options);
}

FastEnd fast(const QByteArray& bytes, const UnitListOptions& options, const FastSettings& settings, UnitListResult& out)
{
    QBuffer buffer;
    buffer.setData(bytes);
    buffer.open(QIODevice::ReadOnly);
    return readFastResult(buffer, options, settings, {}, out);
}

/// A text as `plainRecords` wants it: with zeros behind it.
struct Padded {
    explicit Padded(std::string_view text) : bytes(text.begin(), text.end()), size(text.size()) { bytes.resize(size + kPadding, '\0'); }
    char* begin() { return bytes.data(); }
    char* end() { return bytes.data() + size; }
    std::vector<char> bytes;
    std::size_t size;
};

QByteArray quoted(const QByteArray& text, Dice& dice, int quotes)
{
    if (!text.contains(',') && !text.contains('"') && !text.contains('\n') && !text.contains('\r') && dice.whole(0, 99) >= quotes)
        return text;
    return '"' + QByteArray(text).replace("\"", "\"\"") + '"';
}

/// A list that is nearly always fine, in one of the many dresses a fine list has.
QByteArray dressedList(Dice& dice)
{
    const QByteArray lineEnd = dice.whole(0, 2) == 0 ? "\r\n" : "\n";
    const int quotes = dice.whole(0, 3) == 0 ? 30 : 0;
    const bool mixed = dice.coin();
    const bool spaces = dice.whole(0, 4) == 0;
    const int rows = dice.whole(1, 60);
    std::vector<QByteArray> columns{"site", "tier", "unit", "asking_price", "status", "advertised_floor"};
    for (const char* more : {"currency", "grade", "area", "vacancy_chance", "locked", "remark", "", "Built in"}) {
        if (dice.coin())
            columns.push_back(more);
    }
    for (std::size_t i = columns.size(); i > 1 && dice.coin(); --i)
        std::swap(columns[i - 1], columns[static_cast<std::size_t>(dice.whole(0, int(i) - 1))]);
    const std::vector<QByteArray> statuses{"vacant", "occupied", "reserved", "closed", "Vacant"};
    const std::vector<QByteArray> sites{"Ash", "Élan, quay", "倉庫", "A \"B\" C", "Very long name of an invented site that goes on"};
    QByteArray out = dice.whole(0, 3) == 0 ? "\xEF\xBB\xBF" : "";
    const auto line = [&](const auto& cellOf) {
        for (std::size_t i = 0; i < columns.size(); ++i) {
            QByteArray cell = cellOf(columns[i]);
            if (spaces && dice.whole(0, 5) == 0)
                cell = dice.coin() ? " " + cell : cell + "\u00a0 ";
            out += (i > 0 ? "," : "") + quoted(cell, dice, quotes);
        }
        out += lineEnd;
    };
    line([](const QByteArray& name) { return name; });
    for (int row = 0; row < rows; ++row) {
        const int tier = mixed ? dice.whole(0, 6) : row / 9;
        const bool cents = dice.coin();
        line([&](const QByteArray& name) -> QByteArray {
            if (name == "site")
                return sites[static_cast<std::size_t>(tier) % sites.size()];
            if (name == "tier")
                return "T" + QByteArray::number(tier);
            if (name == "unit")
                return (dice.whole(0, 9) == 0 ? QByteArray("line\nbreak ") : QByteArray("U")) + QByteArray::number(row);
            if (name == "asking_price")
                return QByteArray::number(dice.whole(1, 5000)) + (cents ? "." + QByteArray::number(dice.whole(10, 99)) : QByteArray());
            if (name == "status")
                return statuses[static_cast<std::size_t>(dice.whole(0, dice.whole(0, 9) == 0 ? 4 : 3))];
            if (name == "advertised_floor")
                return row % 9 == 3 && dice.coin() ? QByteArray() : QByteArray(QByteArray::number(40 + tier) + (dice.coin() ? ".00" : ""));
            if (name == "currency")
                return dice.whole(0, 3) == 0 ? "" : dice.whole(0, 9) == 0 ? "eur" : "EUR";
            if (name == "grade")
                return dice.coin() ? QByteArray() : QByteArray::number(dice.whole(-2, 9));
            if (name == "area")
                return dice.coin() ? QByteArray() : QByteArray::number(dice.whole(1, 400)) + "." + QByteArray::number(dice.whole(0, 9999));
            if (name == "vacancy_chance")
                return dice.coin() ? QByteArray() : "0." + QByteArray::number(dice.whole(0, 99999));
            if (name == "locked")
                return dice.coin() ? QByteArray() : QByteArray(dice.coin() ? "yes" : "No");
            return QByteArray::fromStdString(oddText(dice, 3)).replace('\r', "");
        });
        if (dice.whole(0, 30) == 0)
            out += dice.coin() ? lineEnd : QByteArray(int(columns.size()) - 1, ',') + lineEnd;
    }
    if (dice.whole(0, 3) == 0)
        out.chop(lineEnd.size());
    return out;
}

void damage(QByteArray& bytes, Dice& dice)
{
    for (int i = std::max(1, dice.whole(-3, 3)); i > 0; --i) {
        const int at = dice.whole(0, int(bytes.size()) - 1);
        switch (dice.whole(0, 5)) {
        case 0:
            bytes[at] = char(dice.whole(0, 255));
            break;
        case 1:
            bytes.insert(at, "\",\n\r\0\xFF"[dice.whole(0, 5)]);
            break;
        case 2:
            bytes.remove(at, dice.whole(1, 8));
            break;
        case 3:
            bytes.insert(at, bytes.mid(at, dice.whole(1, 80))); // Among others, rows that are there twice.
            break;
        case 4:
            bytes.insert(at, QByteArray::fromStdString(oddText(dice, 2)));
            break;
        default:
            bytes.truncate(std::max(1, at));
        }
        if (bytes.isEmpty())
            bytes = "x";
    }
}

UnitListOptions someOptions(Dice& dice)
{
    const QStringList codes{QString(),           QString(), QStringLiteral("EUR"), QStringLiteral("JPY"), QStringLiteral("KWD"),
                            QStringLiteral("no")};
    return {codes[std::max(0, dice.whole(-20, 5))], dice.coin()};
}

} // namespace

class TestFastUnitList : public QObject
{
    Q_OBJECT

private slots:
    void cleanLists()
    {
        Dice dice(4711);
        int done = 0;
        int clean = 0;
        for (int round = 0; round < 800; ++round) {
            const QByteArray bytes = dressedList(dice);
            const UnitListOptions options = someOptions(dice);
            const UnitListResult wanted = carefully(bytes, options);
            const auto small = static_cast<std::size_t>(dice.whole(1, 300));
            clean += wanted.clean();
            for (const FastSettings& settings : {FastSettings{}, FastSettings{1, small}, FastSettings{2, small}, FastSettings{7, small}}) {
                UnitListResult got;
                const FastEnd end = fast(bytes, options, settings, got);
                // In one piece every clean list of these is plainly fine. In small ones the first may name no currency and a later one may.
                QVERIFY2(settings.threads > 0 || (end == FastEnd::done) == wanted.clean(), bytes.constData());
                if (end == FastEnd::done) {
                    done += settings.threads == 1;
                    QVERIFY2(same(got, wanted), bytes.constData());
                }
            }
            QVERIFY2(same(readUnitList(bytes, QStringLiteral("F"), options), wanted), bytes.constData());
        }
        qInfo("%d of 800 lists were clean, %d of them were read the fast way in small pieces", clean, done);
        QVERIFY(clean > 300);
        QVERIFY(done > clean / 2);
    }

    void brokenLists()
    {
        Dice dice(815);
        int done = 0;
        int refused = 0;
        for (int round = 0; round < 2500; ++round) {
            QByteArray bytes = dressedList(dice);
            damage(bytes, dice);
            const UnitListOptions options = someOptions(dice);
            const UnitListResult wanted = carefully(bytes, options);
            refused += !wanted.clean();
            const FastSettings settings{round % 2 == 0 ? 1U : 3U, static_cast<std::size_t>(dice.coin() ? dice.whole(1, 90) : 262'144)};
            UnitListResult got;
            if (fast(bytes, options, settings, got) == FastEnd::done) {
                ++done;
                QVERIFY2(wanted.clean(), bytes.constData());
                QVERIFY2(same(got, wanted), bytes.constData());
            }
            QVERIFY2(same(readUnitList(bytes, QStringLiteral("F"), options), wanted), bytes.constData());
        }
        qInfo("%d of 2500 damaged lists were refused, %d were read the fast way", refused, done);
        QVERIFY(refused > 1000);
        QVERIFY(done > 100);
    }

    // Each of these is for the careful reader alone: it takes some, and refuses others with its own words.
    void leftToTheCarefulReader_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::newRow("the same unit twice") << unitList({"Q,T,U,7,vacant,6", "Q,T2,U,7,vacant,6", "Q,T,U,8,vacant,6"});
        QTest::newRow("two floors") << unitList({"Q,T,U,7,vacant,6", "Q,T,V,7,vacant,5"});
        QTest::newRow("no floor") << unitList({"Q,T,U,7,vacant,6", "Q,T2,V,7,vacant,"});
        QTest::newRow("too few cells") << unitList({"Q,T,U,7,vacant"});
        QTest::newRow("too many cells") << unitList({"Q,T,U,7,vacant,6,"});
        QTest::newRow("no name") << unitList({"Q,T,,7,vacant,6"});
        QTest::newRow("price with a comma") << unitList({"Q,T,U,\"7,50\",vacant,6"});
        QTest::newRow("price of nothing") << unitList({"Q,T,U,0.00,vacant,6"});
        QTest::newRow("price with many decimals") << unitList({"Q,T,U,7.005,vacant,6"});
        QTest::newRow("price beyond 32 bits") << unitList({"Q,T,U,42949672.96,vacant,6"});
        QTest::newRow("price with a plus") << unitList({"Q,T,U,+7,vacant,6"});
        QTest::newRow("CR alone") << unitList({"Q,T,U,7,vacant,6"}).replace('\n', '\r');
        QTest::newRow("CR at the end") << unitList({"Q,T,U,7,vacant,6"}).chopped(1) + '\r';
        QTest::newRow("quote inside") << unitList({"Q,T\"x\",U,7,vacant,6"});
        QTest::newRow("text behind a quote") << unitList({"Q,\"T\"x,U,7,vacant,6"});
        QTest::newRow("open quote") << unitList({"Q,T,\"U,7,vacant,6"});
        QTest::newRow("not UTF-8") << unitList({"Q,T,\xE9,7,vacant,6"});
        QTest::newRow("NUL") << unitList({QByteArray("Q,T,U\0,7,vacant,6", 17)});
        QTest::newRow("half a character at the end") << unitList({"Q,T,U,7,vacant,6"}) + "\xC3";
        QTest::newRow("UTF-16") << QByteArray("\xFF\xFEs\0i\0t\0e\0", 10);
        QTest::newRow("a column twice") << QByteArray("site,site\nQ,Q\n");
        QTest::newRow("header alone") << kNeededHeader + '\n';
        QTest::newRow("blank lines alone") << QByteArray("\n\n");
        QTest::newRow("nothing") << QByteArray();
        QTest::newRow("two currencies") << kNeededHeader + ",currency\nQ,T,U,7,vacant,6,EUR\nQ,T,V,7,vacant,6,USD\n";
        QTest::newRow("no currency") << kNeededHeader + ",currency\nQ,T,U,7,vacant,6,none\n";
        QTest::newRow("cell over a megabyte") << unitList({"Q,T," + QByteArray(1'100'000, 'u') + ",7,vacant,6"});
        QTest::newRow("grade of six digits") << kNeededHeader + ",grade\nQ,T,U,7,vacant,6,100000\n";
        QTest::newRow("grade with a point") << kNeededHeader + ",grade\nQ,T,U,7,vacant,6,1.0\n";
        QTest::newRow("no area") << kNeededHeader + ",area\nQ,T,U,7,vacant,6,0\n";
        QTest::newRow("chance above 1") << kNeededHeader + ",vacancy_chance\nQ,T,U,7,vacant,6,1.5\n";
        QTest::newRow("locked perhaps") << kNeededHeader + ",locked\nQ,T,U,7,vacant,6,perhaps\n";
    }
    void leftToTheCarefulReader()
    {
        QFETCH(const QByteArray, bytes);
        for (const std::size_t piece : {std::size_t(7), std::size_t(262'144)}) {
            UnitListResult got;
            QVERIFY(fast(bytes, {}, {2, piece}, got) == FastEnd::careful);
        }
        QVERIFY(same(readUnitList(bytes, QStringLiteral("F"), {}), carefully(bytes, {})));
        QVERIFY(same(readUnitList(bytes, QStringLiteral("F"), {{}, true}), carefully(bytes, {{}, true})));
    }

    // Quotation marks, line ends and commas in every order, in texts of up to 16 characters.
    void recordsAsTheLexerSeesThem()
    {
        Dice dice(99);
        int taken = 0;
        for (int round = 0; round < 60'000; ++round) {
            std::string text;
            for (int i = dice.whole(0, 16); i > 0; --i)
                text += "\"\",\n\rab\n,\""[dice.whole(0, 9)];
            if (dice.whole(0, 20) == 0)
                text.insert(0, std::string(static_cast<std::size_t>(dice.whole(50, 70)), 'x')); // Over the end of 64 bytes.
            Padded padded(text);
            std::vector<std::vector<std::string>> rows;
            std::vector<std::string_view> cells;
            const bool plain = plainRecords(padded.begin(), padded.end(), kMostCells, cells, [&](std::span<const std::string_view> row) {
                const bool empty = row.size() == 1 && row[0].empty();
                if (!empty)
                    rows.emplace_back(row.begin(), row.end());
                return true;
            });
            if (!plain)
                continue;
            ++taken;
            Records wanted = lexInPieces(text, text.size() + 1);
            QVERIFY2(wanted.trouble.isEmpty(), text.c_str());
            // A record of one quoted cell without text is one for the lexer and an empty line here; both are blank to a unit list.
            std::erase_if(wanted.rows, [](const auto& row) { return row.size() == 1 && row[0].empty(); });
            QVERIFY2(rows == wanted.rows, text.c_str());
        }
        QVERIFY(taken > 10'000);
    }

    void utf8AsTheDecoderSeesIt()
    {
        Dice dice(123);
        int fine = 0;
        for (int round = 0; round < 40'000; ++round) {
            std::string text = oddText(dice, 30);
            if (dice.coin())
                text[static_cast<std::size_t>(dice.whole(0, int(text.size()) - 1))] = char(dice.whole(0, 255));
            TextDecoder decoder;
            std::string out;
            // A letter first, so that nothing is taken for a byte-order mark.
            const bool wanted = decodeText(QByteArray::fromStdString("a" + text), decoder, out);
            QCOMPARE(isPlainUtf8("a" + text), wanted);
            fine += wanted;
        }
        QVERIFY(fine > 10'000 && fine < 39'000);
        for (const auto& bad : {"\xC0\x80", "\xED\xA0\x80", "\xF4\x90\x80\x80", "\xE0\x9F\xBF", "\xF0\x8F\xBF\xBF", "\x80", "12345678\xFF"})
            QVERIFY2(!isPlainUtf8(bad), bad);
        for (const auto& good : {"\xC2\x80", "\xED\x9F\xBF", "\xF4\x8F\xBF\xBF", "\xE0\xA0\x80", "\xF0\x90\x80\x80", "", "\x01\x7F"})
            QVERIFY2(isPlainUtf8(good), good);
    }

    void numbersAsTheCarefulReaderReadsThem()
    {
        Dice dice(31);
        int taken = 0;
        for (int round = 0; round < 100'000; ++round) {
            std::string text;
            for (int i = dice.whole(1, dice.whole(0, 3) == 0 ? 20 : 8); i > 0; --i)
                text += "0123456789.5"[dice.whole(0, 11)];
            if (dice.whole(0, 20) == 0)
                text[0] = "+-e ,"[dice.whole(0, 4)];
            double quick = 0;
            if (plainNumber(text, quick)) {
                ++taken;
                double wanted = 0;
                const auto end = std::from_chars(text.data(), text.data() + text.size(), wanted, std::chars_format::fixed);
                QVERIFY(end.ec == std::errc() && end.ptr == text.data() + text.size());
                QCOMPARE(std::bit_cast<quint64>(quick), std::bit_cast<quint64>(wanted));
            }
            for (const int decimals : {0, 2, 3}) {
                std::uint32_t price = 0;
                Price wanted;
                const Currency currency{"XXX", decimals};
                const bool fine = !readPrice(text, currency, wanted);
                if (plainPrice(text, decimals, price)) {
                    QVERIFY2(fine, text.c_str());
                    QCOMPARE(qint64(price), qint64(wanted.minor));
                } else if (fine) {
                    QVERIFY2(wanted.minor > 0xFFFFFFFFLL || text[0] == '+' || text.size() > 18, text.c_str());
                }
            }
        }
        QVERIFY(taken > 20'000);
    }

    void sameForAnyNumberOfThreads()
    {
        QByteArray bytes = kNeededHeader + ",grade,area,currency\n";
        for (int i = 0; i < 30'000; ++i)
            bytes += "Site " + QByteArray::number(i / 5000) + ",T" + QByteArray::number(i * 7 % 83) + ",U" + QByteArray::number(i) + "," +
                     QByteArray::number(50 + i % 40) + ".50,vacant,49,3," + QByteArray::number(i % 20 + 1) + ".25,EUR\n";
        const UnitListResult wanted = carefully(bytes, {});
        QVERIFY(wanted.clean());
        for (const unsigned threads : {1U, 2U, 7U}) {
            for (const std::size_t piece : {std::size_t(5'000), std::size_t(262'144)}) {
                UnitListResult got;
                QVERIFY(fast(bytes, {}, {threads, piece}, got) == FastEnd::done);
                QVERIFY(same(got, wanted));
            }
        }
    }

    void progressAndCancelling()
    {
        QByteArray bytes = kNeededHeader + '\n';
        for (int i = 0; i < 20'000; ++i)
            bytes += "Q,T,U" + QByteArray::number(i) + ",7,vacant,6\n";
        std::vector<double> shares;
        QThread* const here = QThread::currentThread();
        bool elsewhere = false;
        const auto read = [&](int most) {
            shares.clear();
            QBuffer buffer;
            buffer.setData(bytes);
            buffer.open(QIODevice::ReadOnly);
            UnitListResult out;
            const auto progress = [&](double share) {
                elsewhere = elsewhere || QThread::currentThread() != here;
                shares.push_back(share);
                return int(shares.size()) < most;
            };
            const FastEnd end = readFastResult(buffer, {}, {3, 1000}, progress, out);
            return std::pair(end, out.tiers.size());
        };
        QVERIFY(read(1'000'000) == std::pair(FastEnd::done, std::size_t(1)));
        QVERIFY(shares.size() > 300);
        QVERIFY(std::is_sorted(shares.begin(), shares.end()));
        QCOMPARE(shares.back(), 1.0);
        for (const int most : {1, 2, 40}) {
            QVERIFY(read(most) == std::pair(FastEnd::cancelled, std::size_t(0)));
            QCOMPARE(int(shares.size()), most);
        }
        QVERIFY(!elsewhere);
    }

    // A trouble at the very end: the fast way has told of nearly all when the careful one begins.
    void progressNeverGoesBack()
    {
        QByteArray bytes = kNeededHeader + '\n';
        for (int i = 0; i < 60'000; ++i)
            bytes += "Q,T,U" + QByteArray::number(i) + ",7,vacant,6\n";
        bytes += "Q,T,U1,7,vacant,6\n";
        std::vector<double> shares;
        const UnitListResult got = readUnitList(bytes, QStringLiteral("F"), {}, [&shares](double share) {
            shares.push_back(share);
            return true;
        });
        QVERIFY(std::is_sorted(shares.begin(), shares.end()));
        QVERIFY(same(got, carefully(bytes, {})));
        QCOMPARE(got.refusedCount, qint64(1));
    }
};

QTEST_GUILESS_MAIN(TestFastUnitList)
#include "test_fast_unit_list.moc"
