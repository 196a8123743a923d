// SPDX-License-Identifier: GPL-3.0-or-later
// Profiles: as JSON, and in a folder.
#include "mapping_profile.h"

#include <QJsonDocument>
#include <QJsonObject>
#include <QTemporaryDir>
#include <QtTest>

using namespace rungwright;

namespace
{

MappingProfile everything()
{
    ImportMapping mapping = ownFormatMapping();
    mapping.encoding = TextEncoding::iso8859_15;
    mapping.delimiter = '\t';
    mapping.headerRow = 3;
    mapping.headerLines = 2;
    mapping.from(Column::site) = ColumnSource::always(QStringLiteral("Möwe \"Süd\"\\"));
    mapping.from(Column::tier) = ColumnSource::of(QString(), 4);
    mapping.from(Column::advertisedFloor) = {};
    mapping.numbers = {DecimalMark::comma, Grouping::apostrophe, {{QStringLiteral("€"), "EUR"}, {QStringLiteral("m²"), {}}}, true};
    mapping.statuses.push_back({QString(), Status::vacant});
    mapping.yesWords = QStringList{"ja", "x"};
    mapping.skip = {{SkipRule::Kind::isEmpty, {"unit", 1}, {}}, {SkipRule::Kind::beginsWith, {"site", 2}, "Summe"}};
    mapping.floorsFromFile = true;
    mapping.floorsMayBeMissing = true;
    return {QStringLiteral("Möwe, montags"), mapping};
}

QString trouble(const QByteArray& json)
{
    const Outcome<MappingProfile> read = mappingFromJson(json, "F");
    return read.ok() ? QString() : QString::fromStdString(read.trouble());
}

} // namespace

class TestMappingProfile : public QObject
{
    Q_OBJECT

private slots:
    void thereAndBack()
    {
        for (const MappingProfile& profile : {everything(), MappingProfile{"own", ownFormatMapping()}}) {
            const QByteArray json = mappingToJson(profile);
            const Outcome<MappingProfile> read = mappingFromJson(json, "F");
            QVERIFY2(read.ok(), read.ok() ? "" : read.trouble().c_str());
            QVERIFY(read.value() == profile);
            QCOMPARE(mappingToJson(read.value()), json);
            QVERIFY(!json.contains('/')); // No path.
        }
    }

    void malformed_data()
    {
        QTest::addColumn<QByteArray>("from");
        QTest::addColumn<QByteArray>("to");
        QTest::addColumn<QString>("told");
        const auto row = [](const char* name, const QByteArray& from, const QByteArray& to, const QString& told) {
            QTest::newRow(name) << from << to << told;
        };
        row("newer", "\"version\": 1", "\"version\": 2", "F: the mapping is of format version 2, and this program knows versions up to 1");
        row("no version", "\"version\": 1", "\"version\": \"1\"", "F: version: not a version; found '1'; wanted: 1");
        row("another format", "rungwright-mapping", "rungwright-scenario", "F: this is not an import mapping");
        row("not JSON", "\"version\": 1,", "\"version\": 1",
            "F:4: character 3: not valid JSON: an object { is not closed, or a comma is missing in it");
        row("key twice", "\"version\": 1,", "\"version\": 1, \"version\": 1,", "F:3: character 17: the key 'version' is written twice");
        row("unknown key", "\"header_row\"", "\"row\"", "F: the document: a key that is not known; found 'row'");
        row("header row", "\"header_row\": 3", "\"header_row\": 0", "F: header_row: not a whole number in range; found 0");
        row("encoding", "ISO-8859-15", "EBCDIC", "F: encoding: not an encoding; found 'EBCDIC'; wanted: one of UTF-8, UTF-16LE");
        row("delimiter", "\"tab\"", "\"colon\"",
            "F: delimiter: not a word for it; found 'colon'; wanted: one of comma, semicolon, tab, bar");
        row("column of ours", "\"grade\": {", "\"level\": {", "F: columns: a key that is not known; found 'level'");
        row("no header", "{\"header\": \"grade\"}", "{}", "F: columns.grade.header: missing; found nothing");
        row("occurrence", "\"occurrence\": 4", "\"occurrence\": 0", "F: columns.tier.occurrence: not a whole number in range; found 0");
        row("two sources", "{\"header\": \"grade\"}", "{\"header\": \"grade\", \"constant\": \"3\"}",
            "F: columns.grade.constant: a constant and a column");
        row("status", "\"status\": \"reserved\"", "\"status\": \"gone\"", "F: statuses[2].status: not a status; found 'gone'");
        row("currency", "\"currency\": \"EUR\"", "\"currency\": \"EURO\"", "F: the sign '€': not a currency; found 'EURO'");
        row("truth", "\"floors_from_file\": true", "\"floors_from_file\": 1", "F: floors_from_file: neither true nor false; found 1");
        row("incomplete", "{\"header\": \"unit\"}", "{\"constant\": \"x\"}",
            "F: the constant for 'unit': the units would all have one name");
        row("not text", "\"ja\", ", "3, ", "F: locked.yes[0]: not a text; found 3");
    }
    void malformed()
    {
        QFETCH(QByteArray, from);
        QFETCH(QByteArray, to);
        QFETCH(QString, told);
        QByteArray json = mappingToJson(everything());
        QVERIFY(json.contains(from));
        json.replace(json.indexOf(from), from.size(), to);
        QVERIFY2(trouble(json).startsWith(told), qPrintable(trouble(json)));
    }

    // Without it a point and no groups would be taken for granted, and a price be wrong without a word.
    void numbersAreNeeded()
    {
        QJsonObject document = QJsonDocument::fromJson(mappingToJson(everything())).object();
        document.remove("numbers");
        const QString told = trouble(QJsonDocument(document).toJson());
        QVERIFY2(told.startsWith(QStringLiteral("F: numbers: missing; found nothing; wanted: an object that says how numbers are written")),
                 qPrintable(told));
    }

    void notText() { QVERIFY(trouble("\xFF").startsWith(QStringLiteral("F:1: byte 1"))); }

    void incompleteIsNotSaved()
    {
        const QTemporaryDir folder;
        MappingProfile profile = everything();
        profile.mapping.from(Column::unit) = {};
        const QString path = folder.filePath("x.mapping.json");
        const Outcome<bool> saved = saveMapping(profile, path);
        QVERIFY(!saved.ok());
        QVERIFY(QString::fromStdString(saved.trouble()).startsWith("not saved, because the mapping is not complete: 'unit' has no source"));
        QVERIFY(!QFile::exists(path));
        profile = everything();
        profile.name = "two\nlines";
        QVERIFY(!saveMapping(profile, path).ok());
    }

    void shelf()
    {
        const QTemporaryDir folder;
        const MappingShelf shelf(folder.filePath("not/there/yet"));
        QVERIFY(shelf.list().empty());
        const auto profile = [](const QString& name, const QStringList& headers) {
            MappingProfile made{name, ownFormatMapping()};
            made.mapping.headers = headers;
            return made;
        };
        const auto superset = shelf.save(profile("Büro", {"a", "b"}));
        QVERIFY2(superset.ok(), superset.ok() ? "" : superset.trouble().c_str());
        QVERIFY(superset.value().endsWith("/buro.mapping.json"));
        QVERIFY(shelf.save(profile("BURO!", {"b", "a", "c"})).ok()); // Another name, another file.
        QVERIFY(shelf.save(profile("alle", {"a", "b", "c"})).ok());
        QVERIFY(shelf.save(profile("more", {"a", "b", "c", "d"})).ok());
        QCOMPARE(shelf.list().size(), std::size_t(4));
        QCOMPARE(shelf.list().front().profile.name, QStringLiteral("alle"));
        QStringList found;
        for (const auto& entry : shelf.matching({" A ", "B", "c"}))
            found << entry.profile.name;
        QCOMPARE(found, QStringList({"alle", "BURO!", "Büro"}));
        // The same name in other letters replaces.
        QVERIFY(shelf.save(profile("ALLE", {"z"})).ok());
        QCOMPARE(shelf.list().size(), std::size_t(4));
        QCOMPARE(shelf.matching({"z"}).size(), std::size_t(1));
        QCOMPARE(shelf.matchingSample("x\n", true).size(), std::size_t(0));
        QCOMPARE(shelf.matchingSample("z\n1\n", true).size(), std::size_t(1));
        QVERIFY(shelf.remove(superset.value()).ok());
        QVERIFY(!shelf.remove(superset.value()).ok());
        QVERIFY(!shelf.remove(QStringLiteral("/etc/hostname")).ok());
        QCOMPARE(shelf.list().size(), std::size_t(3));
        // A file that cannot be read is told and left alone.
        QFile broken(folder.filePath("not/there/yet/broken.mapping.json"));
        QVERIFY(broken.open(QIODevice::WriteOnly) && broken.write("{") == 1);
        broken.close();
        QStringList troubles;
        QCOMPARE(shelf.list(&troubles).size(), std::size_t(3));
        QCOMPARE(troubles.size(), qsizetype(1));
    }
};

QTEST_GUILESS_MAIN(TestMappingProfile)
#include "test_mapping_profile.moc"
