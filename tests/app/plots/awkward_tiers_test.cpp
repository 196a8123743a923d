// SPDX-License-Identifier: GPL-3.0-or-later
// Tiers that people forget: each is drawn, small and large, without a complaint and with its labels inside.
#include "plot_fixture.h"
#include "side_by_side_plot.h"

using namespace rungwright;

class AwkwardTiersTest : public QObject
{
    Q_OBJECT

private:
    static Tier base(int count = 24) { return invented::leaningTier(count, Price{6900}, 6100); }

private slots:
    void drawn_data()
    {
        QTest::addColumn<int>("which");
        QTest::newRow("none on offer") << 0;
        QTest::newRow("one unit") << 1;
        QTest::newRow("all prices equal") << 2;
        QTest::newRow("floor above all") << 3;
        QTest::newRow("prices of seven digits and no decimals") << 4;
        QTest::newRow("three decimals") << 5;
        QTest::newRow("right-to-left and long names") << 6;
        QTest::newRow("all closed") << 7;
        QTest::newRow("all on offer") << 8;
        QTest::newRow("equal to the floor") << 9;
        QTest::newRow("a thousand units") << 10;
        QTest::newRow("two units") << 11;
        QTest::newRow("everything locked") << 12;
        QTest::newRow("some below the floor") << 13;
        QTest::newRow("the dearest price there is") << 14;
    }

    void drawn()
    {
        QFETCH(int, which);
        Tier tier = base(which == 10 ? 1000 : 24);
        Currency currency{"EUR", 2};
        Price step{50};
        const auto all = [&tier](auto change) { std::for_each(tier.units.begin(), tier.units.end(), change); };
        switch (which) {
        case 0:
            all([](Unit& u) { u.status = u.onOffer() ? Status::occupied : u.status; });
            break;
        case 1:
            tier.units.resize(1);
            tier.units[0].status = Status::vacant;
            break;
        case 2:
            all([](Unit& u) { u.asking = Price{7500}; });
            break;
        case 3:
            tier.advertisedFloor = Price{20000};
            break;
        case 4:
            tier = invented::leaningTier(24, Price{1234500}, 5555000, 500);
            currency = {"JPY", 0};
            step = Price{500};
            break;
        case 5:
            tier = invented::leaningTier(24, Price{69000}, 61000, 250);
            currency = {"KWD", 3};
            step = Price{250};
            break;
        case 6:
            tier.site = "מחסנים ליד הנמל";
            tier.name = "غرفة تخزين كبيرة";
            all([](Unit& u) { u.name = "وحدة " + u.name + std::string(300, 'x'); });
            break;
        case 7:
            all([](Unit& u) { u.status = Status::closed; });
            break;
        case 8:
            all([](Unit& u) { u.status = Status::vacant; });
            break;
        case 9:
            all([&tier](Unit& u) { u.asking = tier.advertisedFloor; });
            break;
        case 11:
            tier.units.resize(2);
            break;
        case 12:
            all([](Unit& u) { u.locked = true; });
            break;
        case 13:
            tier.advertisedFloor = Price{9500};
            break;
        case 14:
            all([](Unit& u) { u.asking = kGreatestPrice - Price{u.asking.minor}; });
            break;
        default:
            break;
        }
        Complaints complaints;
        for (const ModelKind model : kModels) {
            Scenario scenario = invented::scenarioOf(tier, currency, step);
            scenario.tiers.front().model.kind = model;
            invented::addLowered(scenario, "النهاية المنخفضة with a name that goes on and on and on");
            for (const int candidate : {-1, 0}) {
                OnBench on(scenario, candidate, QSize(700, 430));
                const BandLayout& band = on.ladder().bandLayout();
                for (std::size_t i = 0; i < band.labels.size(); ++i) {
                    QVERIFY(on.ladder().area().contains(band.labels[i].rect));
                    for (std::size_t j = 0; j < i; ++j)
                        QVERIFY(!band.labels[i].rect.intersects(band.labels[j].rect));
                }
                QVERIFY(!on.plots.grab().isNull());
                if (!on.plots.curtain()->areaLabel().isNull())
                    QVERIFY(on.plots.curtain()->area().contains(on.plots.curtain()->areaLabel()));
                on.bench.select({0});
                QTest::keyClick(&on.ladder(), Qt::Key_Up);
                on.plots.resize(1500, 900);
                OnBench::settle();
                on.plots.grab();
                QVERIFY(!on.ladder().accessibleDescription().isEmpty());
            }
        }
        SideBySidePlot sides;
        std::vector<SideLadder> ladders;
        for (const char* name : {"current", "غرفة", "one more"}) {
            SideLadder ladder;
            ladder.name = QString::fromUtf8(name);
            ladder.prices = askingPrices(tier.units);
            ladder.measurement = measured(tier, ladder.prices, ModelSettings{});
            ladders.push_back(ladder);
        }
        sides.resize(700, 400);
        sides.setLadders(tier, currency, ladders);
        sides.show();
        OnBench::settle();
        sides.grab();
        sides.setArrangement(SideBySidePlot::Arrangement::overlay);
        OnBench::settle();
        sides.grab();
        QCOMPARE(complaints.heard(), QStringList());
    }

    void noTierAtAll()
    {
        Complaints complaints;
        Document document;
        Workbench bench(document);
        BenchPlots plots;
        plots.setWorkbench(&bench);
        plots.resize(700, 430);
        plots.show();
        OnBench::settle();
        plots.grab();
        QTest::keyClick(plots.ladder(), Qt::Key_Up);
        press(*plots.ladder(), QPointF(100, 100));
        release(*plots.ladder(), QPointF(100, 100));
        document.begin(invented::scenarioOf(base()), {}, true);
        OnBench::settle();
        QCOMPARE(bench.tier(), 0);
        QVERIFY(!plots.ladder()->bandLayout().labels.empty());
        document.begin(Scenario{}, {}, true);
        OnBench::settle();
        QVERIFY(plots.ladder()->bandLayout().labels.empty());
        plots.setWorkbench(nullptr);
        plots.grab();
        QCOMPARE(complaints.heard(), QStringList());
    }

    void priceAxesLineUp()
    {
        for (const QSize size : {QSize(600, 380), QSize(700, 430), QSize(860, 600), QSize(1920, 1080)}) {
            OnBench on(invented::scenarioOf(base()), -1, size);
            const CurtainPlot& curtain = *on.plots.curtain();
            QCOMPARE(on.ladder().mapTo(&on.plots, on.ladder().area().toRect().topLeft()).y(),
                     curtain.mapTo(&on.plots, curtain.area().toRect().topLeft()).y());
            QCOMPARE(on.ladder().area().height(), curtain.area().height());
            QVERIFY(on.ladder().yAxis->range() == curtain.yAxis->range());
            QCOMPARE(on.ladder().area().left(), on.thinning().area().left());
            QCOMPARE(on.plots.curtain()->geometry().left() + curtain.area().right(), on.thinning().area().right());
        }
    }
};

QTEST_MAIN(AwkwardTiersTest)
#include "awkward_tiers_test.moc"
