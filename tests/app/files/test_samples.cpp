// SPDX-License-Identifier: GPL-3.0-or-later
// The sample scenarios: they open without a warning, save as the same bytes, are what their maker makes, and show what they promise.
#include "gap/measure.h"
#include "sample_files.h"
#include "scenario_json.h"
#include "unit_list.h"

#include <QDir>
#include <QFile>
#include <QRegularExpression>
#include <QtTest>

using namespace rungwright;

namespace
{

QByteArray bytesOf(const QString& name)
{
    QFile file(QStringLiteral(RUNGWRIGHT_SAMPLES "/") + name);
    return file.open(QIODevice::ReadOnly) ? file.readAll() : QByteArray();
}

Scenario sample(const QString& name)
{
    const auto read = scenarioFromJson(bytesOf(name + QStringLiteral(".rungs.json")), name);
    return read.ok() ? read.value() : Scenario{};
}

const QStringList kSamples{QStringLiteral("quillmere-storage"), QStringLiteral("kumonoura-berths"), QStringLiteral("rimalin-studios"),
                           QStringLiteral("edge-cases")};

} // namespace

class TestSamples : public QObject
{
    Q_OBJECT

private slots:
    void init() { QTest::failOnWarning(QRegularExpression(QStringLiteral(".?"))); }

    void areWhatTheirMakerMakes()
    {
        QStringList made{QStringLiteral("README.md")};
        for (const samples::SampleFile& file : samples::sampleFiles()) {
            made << file.name;
            QVERIFY2(bytesOf(file.name) == file.bytes, qPrintable(file.name));
        }
        made.sort();
        QCOMPARE(QDir(QStringLiteral(RUNGWRIGHT_SAMPLES)).entryList(QDir::Files, QDir::Name), made);
    }

    void openAndSaveTheSame_data() { each(); }

    void openAndSaveTheSame()
    {
        QFETCH(QString, name);
        const QByteArray bytes = bytesOf(name + QStringLiteral(".rungs.json"));
        const auto read = scenarioFromJson(bytes, name);
        QVERIFY2(read.ok(), read.ok() ? "" : read.trouble().c_str());
        QCOMPARE(scenarioToJson(read.value()), bytes);
        QVERIFY(read.value().title.find("(invented)") != std::string::npos);
        QVERIFY(QString::fromStdString(read.value().note).contains(QStringLiteral("invented")));
    }

    void unitListsHoldTheSameLadders_data() { each(); }

    void unitListsHoldTheSameLadders()
    {
        QFETCH(QString, name);
        const UnitListResult list = loadUnitList(QStringLiteral(RUNGWRIGHT_SAMPLES "/") + name + QStringLiteral(".csv"), {});
        QVERIFY2(list.clean(), qPrintable(list.fileTrouble));
        QVERIFY(list.unknownColumns.isEmpty());
        const Scenario scenario = sample(name);
        QCOMPARE(list.currency, scenario.currency);
        std::size_t at = 0;
        for (const TierCase& tierCase : scenario.tiers) {
            if (tierCase.tier.units.empty())
                continue; // A unit list cannot say that there is a tier without units.
            QVERIFY(list.tiers.at(at++).tier == tierCase.tier);
        }
        QCOMPARE(at, list.tiers.size());
    }

    void candidatesKeepTheRules_data() { each(); }

    void candidatesKeepTheRules()
    {
        QFETCH(QString, name);
        const Scenario scenario = sample(name);
        for (const TierCase& tierCase : scenario.tiers) {
            for (const Candidate& candidate : tierCase.candidates) {
                for (std::size_t i = 0; i < candidate.prices.size(); ++i) {
                    const Unit& unit = tierCase.tier.units[i];
                    const Price price = candidate.prices[i];
                    const Room room = roomOf(unit, scenario.rules);
                    QVERIFY2(price == unit.asking || (price >= room.lo && price <= room.hi && scenario.rules.points.allows(price)),
                             unit.name.c_str());
                }
            }
        }
    }

    void storageIsAsDescribed()
    {
        const Scenario scenario = sample(QStringLiteral("quillmere-storage"));
        QCOMPARE(scenario.tiers.size(), std::size_t(6));
        QCOMPARE(scenario.currency.code, std::string("EUR"));
        std::size_t units = 0;
        for (const TierCase& tierCase : scenario.tiers)
            units += tierCase.tier.units.size();
        QCOMPARE(units, std::size_t(240));
        const TierCase* matters = findTier(scenario, "Quillmere Quay", "Room 4 m²");
        QVERIFY(matters != nullptr);
        QCOMPARE(matters->tier.advertisedFloor.minor, std::int64_t(6900));
        QCOMPARE(count(matters->tier, &Unit::rentable), 38);
        QCOMPARE(count(matters->tier, &Unit::onOffer), 13);
        QCOMPARE(matters->candidates.size(), std::size_t(3));
        QVERIFY(count(findTier(scenario, "Quillmere Mill", "Room 3 m²")->tier, &Unit::onOffer) <= 3); // Nearly full.
    }

    // The tier to look at first is the one that matters, and the others show what the README says of them.
    void storageShowsWhatItPromises()
    {
        const Scenario scenario = sample(QStringLiteral("quillmere-storage"));
        const auto measure = [&scenario](const char* site, const char* tier, int candidate = -1) {
            const TierCase* tierCase = findTier(scenario, site, tier);
            return measured(tierCase->tier, pricesOf(*tierCase, candidate), tierCase->model, MeasureParts::figuresOnly);
        };
        const Measurement matters = measure("Quillmere Quay", "Room 4 m²");
        QCOMPARE(matters.figures.lowest->minor, std::int64_t(9000));
        QVERIFY(*matters.figures.skew.moment < -0.3); // Leans left, and not by a hair.
        for (const TierCase& tierCase : scenario.tiers) {
            const Measurement other = measure(tierCase.tier.site.c_str(), tierCase.tier.name.c_str());
            QVERIFY(*other.gap.gapShare <= *matters.gap.gapShare);
        }
        const Measurement gone = measure("Quillmere Quay", "Room 9 m²");
        QCOMPARE(gone.atFloor, std::size_t(0));
        QVERIFY(*measure("Quillmere Quay", "Locker 1.5 m²").figures.skew.moment > 0.3); // Leans right.
        QVERIFY(measure("Quillmere Mill", "Room 6 m²").figures.inversions > 5);
        QCOMPARE(matters.figures.inversions, std::size_t(0));
        for (int candidate = 0; candidate < 3; ++candidate)
            QVERIFY(*measure("Quillmere Quay", "Room 4 m²", candidate).gap.gap < *matters.gap.gap);
    }

    void berthsAndStudios()
    {
        QCOMPARE(sample(QStringLiteral("kumonoura-berths")).currency, (Currency{"JPY", 0}));
        QCOMPARE(sample(QStringLiteral("rimalin-studios")).currency, (Currency{"KWD", 3}));
    }

    void longListHas2400Units()
    {
        const UnitListResult list = loadUnitList(QStringLiteral(RUNGWRIGHT_SAMPLES "/import-2400-units.csv"), {});
        QVERIFY2(list.clean(), qPrintable(list.fileTrouble));
        QCOMPARE(list.rowsTaken, qint64(2400));
        QCOMPARE(list.tiers.size(), std::size_t(48));
    }

    void refusedListHasEightRefusals()
    {
        const QString path = QStringLiteral(RUNGWRIGHT_SAMPLES "/with-refused-rows.csv");
        const UnitListResult list = loadUnitList(path, {});
        QCOMPARE(list.fileTrouble, QString());
        QCOMPARE(list.refusedCount, qint64(8));
        std::vector<qint64> lines;
        QSet<QString> reasons;
        for (const RefusedRow& row : list.refused) {
            lines.push_back(row.line);
            reasons.insert(row.wrong);
        }
        QCOMPARE(lines, (std::vector<qint64>{3, 5, 6, 7, 8, 9, 10, 11}));
        QCOMPARE(reasons.size(), qsizetype(8));
        QVERIFY(list.tiers.empty());
        const UnitListResult without = loadUnitList(path, {{}, true});
        QCOMPARE(without.rowsTaken, qint64(6));
        QCOMPARE(without.tiers.size(), std::size_t(2));
    }

private:
    static void each()
    {
        QTest::addColumn<QString>("name");
        for (const QString& name : kSamples)
            QTest::newRow(qPrintable(name)) << name;
    }

    static int count(const Tier& tier, bool (Unit::*is)() const)
    {
        return int(std::count_if(tier.units.begin(), tier.units.end(), [is](const Unit& unit) { return (unit.*is)(); }));
    }
};

QTEST_GUILESS_MAIN(TestSamples)
#include "test_samples.moc"
