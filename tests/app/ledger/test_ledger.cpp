// SPDX-License-Identifier: GPL-3.0-or-later
// What goes into the ledger comes out of it, in order, and stays as it is.
#include "invented_entries.h"
#include "ledger.h"

#include <QSqlDatabase>
#include <QSqlError>
#include <QSqlQuery>
#include <QTemporaryDir>
#include <QTimeZone>
#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

/// Opened for writing, or a test that ends here.
Ledger opened(const QString& path)
{
    auto ledger = Ledger::open(path, Ledger::For::writing);
    if (!ledger.ok())
        qFatal("%s", ledger.trouble().c_str());
    return std::move(ledger).value();
}

SignOff at(const QString& utc, std::int64_t price)
{
    SignOff entry = inventedEntry(0, 1);
    entry.whenUtc = utc.toStdString();
    entry.units[0].after = Price{price};
    return entry;
}

QString utcOf(const QTimeZone& zone, const QDate& day, const QTime& time)
{
    return QDateTime(day, time, zone).toUTC().toString(Qt::ISODate);
}

} // namespace

class TestLedger : public QObject
{
    Q_OBJECT

private slots:
    void standsBesideTheScenario()
    {
        QCOMPARE(ledgerPathFor(QStringLiteral("/tmp/a/north.rungs.json")), QStringLiteral("/tmp/a/north.ledger.sqlite"));
        QCOMPARE(ledgerPathFor(QStringLiteral("/tmp/a.b/North.RUNGS.JSON")), QStringLiteral("/tmp/a.b/North.ledger.sqlite"));
        QCOMPARE(ledgerPathFor(QStringLiteral("/tmp/north.json")), QStringLiteral("/tmp/north.ledger.sqlite"));
        QCOMPARE(ledgerPathFor(QStringLiteral("/tmp/north.v2")), QStringLiteral("/tmp/north.v2.ledger.sqlite"));
        QCOMPARE(ledgerPathFor(QString()), QString());
        QCOMPARE(ledgerPathFor(QStringLiteral(":/samples/storage.rungs.json")), QString());
    }

    void keepsTheWholeEntry()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("north # 1 %41 ü.ledger.sqlite"));
        SignOff odd = inventedEntry(1, 7);
        odd.site.clear();
        odd.who = "Zoë O'Quill; DROP TABLE sign_off";
        odd.note = "two\nlines, \"quoted\", ?1 :name مرسى";
        odd.currency = {"KWD", 3};
        odd.advertisedFloor.reset();
        odd.units[2].status = Status::reserved;
        odd.units[3].status = Status::closed;
        odd.units[4].after = kGreatestPrice;
        const SignOff plain = inventedEntry(2, 3);
        std::int64_t first = 0;
        {
            Ledger ledger = opened(path);
            first = ledger.record(odd).value();
            QVERIFY(ledger.record(plain).value() > first);
        }
        QCOMPARE(QDir(folder.path()).entryList(QDir::Files).size(), 1); // The log went into the file when it was closed.
        Ledger ledger = opened(path);
        QVERIFY(ledger.check().ok());
        QVERIFY(ledger.entry(first).value() == odd);
        QVERIFY(!ledger.entry(first + 100).value());
        QVERIFY(ledger.lastOf(plain.site, plain.tier).value() == plain);
        QVERIFY(!ledger.lastOf(plain.site, "Large").value());

        const auto lines = ledger.listing().value();
        QCOMPARE(lines.size(), std::size_t{2});
        const SignOffLine& line = lines[1];
        QCOMPARE(line.instant, kFirstInstant + 2 * kHour);
        QVERIFY(line.who == plain.who && line.note == plain.note && line.site == plain.site && line.tier == plain.tier);
        QVERIFY(line.candidate == plain.candidate && line.currency == plain.currency && line.advertisedFloor == plain.advertisedFloor);
        QVERIFY(line.cheapestBefore == 9'002.25 && line.cheapestAfter == 8'502.5);
        QVERIFY(line.gapBefore == 2'102.25 && line.gapAfter == 1'602.5);
        QCOMPARE(line.units, std::int64_t{3});
        QCOMPARE(line.changed, std::int64_t{2});
        QVERIFY(!lines[0].advertisedFloor);
        QVERIFY(ledger.history(plain.site, plain.tier).value() == std::vector<SignOffLine>{line});
        QVERIFY((ledger.unitsOf(plain.site, plain.tier).value() == std::vector<std::string>{"U0", "U1", "U2"}));
        const auto unit = ledger.unitHistory(plain.site, plain.tier, "U1").value();
        QCOMPARE(unit.size(), std::size_t{1});
        QVERIFY(unit[0].status == Status::vacant && unit[0].before == plain.units[1].before && unit[0].after == plain.units[1].after);
        QVERIFY(ledger.unitHistory(plain.site, plain.tier, "none").value().empty());
    }

    void isInTheOrderOfTime()
    {
        const QTemporaryDir folder;
        Ledger ledger = opened(folder.filePath(QStringLiteral("l.sqlite")));
        for (const int number : {5, 1, 3, 1})
            QVERIFY(ledger.record(inventedEntry(number, 2)).ok());
        std::vector<std::int64_t> hours;
        const auto lines = ledger.history("Quayside (invented)", "Small").value();
        for (const SignOffLine& line : lines)
            hours.push_back((line.instant - kFirstInstant) / kHour);
        QVERIFY((hours == std::vector<std::int64_t>{1, 1, 3, 5}));
        QVERIFY(lines[0].id < lines[1].id);
        QVERIFY(ledger.lastOf("Quayside (invented)", "Small").value() == inventedEntry(5, 2));
    }

    void refusesWhatIsNoEntry_data()
    {
        QTest::addColumn<int>("what");
        QTest::addColumn<QString>("says");
        QTest::newRow("local time") << 0 << QStringLiteral("not one in UTC");
        QTest::newRow("nobody") << 1 << QStringLiteral("who signs is missing");
        QTest::newRow("no unit") << 2 << QStringLiteral("has no unit");
        QTest::newRow("twice") << 3 << QStringLiteral("two have the same");
        QTest::newRow("free") << 4 << QStringLiteral("not above zero");
        QTest::newRow("hash") << 5 << QStringLiteral("CHECK constraint failed");
        QTest::newRow("figure twice") << 6 << QStringLiteral("UNIQUE constraint failed");
    }

    void refusesWhatIsNoEntry()
    {
        QFETCH(int, what);
        QFETCH(QString, says);
        const QTemporaryDir folder;
        Ledger ledger = opened(folder.filePath(QStringLiteral("l.sqlite")));
        SignOff entry = inventedEntry(1, 3);
        switch (what) {
        case 0:
            entry.whenUtc = "2026-03-02T08:00:00";
            break;
        case 1:
            entry.who.clear();
            break;
        case 2:
            entry.units.clear();
            break;
        case 3:
            entry.units[1].unit = entry.units[0].unit;
            break;
        case 4:
            entry.units[1].before = Price{0};
            break;
        case 5:
            entry.sheetSha256 = "ABC";
            break;
        default:
            entry.figures.push_back(entry.figures[0]);
        }
        const auto taken = ledger.record(entry);
        QVERIFY(!taken.ok());
        QVERIFY2(taken.trouble().find(says.toStdString()) != std::string::npos, taken.trouble().c_str());
        QVERIFY2(QString::fromStdString(taken.trouble()).contains(QStringLiteral("othing was recorded")), taken.trouble().c_str());
        QVERIFY(ledger.listing().value().empty());
        QVERIFY(ledger.unitsOf(entry.site, entry.tier).value().empty()); // Nor a part of it.
        QVERIFY(ledger.record(inventedEntry(1, 3)).ok());                // And it goes on working.
    }

    void neverChangesWhatWasSigned()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        QVERIFY(opened(path).record(inventedEntry(1, 3)).ok());
        {
            QSqlDatabase raw = QSqlDatabase::addDatabase(QStringLiteral("QSQLITE"), QStringLiteral("raw"));
            raw.setDatabaseName(path);
            QVERIFY(raw.open());
            QSqlQuery query(raw);
            for (const char* table : {"sign_off", "unit_price", "figure", "check_made"}) {
                QVERIFY(!query.exec(QStringLiteral("DELETE FROM %1").arg(QLatin1String(table))));
                QVERIFY2(query.lastError().text().contains(QStringLiteral("never deleted")), qPrintable(query.lastError().text()));
            }
            QVERIFY(!query.exec(QStringLiteral("UPDATE unit_price SET after = 1")));
            QVERIFY(!query.exec(QStringLiteral("UPDATE sign_off SET who = 'Nobody'")));
            // The header as the tables' page of the sqlite documentation has it ("Application ID", "User version").
            QVERIFY(query.exec(QStringLiteral("PRAGMA application_id")) && query.next());
            QCOMPARE(query.value(0).toInt(), 0x52774C64);
            QVERIFY(query.exec(QStringLiteral("PRAGMA journal_mode")) && query.next());
            QCOMPARE(query.value(0).toString(), QStringLiteral("wal"));
        }
        QSqlDatabase::removeDatabase(QStringLiteral("raw"));
        QVERIFY(opened(path).entry(1).value() == inventedEntry(1, 3));
    }

    void instants()
    {
        QCOMPARE(instantFromUtcText("1970-01-01T00:00:00Z").value(), std::int64_t{0});
        QCOMPARE(instantFromUtcText("2026-03-02T08:00:00Z").value(), kFirstInstant); // date -u -d 2026-03-02T08:00:00Z +%s
        QCOMPARE(instantFromUtcText("2026-03-02T08:00:00.250Z").value(), kFirstInstant + 250);
        for (const char* no : {"", "2026-03-02", "2026-03-02T08:00:00", "2026-03-02T08:00:00+01:00", "2026-02-30T08:00:00Z",
                               "2026-03-02T25:00:00Z", "2026-03-02T08:00:00Z\n", "２026-03-02T08:00:00Z"})
            QVERIFY2(!instantFromUtcText(no), no);
        for (const std::int64_t instant : {std::int64_t{0}, kFirstInstant, kFirstInstant + 7})
            QCOMPARE(instantFromUtcText(utcText(instant)).value(), instant);
    }

    // The two half past twos of the night on which Berlin's clocks go back, and the hour that is missing in March. The nights themselves:
    // Directive 2000/84/EC, last Sundays of March and October at 01:00 UTC.
    void nightsOnWhichClocksChange()
    {
        const QTimeZone berlin("Europe/Berlin");
        if (!berlin.isValid())
            QSKIP("no time zone data here (package tzdata)");
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        const QString firstHalfPastTwo = QStringLiteral("2026-10-25T00:30:00Z");  // 02:30, still summer
        const QString secondHalfPastTwo = QStringLiteral("2026-10-25T01:30:00Z"); // 02:30 again
        {
            Ledger ledger = opened(path);
            QVERIFY(ledger.record(at(secondHalfPastTwo, 9'000)).ok());
            QVERIFY(ledger.record(at(firstHalfPastTwo, 8'000)).ok());
            QVERIFY(ledger.record(at(utcOf(berlin, QDate(2026, 3, 29), QTime(1, 59)), 7'000)).ok());
            QVERIFY(ledger.record(at(utcOf(berlin, QDate(2026, 3, 29), QTime(3, 0)), 6'000)).ok());
        }
        const auto local = [&](const SignOffLine& line) {
            return QDateTime::fromMSecsSinceEpoch(line.instant, berlin).toString(QStringLiteral("yyyy-MM-dd hh:mm"));
        };
        const QByteArray before = qgetenv("TZ");
        for (const char* zone : {"Europe/Berlin", "America/New_York", "Asia/Kathmandu", "UTC"}) {
            qputenv("TZ", zone);
            tzset();
            Ledger ledger = opened(path);
            const auto lines = ledger.listing().value();
            QCOMPARE(lines.size(), std::size_t{4});
            QCOMPARE(lines[1].instant - lines[0].instant, std::int64_t{60'000}); // 01:59 and 03:00 are a minute apart.
            QCOMPARE(local(lines[0]), QStringLiteral("2026-03-29 01:59"));
            QCOMPARE(local(lines[1]), QStringLiteral("2026-03-29 03:00"));
            QCOMPARE(lines[3].instant - lines[2].instant, kHour); // The two half past twos are not.
            QCOMPARE(local(lines[2]), QStringLiteral("2026-10-25 02:30"));
            QCOMPARE(local(lines[3]), QStringLiteral("2026-10-25 02:30"));

            // One day back from midnight after the long day reaches to 01:00 of that day, not to its beginning.
            PriorWindow window;
            window.until = QDateTime(QDate(2026, 10, 26), QTime(0, 0), berlin).toMSecsSinceEpoch();
            window.days = 1;
            QCOMPARE(QDateTime::fromMSecsSinceEpoch(window.from(), berlin).toString(QStringLiteral("yyyy-MM-dd hh:mm")),
                     QStringLiteral("2026-10-25 01:00"));
            const SignOff entry = inventedEntry(0, 1);
            const auto lowest = ledger.lowestAsked(entry.site, entry.tier, entry.currency, window).value();
            QVERIFY(lowest.tier && lowest.tier->lowest == Price{6'000} && lowest.tier->whole); // Since March, until half past two.
            window.until = instantFromUtcText("2026-10-26T00:45:00Z").value();                 // Now from between the two.
            const auto later = ledger.lowestAsked(entry.site, entry.tier, entry.currency, window).value();
            QVERIFY(later.tier && later.tier->lowest == Price{7'000}); // What that sheet found; see inventedEntry.
        }
        if (before.isNull())
            qunsetenv("TZ");
        else
            qputenv("TZ", before);
        tzset();
    }

    void beginsInAnEmptyFile()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        QFile file(path);
        QVERIFY(file.open(QIODevice::WriteOnly));
        file.close();
        {
            const auto reader = Ledger::open(path, Ledger::For::reading);
            QVERIFY2(reader.ok(), reader.ok() ? "" : reader.trouble().c_str());
            QVERIFY(reader.value().listing().value().empty());
            QVERIFY(reader.value().unitsOf("a", "b").value().empty());
            QVERIFY(!reader.value().lastOf("a", "b").value());
            QVERIFY(!reader.value().lowestAsked("a", "b", {}, {}).value().tier);
        }
        QCOMPARE(QFileInfo(path).size(), qint64{0}); // Reading leaves it so.
        Ledger ledger = opened(path);
        QVERIFY(ledger.record(inventedEntry(1, 2)).ok());
        QVERIFY(ledger.check().ok());
    }

    void readsBesideAWriter()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        QVERIFY(!Ledger::open(path, Ledger::For::reading).ok()); // Nothing there, and nothing made.
        QVERIFY(!QFileInfo::exists(path));
        Ledger writer = opened(path);
        auto reader = Ledger::open(path, Ledger::For::reading);
        QVERIFY(reader.ok());
        QVERIFY(reader.value().listing().value().empty());
        QVERIFY(writer.record(inventedEntry(1, 2)).ok());
        QCOMPARE(reader.value().listing().value().size(), std::size_t{1});
        Ledger held = std::move(reader).value();
        const auto refused = held.record(inventedEntry(2, 2));
        QVERIFY(!refused.ok());
        QVERIFY2(refused.trouble().find("may only be read") != std::string::npos, refused.trouble().c_str());
    }
};

QTEST_GUILESS_MAIN(TestLedger)
#include "test_ledger.moc"
