// SPDX-License-Identifier: GPL-3.0-or-later
// The figures of `measure --json` and `scan` against core's, for every sample, ladder and model.
#include "program.h"

#include "csv_records.h"
#include "gap/measure.h"
#include "scenario_json.h"
#include "sheet_cells.h"
#include "unit_list.h"

#include <QBuffer>
#include <QDir>
#include <QJsonArray>
#include <QJsonDocument>
#include <QJsonObject>
#include <QRegularExpression>
#include <QTest>

#include <cmath>
#include <functional>

using namespace rungwright;

namespace
{

/// What each number of the JSON object is in a Measurement: the field, and whether it is money.
struct Field {
    const char* key;
    std::function<std::optional<double>(const Measurement&)> value;
    bool money = false;
};

std::optional<double> amount(std::optional<Price> price) { return price ? std::optional<double>(double(price->minor)) : std::nullopt; }

/// The keys in the order in which files have them; texts are checked apart. Source of the order: the program's own exchange format.
const std::vector<Field>& fields()
{
    using M = const Measurement&;
    static const std::vector<Field> all{
        {"units", [](M m) { return double(m.units); }},
        {"rentable", [](M m) { return double(m.rentable); }},
        {"on_offer", [](M m) { return double(m.onOffer); }},
        {"advertised_floor", [](M m) { return amount(m.advertisedFloor); }, true},
        {"lowest", [](M m) { return amount(m.figures.lowest); }, true},
        {"highest", [](M m) { return amount(m.figures.highest); }, true},
        {"width", [](M m) { return amount(m.figures.width); }, true},
        {"mean", [](M m) { return m.figures.mean; }, true},
        {"median", [](M m) { return m.figures.median; }, true},
        {"asking_total", [](M m) { return amount(m.figures.total); }, true},
        {"mean_standing", [](M m) { return m.figures.meanStanding; }},
        {"skew.moment", [](M m) { return m.figures.skew.moment; }},
        {"skew.adjusted", [](M m) { return m.figures.skew.adjusted; }},
        {"skew.medcouple", [](M m) { return m.figures.skew.medcouple; }},
        {"skew.l", [](M m) { return m.figures.skew.l; }},
        {"inversions", [](M m) { return double(m.figures.inversions); }},
        {"left", [](M m) { return m.odds.left ? std::optional<double>(*m.odds.left) : std::nullopt; }},
        {"load", [](M m) { return m.odds.load; }},
        {"expected_cheapest", [](M m) { return m.gap.expectedCheapest; }, true},
        {"gap", [](M m) { return m.gap.gap; }, true},
        {"gap_share", [](M m) { return m.gap.gapShare; }},
        {"claim_part", [](M m) { return m.gap.claimPart; }, true},
        {"shape_part", [](M m) { return m.gap.shapePart; }, true},
        {"chance_floor_met", [](M m) { return m.gap.chanceFloorMet; }},
        {"gap_median", [](M m) { return m.gap.gapMedian; }, true},
        {"gap_p90", [](M m) { return m.gap.gapP90; }, true},
    };
    return all;
}

QJsonValue at(const QJsonObject& object, const QString& key)
{
    return key.startsWith(QLatin1String("skew.")) ? object[QStringLiteral("skew")].toObject().value(key.mid(5)) : object.value(key);
}

/// Empty when the object says what the measurement says. Exactly: a printed number is to read back as the same double.
QString difference(const QJsonObject& object, const Measurement& m, const Currency& currency)
{
    for (const Field& field : fields()) {
        const QJsonValue found = at(object, QString::fromLatin1(field.key));
        std::optional<double> wanted = field.value(m);
        if (wanted && field.money)
            wanted = *wanted / double(currency.minorPerMajor());
        if (wanted ? !found.isDouble() || found.toDouble() != *wanted : !found.isNull())
            return QStringLiteral("%1: %2 instead of %3")
                .arg(QLatin1String(field.key), QString::fromUtf8(QJsonDocument(QJsonArray{found}).toJson(QJsonDocument::Compact)))
                .arg(wanted.value_or(NAN), 0, 'g', 17);
    }
    const QJsonValue none = object[QStringLiteral("chance_none")];
    if (m.odds.defined() ? none.toDouble(-1) != m.odds.none : !(none.isNull() || none.toDouble() == 1))
        return QStringLiteral("chance_none");
    return {};
}

QJsonArray tiersOf(const Ran& ran) { return QJsonDocument::fromJson(ran.out).object()[QStringLiteral("tiers")].toArray(); }

QString text(std::string_view utf8) { return QString::fromUtf8(utf8.data(), qsizetype(utf8.size())); }

/// The records of a worklist, texts as they were before they were guarded against spreadsheets.
QList<QStringList> records(const QByteArray& csv)
{
    QBuffer buffer;
    buffer.setData(csv);
    buffer.open(QIODevice::ReadOnly);
    QList<QStringList> all;
    const CsvEnd end = readCsv(buffer, QStringLiteral("scan"), [&](qint64, std::span<const std::string_view> cells) {
        all += QStringList();
        for (const std::string_view cell : cells)
            all.last() += QString::fromStdString(all.last().size() < 3 ? unguarded(cell) : std::string(cell));
        return true;
    });
    return end.trouble.isEmpty() ? all : QList<QStringList>();
}

} // namespace

class TestHeadlessMeasure : public QObject
{
    Q_OBJECT

private slots:
    void everySampleAndModel_data();
    void everySampleAndModel();
    void everyCandidate_data() { everySampleAndModel_data(); }
    void everyCandidate();
    void keysStandInOrder();
    void unitListsOfTheSamples_data() { everySampleAndModel_data(); }
    void unitListsOfTheSamples();
    void optionsOfTheModels();
    void tableAndReading();
    void scanPutsTheWorstFirst_data() { everySampleAndModel_data(); }
    void scanPutsTheWorstFirst();
    void twoRunsGiveTheSameBytes();
};

void TestHeadlessMeasure::everySampleAndModel_data()
{
    QTest::addColumn<QString>("file");
    const QStringList samples =
        QDir(QStringLiteral(RUNGWRIGHT_SAMPLES)).entryList({QStringLiteral("*.rungs.json")}, QDir::Files, QDir::Name);
    QVERIFY(!samples.isEmpty());
    for (const QString& name : samples)
        QTest::newRow(qPrintable(name)) << QStringLiteral(RUNGWRIGHT_SAMPLES "/") + name;
}

void TestHeadlessMeasure::everySampleAndModel()
{
    QFETCH(QString, file);
    const auto scenario = loadScenario(file);
    QVERIFY2(scenario.ok(), scenario.ok() ? "" : scenario.trouble().c_str());
    const Currency& currency = scenario.value().currency;
    const auto& tiers = scenario.value().tiers;

    for (int model = -1; model < int(kModels.size()); ++model) {
        QStringList arguments{QStringLiteral("measure"), file, QStringLiteral("--json")};
        if (model >= 0)
            arguments << QStringLiteral("--model") << text(modelWord(kModels[std::size_t(model)]));
        const Ran ran = run(arguments);
        QVERIFY2(ran.status == 0 && ran.message == caution(), ran.message);
        const QJsonObject whole = QJsonDocument::fromJson(ran.out).object();
        QCOMPARE(whole[QStringLiteral("currency")].toString().toStdString(), currency.code);
        const QJsonArray found = tiersOf(ran);
        QCOMPARE(std::size_t(found.size()), tiers.size());
        for (std::size_t i = 0; i < tiers.size(); ++i) {
            const QJsonObject object = found[qsizetype(i)].toObject();
            QCOMPARE(object[QStringLiteral("site")].toString().toStdString(), tiers[i].tier.site);
            QCOMPARE(object[QStringLiteral("tier")].toString().toStdString(), tiers[i].tier.name);
            QCOMPARE(object[QStringLiteral("candidate")].toString(), QStringLiteral("current"));
            // Without --model each tier keeps its own settings, as in the window.
            ModelSettings settings = tiers[i].model;
            if (model >= 0)
                settings.kind = kModels[std::size_t(model)];
            QCOMPARE(object[QStringLiteral("model")].toString(), text(modelWord(settings.kind)));
            const QString wrong = difference(object, measured(tiers[i].tier, askingPrices(tiers[i].tier.units), settings), currency);
            QVERIFY2(wrong.isEmpty(), qPrintable(text(tiers[i].tier.name) + QStringLiteral(": ") + wrong));
        }
    }
}

void TestHeadlessMeasure::everyCandidate()
{
    QFETCH(QString, file);
    const auto scenario = loadScenario(file);
    QVERIFY(scenario.ok());
    for (const TierCase& tierCase : scenario.value().tiers) {
        for (int candidate = 0; candidate < int(tierCase.candidates.size()); ++candidate) {
            const QString name = text(tierCase.candidates[std::size_t(candidate)].name);
            const Ran ran =
                run({QStringLiteral("measure"), file, QStringLiteral("--json"), QStringLiteral("--site"), text(tierCase.tier.site),
                     QStringLiteral("--tier"), text(tierCase.tier.name), QStringLiteral("--candidate"), name});
            QVERIFY2(ran.status == 0, ran.message);
            QCOMPARE(tiersOf(ran).size(), 1);
            const QJsonObject object = tiersOf(ran).first().toObject();
            QCOMPARE(object[QStringLiteral("candidate")].toString(), name);
            const QString wrong =
                difference(object, measured(tierCase.tier, pricesOf(tierCase, candidate), tierCase.model), scenario.value().currency);
            QVERIFY2(wrong.isEmpty(), qPrintable(name + QStringLiteral(": ") + wrong));
        }
    }
}

void TestHeadlessMeasure::keysStandInOrder()
{
    QStringList wanted{QStringLiteral("site"), QStringLiteral("tier"), QStringLiteral("candidate")};
    for (const Field& field : fields()) {
        const QString key = QString::fromLatin1(field.key);
        if (key == QLatin1String("skew.moment"))
            wanted += QStringLiteral("skew");
        if (key == QLatin1String("left"))
            wanted += QStringLiteral("model");
        if (key == QLatin1String("expected_cheapest"))
            wanted += QStringLiteral("chance_none");
        wanted += key.startsWith(QLatin1String("skew.")) ? key.mid(5) : key;
    }
    const Ran ran = run({QStringLiteral("measure"), sample("rimalin-studios.rungs.json"), QStringLiteral("--json")});
    QVERIFY(ran.out.startsWith("{\"currency\": \"KWD\", \"tiers\": ["));
    const QStringList lines = QString::fromUtf8(ran.out).split(QLatin1Char('\n'));
    QStringList found;
    static const QRegularExpression key(QStringLiteral("[{ ]\"([a-z_0-9]+)\":"));
    for (auto match = key.globalMatch(lines.value(1)); match.hasNext();)
        found += match.next().captured(1);
    QCOMPARE(found, wanted);
}

void TestHeadlessMeasure::unitListsOfTheSamples()
{
    QFETCH(QString, file);
    const QString csv = file.left(file.size() - int(qstrlen(".rungs.json"))) + QStringLiteral(".csv");
    UnitListResult list = loadUnitList(csv, {});
    QVERIFY2(list.clean(), qPrintable(list.fileTrouble));
    const Ran ran = run({QStringLiteral("measure"), csv, QStringLiteral("--json")});
    QVERIFY2(ran.status == 0, ran.message);
    QCOMPARE(std::size_t(tiersOf(ran).size()), list.tiers.size());
    for (std::size_t i = 0; i < list.tiers.size(); ++i) {
        const Tier& tier = list.tiers[i].tier;
        const QString wrong =
            difference(tiersOf(ran)[qsizetype(i)].toObject(), measured(tier, askingPrices(tier.units), {}), list.currency);
        QVERIFY2(wrong.isEmpty(), qPrintable(text(tier.name) + QStringLiteral(": ") + wrong));
    }
}

void TestHeadlessMeasure::optionsOfTheModels()
{
    const QString file = sample("quillmere-storage.rungs.json");
    const auto scenario = loadScenario(file);
    QVERIFY(scenario.ok());
    const QStringList start{QStringLiteral("measure"), file, QStringLiteral("--json"), QStringLiteral("--model")};
    const QJsonArray six = tiersOf(run(start + QStringList{QStringLiteral("remainder"), QStringLiteral("--left"), QStringLiteral("6")}));
    const QJsonArray busy = tiersOf(run(start + QStringList{QStringLiteral("turnover"), QStringLiteral("--load"), QStringLiteral("12.5")}));
    QCOMPARE(std::size_t(six.size()), scenario.value().tiers.size());
    QCOMPARE(busy.size(), six.size());
    for (qsizetype i = 0; i < six.size(); ++i) {
        const Tier& tier = scenario.value().tiers[std::size_t(i)].tier;
        const std::vector<Price> prices = askingPrices(tier.units);
        const QString left =
            difference(six[i].toObject(), measured(tier, prices, {ModelKind::remainder, 6, {}}), scenario.value().currency);
        QVERIFY2(left.isEmpty(), qPrintable(left));
        const QString load =
            difference(busy[i].toObject(), measured(tier, prices, {ModelKind::turnover, {}, 12.5}), scenario.value().currency);
        QVERIFY2(load.isEmpty(), qPrintable(load));
    }
}

void TestHeadlessMeasure::tableAndReading()
{
    const Ran many = run({QStringLiteral("measure"), sample("quillmere-storage.rungs.json")});
    QCOMPARE(many.status, 0);
    QVERIFY(many.out.contains("Amounts in EUR"));
    // One row of the table and one reading for each of the six tiers.
    QCOMPARE(QString::fromUtf8(many.out).count(QStringLiteral("Advertised from ")), 6);
    QCOMPARE(QString::fromUtf8(many.out).count(
                 QRegularExpression(QStringLiteral("^Quillmere (Quay|Mill)  "), QRegularExpression::MultilineOption)),
             6);
    QVERIFY(!many.out.contains("medcouple"));

    const Ran one =
        run({QStringLiteral("measure"), sample("quillmere-storage.rungs.json"), QStringLiteral("--tier"), QStringLiteral("Room 4 m²")});
    QVERIFY(one.out.contains("medcouple"));
    const QStringList lines = QString::fromUtf8(one.out).split(QLatin1Char('\n'));
    for (const QString& line : lines)
        QVERIFY2(!line.endsWith(QLatin1Char(' ')), qPrintable(line));
}

void TestHeadlessMeasure::scanPutsTheWorstFirst()
{
    QFETCH(QString, file);
    const Ran json =
        run({QStringLiteral("measure"), file, QStringLiteral("--json"), QStringLiteral("--model"), QStringLiteral("perceived")});
    const Ran scan = run({QStringLiteral("scan"), file, QStringLiteral("--model"), QStringLiteral("perceived")});
    QVERIFY2(scan.status == 0, scan.message);
    const QList<QStringList> rows = records(scan.out);
    const QJsonArray tiers = tiersOf(json);
    QCOMPARE(rows.size(), tiers.size() + 1);

    const QStringList header = rows.first();
    QCOMPARE(header.first(), QStringLiteral("site"));
    QVERIFY(header.contains(QStringLiteral("skew_moment")));
    QCOMPARE(header.last(), QStringLiteral("currency"));
    const auto cell = [&](const QStringList& row, const char* column) { return row.value(header.indexOf(QLatin1String(column))); };
    double before = INFINITY;
    for (const QStringList& row : rows.mid(1)) {
        QCOMPARE(row.size(), header.size());
        // The same figures as measure's, number for number.
        const auto tier = std::find_if(tiers.begin(), tiers.end(), [&](const QJsonValue& one) {
            return one[QStringLiteral("site")] == cell(row, "site") && one[QStringLiteral("tier")] == cell(row, "tier");
        });
        QVERIFY(tier != tiers.end());
        for (const Field& field : fields()) {
            const QJsonValue wanted = at(tier->toObject(), QString::fromLatin1(field.key));
            const QString found = cell(row, QByteArray(field.key).replace('.', '_').constData());
            QVERIFY2(wanted.isNull() ? found.isEmpty() : found.toDouble() == wanted.toDouble(), field.key);
        }
        const double share = cell(row, "gap_share").isEmpty() ? -INFINITY : cell(row, "gap_share").toDouble();
        QVERIFY(share <= before);
        before = share;
    }
}

void TestHeadlessMeasure::twoRunsGiveTheSameBytes()
{
    for (const char* name : {"edge-cases.rungs.json", "import-2400-units.csv"}) {
        for (const QStringList& arguments :
             {QStringList{QStringLiteral("measure"), sample(name), QStringLiteral("--json")},
              QStringList{QStringLiteral("measure"), sample(name)}, QStringList{QStringLiteral("scan"), sample(name)}}) {
            const Ran first = run(arguments);
            QVERIFY2(first.status == 0, first.message);
            QVERIFY(!first.out.isEmpty());
            QCOMPARE(run(arguments).out, first.out);
        }
    }
}

QTEST_GUILESS_MAIN(TestHeadlessMeasure)
#include "test_headless_measure.moc"
