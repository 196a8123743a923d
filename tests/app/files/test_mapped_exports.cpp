// SPDX-License-Identifier: GPL-3.0-or-later
// The eight invented exports, each brought in by mapping alone and compared with the same data in our own format.
#include "mapped_exports.h"

#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

QByteArray wholeFile(const QString& path)
{
    QFile file(path);
    return file.open(QIODevice::ReadOnly) ? file.readAll() : QByteArray();
}

void compareFields(const UnitListResult& theirs, const UnitListResult& own)
{
    QCOMPARE(theirs.currency, own.currency);
    QCOMPARE(theirs.rowsTaken, own.rowsTaken);
    QCOMPARE(theirs.tiers.size(), own.tiers.size());
    for (std::size_t t = 0; t < own.tiers.size(); ++t) {
        const Tier& a = theirs.tiers[t].tier;
        const Tier& b = own.tiers[t].tier;
        QCOMPARE(a.site, b.site);
        QCOMPARE(a.name, b.name);
        QCOMPARE(a.advertisedFloor.minor, b.advertisedFloor.minor);
        QCOMPARE(a.units.size(), b.units.size());
        for (std::size_t u = 0; u < b.units.size(); ++u) {
            QCOMPARE(a.units[u].name, b.units[u].name);
            QCOMPARE(a.units[u].asking.minor, b.units[u].asking.minor);
            QCOMPARE(a.units[u].status, b.units[u].status);
            QCOMPARE(a.units[u].locked, b.units[u].locked);
            QCOMPARE(a.units[u].grade, b.units[u].grade);
            QCOMPARE(a.units[u].areaM2, b.units[u].areaM2);
            QCOMPARE(a.units[u].vacancyChance, b.units[u].vacancyChance);
        }
    }
    QVERIFY(theirs.tiers == own.tiers); // And whatever a unit may hold one day.
}

} // namespace

class TestMappedExports : public QObject
{
    Q_OBJECT

private slots:
    void byProfile_data() { each(); }
    void byProfile()
    {
        QFETCH(QString, name);
        const Outcome<MappingProfile> profile = loadMapping(profilePath(name));
        QVERIFY2(profile.ok(), profile.ok() ? "" : profile.trouble().c_str());
        const UnitListResult own = loadUnitList(ownPath(name), {});
        QVERIFY2(own.clean(), qPrintable(own.fileTrouble));
        QVERIFY(own.rowsTaken >= 10);
        const MappedListResult mapped = loadMappedList(exportPath(name), profile.value().mapping, floorsPath(name));
        QVERIFY2(mapped.list.clean(), qPrintable(mapped.list.fileTrouble + refusals(mapped.list)));
        compareFields(mapped.list, own);
    }

    void byProposal_data() { each(); }
    void byProposal()
    {
        QFETCH(QString, name);
        const Outcome<ListSample> sample = takeSample(exportPath(name));
        QVERIFY(sample.ok());
        ImportMapping mapping = proposeMapping(sample.value()).mapping;
        saySpecial(name, mapping);
        QCOMPARE(mappingTrouble(mapping), QString());
        const MappedListResult mapped = loadMappedList(exportPath(name), mapping, floorsPath(name));
        QVERIFY2(mapped.list.clean(), qPrintable(mapped.list.fileTrouble + refusals(mapped.list)));
        compareFields(mapped.list, loadUnitList(ownPath(name), {}));
    }

    // The same from memory, and the file's beginning is enough for the preview: no cell in trouble, every text as the list has it.
    void previewAgrees_data() { each(); }
    void previewAgrees()
    {
        QFETCH(QString, name);
        const ImportMapping mapping = loadMapping(profilePath(name)).value().mapping;
        const ListSample sample = takeSample(exportPath(name)).value();
        const MappingPreview preview = previewMapping(sample, mapping, 1'000);
        QCOMPARE(preview.trouble, QString());
        QCOMPARE(preview.headers, mapping.headers);
        QCOMPARE(preview.rowsInTrouble, qint64(0));
        QVERIFY(preview.missingColumns.isEmpty());
        const QString floors = floorsPath(name);
        const MappedListResult mapped =
            readMappedList(sample.bytes, name, mapping, floors.isEmpty() ? QByteArray() : wholeFile(floors), floors);
        QVERIFY2(mapped.list.clean(), qPrintable(mapped.list.fileTrouble));
        QCOMPARE(preview.rowsSeen - preview.rowsPassedOver, mapped.list.rowsTaken);
        std::set<QString> previewed;
        for (const PreviewRow& row : preview.rows) {
            if (!row.passedOver)
                previewed.insert(row.cells[2].text + QLatin1Char('|') + row.cells[0].text + QLatin1Char('|') + row.cells[4].text);
        }
        std::set<QString> read;
        for (const TierCase& tierCase : mapped.list.tiers) {
            for (const Unit& unit : tierCase.tier.units)
                read.insert(QString::fromStdString(unit.name + '|' + tierCase.tier.site + '|' + std::string(statusWord(unit.status))));
        }
        QCOMPARE(previewed, read);
    }

    // A profile stands in the tree as the program writes it.
    void profilesAreAsSaved_data() { each(); }
    void profilesAreAsSaved()
    {
        QFETCH(QString, name);
        QCOMPARE(mappingToJson(loadMapping(profilePath(name)).value()), wholeFile(profilePath(name)));
    }

    // Each list finds its own profile among the eight.
    void shelfFindsEach_data() { each(); }
    void shelfFindsEach()
    {
        QFETCH(QString, name);
        const MappingShelf shelf(kMappedFolder);
        const ListSample sample = takeSample(exportPath(name)).value();
        const auto found = shelf.matchingSample(sample.bytes, sample.whole);
        QVERIFY(!found.empty());
        QCOMPARE(QFileInfo(found.front().path).fileName(), name + QStringLiteral(".mapping.json"));
    }

    void totalsAreReported()
    {
        const QString name = QStringLiteral("7-total");
        const MappedListResult mapped = loadMappedList(exportPath(name), loadMapping(profilePath(name)).value().mapping, floorsPath(name));
        QCOMPARE(mapped.rowsPassedOver, qint64(2));
        QCOMPARE(mapped.notes.size(), qsizetype(2));
        QVERIFY2(mapped.notes[0].contains(QStringLiteral("'Totaal': 1, the first on line 16")), qPrintable(mapped.notes[0]));
    }

private:
    static QString refusals(const UnitListResult& list)
    {
        QString text;
        for (const RefusedRow& row : list.refused)
            text += row.text(QStringLiteral("F")) + QLatin1Char('\n');
        return text;
    }

    static void each()
    {
        QTest::addColumn<QString>("name");
        for (const char* name : kExports)
            QTest::newRow(name) << QString::fromLatin1(name);
    }
};

QTEST_GUILESS_MAIN(TestMappedExports)
#include "test_mapped_exports.moc"
