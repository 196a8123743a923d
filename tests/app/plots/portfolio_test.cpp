// SPDX-License-Identifier: GPL-3.0-or-later
// The portfolio picture: what it shows and counts, by mouse and keys, at few and at many tiers.
#include "app/session/invented_portfolio.h"
#include "plot_fixture.h"
#include "portfolio_plot.h"

#include <QSignalSpy>
#include <QTemporaryDir>
#include <QToolTip>

#include <set>

using namespace rungwright;

namespace
{

struct Shown {
    explicit Shown(Scenario scenario)
    {
        document.begin(std::move(scenario), {}, true);
        plot.resize(760, 560);
        plot.setSources(&list, &bench);
        plot.show();
        if (!QTest::qWaitFor([this] { return !list.measuring(); }, 20'000))
            qFatal("the tiers were not measured");
        OnBench::settle();
    }
    int index(int tier)
    {
        const auto& points = plot.points().points;
        const auto at = std::find_if(points.begin(), points.end(), [tier](const PortfolioPoint& p) { return p.tier == tier; });
        return at == points.end() ? -1 : static_cast<int>(at - points.begin());
    }
    /// A tier that stands alone enough to be pointed at.
    int lonely()
    {
        const auto& places = plot.shape().places();
        for (std::size_t i = 0; i < places.size(); ++i) {
            const bool alone = std::none_of(places.begin(), places.end(),
                                            [&](const QPointF& p) { return p != places[i] && (p - places[i]).manhattanLength() < 12; });
            if (alone && !plot.shape().atEdge(static_cast<int>(i)))
                return plot.points().points[i].tier;
        }
        return -1;
    }

    Document document;
    Worklist list{document};
    Workbench bench{document};
    PortfolioPlot plot;
};

} // namespace

class PortfolioTest : public QObject
{
    Q_OBJECT
private slots:
    // All warnings but the offscreen platform's own.
    void init() { QTest::failOnWarning(QRegularExpression(QStringLiteral("^(?!This plugin does not support )."))); }

    void everyTierIsShownOrCounted()
    {
        Shown on(inventedPortfolio(300));
        const PortfolioPoints& all = on.plot.points();
        PortfolioLeftOut wanted;
        std::set<int> drawn;
        for (const PortfolioPoint& p : all.points)
            drawn.insert(p.tier);
        for (int i = 0; i < on.list.count(); ++i) {
            const Tier& tier = on.list.tierCase(i).tier;
            std::set<std::int64_t> prices;
            int offered = 0;
            for (const Unit& unit : tier.units) {
                if (unit.onOffer()) {
                    prices.insert(unit.asking.minor);
                    ++offered;
                }
            }
            const bool fits = prices.size() > 1 && tier.hasFloor();
            QCOMPARE(drawn.contains(i), fits);
            if (offered == 0)
                ++wanted.noneOnOffer;
            else if (!tier.hasFloor())
                ++wanted.noFloor;
            else if (!fits)
                ++wanted.noLean;
        }
        QVERIFY(wanted.noneOnOffer > 0 && wanted.noFloor > 0 && wanted.noLean > 0);
        QCOMPARE(all.leftOut.noneOnOffer, wanted.noneOnOffer);
        QCOMPARE(all.leftOut.noFloor, wanted.noFloor);
        QCOMPARE(all.leftOut.noLean, wanted.noLean);
        QCOMPARE(all.leftOut.total() + static_cast<int>(all.points.size()), on.list.count());
        for (const int n : {wanted.noneOnOffer, wanted.noFloor, wanted.noLean, wanted.noneOnOffer + wanted.noFloor + wanted.noLean})
            QVERIFY(on.plot.leftOutText().contains(QString::number(n)));
        QVERIFY(on.plot.accessibleDescription().contains(on.plot.leftOutText()));
    }

    void pointsLieWhereTheirFiguresSay()
    {
        Shown on(inventedPortfolio(120));
        const auto& points = on.plot.points().points;
        for (const PortfolioPoint& a : points) {
            QCOMPARE(a.lean, *on.list.row(a.tier).lean);
            QCOMPARE(a.share, *on.list.row(a.tier).share);
            const QPointF at = on.plot.placeOf(a.tier);
            QVERIFY(std::abs(at.x() - on.plot.xAxis->coordToPixel(a.lean)) < 1.0);
            QVERIFY(std::abs(at.y() - on.plot.yAxis->coordToPixel(a.share)) < 1.0);
            QVERIFY(on.plot.area().adjusted(-1, -1, 1, 1).contains(at));
        }
        QVERIFY(on.plot.placeOf(-1).isNull());
        QVERIFY(on.plot.placeOf(22).isNull()); // nothing on offer
    }

    void aClickChoosesTheTierPointedAt()
    {
        Shown on(inventedPortfolio(60));
        const int tier = on.lonely();
        QVERIFY(tier >= 0);
        QSignalSpy chosen(&on.plot, &PortfolioPlot::tierChosen);
        const QPointF at = on.plot.placeOf(tier);
        hoverTo(on.plot, at + QPointF(2, 1));
        QVERIFY(QToolTip::text().contains(QString::fromStdString(on.list.tierCase(tier).tier.name)));
        press(on.plot, at);
        release(on.plot, at);
        QCOMPARE(chosen.count(), 1);
        QCOMPARE(chosen.first().first().toInt(), tier);
        QCOMPARE(on.list.pickedCount(), 0);
    }

    void aBoxPicksWhatLiesInIt()
    {
        Shown on(inventedPortfolio(160));
        const QRectF area = on.plot.area();
        const QPointF from = area.topLeft() + QPointF(1, 1);
        const QPointF to = area.center() + QPointF(0.5, 0.5);
        std::set<int> wanted;
        for (const PortfolioPoint& p : on.plot.points().points) {
            if (QRectF(from, to).contains(on.plot.placeOf(p.tier)))
                wanted.insert(p.tier);
        }
        QVERIFY(wanted.size() > 3 && wanted.size() < on.plot.points().points.size());
        press(on.plot, from);
        moveTo(on.plot, (from + to) / 2);
        moveTo(on.plot, to);
        release(on.plot, to);
        QCOMPARE(static_cast<std::size_t>(on.list.pickedCount()), wanted.size());
        for (int i = 0; i < on.list.count(); ++i)
            QCOMPARE(on.list.isPicked(i), wanted.contains(i));
        QVERIFY(on.plot.accessibleDescription().contains(QStringLiteral("picked")));
        OnBench::settle();
        QTest::keyClick(&on.plot, Qt::Key_Escape);
        QCOMPARE(on.list.pickedCount(), 0);
        // A box given up by Esc picks nothing.
        press(on.plot, from);
        moveTo(on.plot, to);
        QTest::keyClick(&on.plot, Qt::Key_Escape);
        release(on.plot, to);
        QCOMPARE(on.list.pickedCount(), 0);
    }

    void keysWalkAndChoose()
    {
        Shown on(inventedPortfolio(80));
        QSignalSpy chosen(&on.plot, &PortfolioPlot::tierChosen);
        std::vector<PortfolioPoint> byShare = on.plot.points().points;
        std::stable_sort(byShare.begin(), byShare.end(), [](auto& a, auto& b) { return a.share > b.share; });
        QTest::keyClick(&on.plot, Qt::Key_Home);
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QTest::keyClick(&on.plot, Qt::Key_Down);
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QTest::keyClick(&on.plot, Qt::Key_Up);
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QCOMPARE(chosen.count(), 3);
        QCOMPARE(chosen.at(0).first().toInt(), byShare[0].tier);
        QCOMPARE(chosen.at(1).first().toInt(), byShare[1].tier);
        QCOMPARE(chosen.at(2).first().toInt(), byShare[0].tier);
        QVERIFY(on.plot.accessibleDescription().startsWith(QChar(0x2068)) ||
                on.plot.accessibleDescription().contains(QString::fromStdString(on.list.tierCase(byShare[0].tier).tier.name)));
    }

    void keysPick()
    {
        Shown on(inventedPortfolio(80));
        std::vector<PortfolioPoint> byShare = on.plot.points().points;
        std::stable_sort(byShare.begin(), byShare.end(), [](auto& a, auto& b) { return a.share > b.share; });
        QTest::keyClick(&on.plot, Qt::Key_Space); // nowhere yet
        QCOMPARE(on.list.pickedCount(), 0);
        QTest::keyClick(&on.plot, Qt::Key_Home);
        QTest::keyClick(&on.plot, Qt::Key_Space);
        QCOMPARE(on.list.pickedCount(), 1);
        QVERIFY(on.list.isPicked(byShare[0].tier));
        QVERIFY(on.plot.accessibleDescription().contains(QStringLiteral("\npicked\n")));
        QTest::keyClick(&on.plot, Qt::Key_Down);
        QTest::keyClick(&on.plot, Qt::Key_Down, Qt::ShiftModifier); // from the second to the third
        QCOMPARE(on.list.pickedCount(), 3);
        QVERIFY(on.list.isPicked(byShare[1].tier) && on.list.isPicked(byShare[2].tier));
        QTest::keyClick(&on.plot, Qt::Key_Space);
        QCOMPARE(on.list.pickedCount(), 2);
        QVERIFY(!on.list.isPicked(byShare[2].tier));
        QTest::keyClick(&on.plot, Qt::Key_Escape);
        QCOMPARE(on.list.pickedCount(), 0);
    }

    void theCursorStaysAndTheHeadingFollows()
    {
        Shown on(inventedPortfolio(80));
        QSignalSpy chosen(&on.plot, &PortfolioPlot::tierChosen);
        QTest::keyClick(&on.plot, Qt::Key_Home);
        QTest::keyClick(&on.plot, Qt::Key_Down);
        QTest::keyClick(&on.plot, Qt::Key_Down);
        QTest::keyClick(&on.plot, Qt::Key_Return);
        on.document.setFlagThresholds({-1.0, 3, 0.25});
        on.document.setFloor(on.plot.points().points.front().tier, Price{}); // one point fewer before it
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QCOMPARE(chosen.count(), 2);
        QCOMPARE(chosen.at(1), chosen.at(0));
        QVERIFY(chosen.at(0).first().toInt() != on.plot.points().points.front().tier);
        QTemporaryDir folder;
        QVERIFY(on.document.saveTo(folder.filePath(QStringLiteral("another-name.rungs.json"))).ok());
        QVERIFY(on.plot.pictureHeading().contains(on.document.displayName()));
        QVERIFY(on.plot.pictureHeading().contains(QStringLiteral("another-name")));
        on.document.begin(inventedPortfolio(80), {}, true); // other tiers: from the start
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QCOMPARE(chosen.count(), 2);
    }

    void densityCountsEveryPointOnce()
    {
        Shown on(inventedPortfolio(4000, 10));
        QVERIFY(on.plot.dense());
        const PortfolioShape& shape = on.plot.shape();
        std::size_t sum = 0;
        for (int row = 0; row < shape.rows(); ++row) {
            for (int column = 0; column < shape.columns(); ++column)
                sum += shape.count(column, row);
        }
        QCOMPARE(sum, on.plot.points().points.size());
        // The grid finds what a look at every point finds.
        for (int step = 0; step < 200; ++step) {
            const QRectF area = on.plot.area();
            const QPointF at(area.left() + std::fmod(step * 37.3, area.width()), area.top() + std::fmod(step * 91.7, area.height()));
            double best = 9 * 9;
            for (const QPointF& p : shape.places())
                best = std::min(best, QPointF::dotProduct(p - at, p - at));
            const int found = shape.nearest(at, 9);
            QCOMPARE(found >= 0, best < 81);
            if (found >= 0) {
                const QPointF d = shape.places()[static_cast<std::size_t>(found)] - at;
                QCOMPARE(QPointF::dotProduct(d, d), best);
            }
        }
    }

    void outliersAreMarkedAtTheEdge()
    {
        std::vector<double> values;
        for (int i = 0; i < 1000; ++i)
            values.push_back(0.001 * i);
        const ShownRange near = robustRange(values, {0.0});
        QVERIFY(near.lower <= 0 && near.upper >= 0.999); // nothing lies far off: all is shown
        values.push_back(1000);
        const ShownRange range = robustRange(values, {0.0, -2.0});
        QVERIFY(range.upper < 2 && range.lower <= -2);
        PortfolioShape shape;
        shape.place({{0, 0.5, 0.1, 3, false, false}, {1, 1000, 0.2, 3, false, true}}, QRectF(10, 10, 100, 100), range, {0, 1});
        QCOMPARE(shape.beyondRight(), 1);
        QCOMPARE(shape.beyondLeft() + shape.beyondTop() + shape.beyondBottom(), 0);
        QVERIFY(shape.atEdge(1) && !shape.atEdge(0));
        QCOMPARE(shape.places()[1].x(), 110.0);
        // Few values: each of them.
        QVERIFY(robustRange({0, 1, 1000}, {0.0}).upper >= 1000);
        QVERIFY(robustRange({}, {0.0}).upper > robustRange({}, {0.0}).lower);
    }

    void thresholdsAndPicturesFollow()
    {
        Shown on(inventedPortfolio(90));
        const QImage before = on.plot.grab().toImage();
        on.document.setFlagThresholds({-1.0, 3, 0.25});
        OnBench::settle();
        QVERIFY(on.plot.grab().toImage() != before);
        on.bench.showTier(on.lonely());
        OnBench::settle();
        QTemporaryDir folder;
        for (const char* name : {"p.png", "p.svg", "p.pdf"}) {
            const QString path = folder.filePath(QString::fromLatin1(name));
            QVERIFY(on.plot.savePlot(path).ok());
            QVERIFY(QFileInfo(path).size() > 5000);
        }
        // The picture does not move what is on the screen.
        OnBench::settle();
        const int tier = on.lonely();
        QVERIFY(std::abs(on.plot.placeOf(tier).x() - on.plot.xAxis->coordToPixel(*on.list.row(tier).lean)) < 1.0);
        on.document.begin(Scenario{}, {}, true);
        OnBench::settle();
        QVERIFY(on.plot.points().points.empty());
        QTest::keyClick(&on.plot, Qt::Key_Home); // harmless
    }
};

QTEST_MAIN(PortfolioTest)
#include "portfolio_test.moc"
