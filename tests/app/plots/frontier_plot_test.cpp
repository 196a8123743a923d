// SPDX-License-Identifier: GPL-3.0-or-later
// The trade-off's plot: it draws the points it is given and reports what is pointed at and taken, in both looks and with awkward data.
#include "frontier_plot.h"
#include "plot_fixture.h"

#include <QSignalSpy>
#include <QTemporaryDir>

using namespace rungwright;

namespace
{

/// A falling curve with round numbers: gap 30.00 - i, change 0.10 i^2.
FrontierPicture inventedPicture(int points)
{
    FrontierPicture picture;
    picture.currency = Currency{"EUR", 2};
    picture.floor = Price{6900};
    picture.total = Price{500'000};
    picture.heading = QStringLiteral("Invented Quay · Room · trade-off");
    for (int i = 0; i < points; ++i)
        picture.curve.push_back({3000.0 - 100 * i, 10.0 * i * i, 0});
    picture.marks = {{QStringLiteral("current"), -1, 3000, 0}, {QStringLiteral("Lower the low end"), 0, 1500, 2200}};
    return picture;
}

struct Shown {
    explicit Shown(FrontierPicture picture, QSize size = {760, 520})
    {
        plot.resize(size);
        plot.show(std::move(picture));
        plot.show();
        OnBench::settle();
    }
    FrontierPlot plot{nullptr};
};

} // namespace

class FrontierPlotTest : public QObject
{
    Q_OBJECT
private slots:
    void init() { QTest::failOnWarning(QRegularExpression(QStringLiteral("^(?!This plugin does not support )."))); }

    void everythingLiesInTheArea()
    {
        Shown on(inventedPicture(20));
        const QRectF area = on.plot.area();
        for (int i = 0; i < 20; ++i) {
            QVERIFY(area.contains(on.plot.placeOf(i)));
            if (i > 0) { // to the right and down, as amounts grow and gaps fall
                QVERIFY(on.plot.placeOf(i).x() > on.plot.placeOf(i - 1).x());
                QVERIFY(on.plot.placeOf(i).y() > on.plot.placeOf(i - 1).y());
            }
        }
        QVERIFY(area.contains(on.plot.placeOfMark(0)));
        QVERIFY(area.contains(on.plot.placeOfMark(1)));
    }

    void aClickTakesThePointUnderIt()
    {
        Shown on(inventedPicture(20));
        QSignalSpy taken(&on.plot, &FrontierPlot::pointTaken);
        QSignalSpy chosen(&on.plot, &FrontierPlot::candidateChosen);
        const QPointF at = on.plot.placeOf(12);
        hoverTo(on.plot, at);
        QVERIFY(on.plot.accessibleDescription().startsWith(QStringLiteral("gap 18.00 (26\u00a0%), typical change 14.40 a unit")));
        press(on.plot, at);
        release(on.plot, at);
        QCOMPARE(taken.count(), 1);
        QCOMPARE(taken.first().first().toInt(), 12);
        press(on.plot, on.plot.placeOfMark(1));
        release(on.plot, on.plot.placeOfMark(1));
        QCOMPARE(chosen.count(), 1);
        QCOMPARE(chosen.first().first().toInt(), 0);
        // Slid off before the release: given up.
        press(on.plot, on.plot.placeOf(3));
        moveTo(on.plot, on.plot.placeOf(15));
        release(on.plot, on.plot.placeOf(15));
        QCOMPARE(taken.count(), 1);
    }

    void keysWalkAndTake()
    {
        Shown on(inventedPicture(20));
        QSignalSpy taken(&on.plot, &FrontierPlot::pointTaken);
        QSignalSpy chosen(&on.plot, &FrontierPlot::candidateChosen);
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QCOMPARE(taken.count(), 0); // nothing is pointed at yet
        QTest::keyClick(&on.plot, Qt::Key_Right);
        QTest::keyClick(&on.plot, Qt::Key_PageDown);
        QTest::keyClick(&on.plot, Qt::Key_Left);
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QCOMPARE(taken.last().first().toInt(), 4);
        QTest::keyClick(&on.plot, Qt::Key_End);
        QTest::keyClick(&on.plot, Qt::Key_Right);
        QTest::keyClick(&on.plot, Qt::Key_Enter);
        QCOMPARE(taken.last().first().toInt(), 19);
        QTest::keyClick(&on.plot, Qt::Key_Down);
        QTest::keyClick(&on.plot, Qt::Key_Down);
        QTest::keyClick(&on.plot, Qt::Key_Return);
        QCOMPARE(chosen.last().first().toInt(), 0);
    }

    void emptyAndAwkwardPicturesAreSaid()
    {
        FrontierPicture empty;
        empty.note = QStringLiteral("No advertised floor is known.");
        Shown on(empty, {320, 240});
        QVERIFY(on.plot.accessibleDescription().contains(empty.note));
        press(on.plot, on.plot.area().center());
        release(on.plot, on.plot.area().center());
        QTest::keyClick(&on.plot, Qt::Key_Right);
        // A single point, no change anywhere, below the floor, long and right-to-left names, no decimals.
        FrontierPicture one = inventedPicture(1);
        one.currency = Currency{"JPY", 0};
        one.curve.front() = {-250, 0, 0};
        one.marks = {{QString(200, QLatin1Char('W')), -1, -250, 0},
                     {QString::fromUtf8("\xd7\x9e\xd7\x97\xd7\x99\xd7\xa8"), 0, -250, 0},
                     {QStringLiteral("Same place"), 1, -250, 0}};
        on.plot.show(one);
        OnBench::settle();
        QVERIFY(on.plot.area().contains(on.plot.placeOf(0)));
        QVERIFY(!on.plot.grab().isNull());
        QVERIFY(on.plot.accessibleDescription().contains(QStringLiteral("Same place")));
    }

    void picturesAreWrittenInEveryForm()
    {
        Shown on(inventedPicture(50));
        QTemporaryDir folder;
        for (const char* suffix : {"png", "svg", "pdf"}) {
            const QString path = folder.filePath(QStringLiteral("trade-off.") + QLatin1String(suffix));
            const auto saved = on.plot.savePlot(path);
            QVERIFY2(saved.ok(), saved.ok() ? "" : saved.trouble().c_str());
            QVERIFY(QFileInfo(path).size() > 1000);
        }
    }
};

QTEST_MAIN(FrontierPlotTest)
#include "frontier_plot_test.moc"
