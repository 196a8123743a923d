// SPDX-License-Identifier: GPL-3.0-or-later
// Histories as lines of steps: nothing that would be seen is left out, and a sign-off can be chosen by hand and by key.
#include "history_plot.h"

#include <QSignalSpy>
#include <QtTest>

#include <cmath>
#include <map>
#include <random>

using namespace rungwright;

namespace
{

/// What the eye must see of a column: from where to where the line reaches there.
struct Reach {
    double low = 1e9;
    double high = -1e9;
    void take(double y)
    {
        low = std::min(low, y);
        high = std::max(high, y);
    }
};

HistoryPicture pictureOf(int count)
{
    HistoryPicture picture;
    picture.currency = {"EUR", 2};
    picture.title = QStringLiteral("asking price, EUR");
    HistorySeries floor{HistorySeries::Kind::floor, QStringLiteral("advertised floor"), {}};
    HistorySeries cheapest{HistorySeries::Kind::cheapest, QStringLiteral("expected cheapest"), {}};
    for (int i = 0; i < count; ++i) {
        const std::int64_t instant = 1'700'000'000'000 + std::int64_t{i} * 86'400'000;
        picture.marks.push_back({instant, 100 + i});
        floor.points.push_back({instant, 6'900});
        cheapest.points.push_back({instant, 8'000.0 + i % 7 * 100});
    }
    picture.series = {floor, cheapest};
    picture.until = 1'700'000'000'000 + std::int64_t{count} * 86'400'000;
    return picture;
}

} // namespace

class TestHistory : public QObject
{
    Q_OBJECT

private slots:
    void leavesNothingOutThatWouldBeSeen()
    {
        for (unsigned round = 0; round < 40; ++round) {
            std::mt19937 dice(round);
            const int count = 1 + static_cast<int>(dice() % 5000);
            const double width = 50 + static_cast<double>(dice() % 900);
            std::vector<HistoryPoint> points;
            std::int64_t instant = 0;
            for (int i = 0; i < count; ++i) {
                instant += static_cast<std::int64_t>(dice() % 1000);
                points.push_back({instant, dice() % 9 == 0 ? NAN : static_cast<double>(dice() % 500)});
            }
            const double end = static_cast<double>(instant) + 500;
            const auto xOf = [&](double at) { return at / end * width; };
            const auto yOf = [](double value) { return 600 - value; };
            const StepLine steps = stepLine(points, width, xOf, yOf);

            // Every value is met in its own column; so is nothing beyond the values there and the one it comes in with.
            std::map<int, Reach> wanted;
            std::map<int, Reach> most;
            double held = NAN;
            for (const HistoryPoint& point : points) {
                const int column = static_cast<int>(std::floor(xOf(static_cast<double>(point.instant))));
                if (!std::isnan(held))
                    most[column].take(yOf(held));
                if (!std::isnan(point.value)) {
                    wanted[column].take(yOf(point.value));
                    most[column].take(yOf(point.value));
                }
                held = point.value;
            }
            std::map<int, Reach> drawn;
            for (const QPointF& corner : steps.line)
                drawn[static_cast<int>(std::floor(corner.x()))].take(corner.y());
            for (const auto& [column, reach] : wanted) {
                QVERIFY(drawn.contains(column));
                QVERIFY(drawn[column].low <= reach.low && drawn[column].high >= reach.high);
            }
            for (const auto& [column, reach] : drawn) {
                if (!most.contains(column))
                    continue; // Where the last line ends.
                QVERIFY(reach.low >= most[column].low && reach.high <= most[column].high);
            }
            // However many there are, a few corners a column.
            QVERIFY(static_cast<double>(steps.line.size()) <= 4 * (width + 2));
            // A stretch never goes back in time, and each begins where the list says.
            for (std::size_t i = 0; i < steps.starts.size(); ++i) {
                const qsizetype to = i + 1 < steps.starts.size() ? steps.starts[i + 1] : steps.line.size();
                QVERIFY(steps.starts[i] < to);
                for (qsizetype j = steps.starts[i] + 1; j < to; ++j)
                    QVERIFY(steps.line[j].x() >= steps.line[j - 1].x());
            }
        }
    }

    void holdsUntilTheNext()
    {
        const std::vector<HistoryPoint> points{{0, 10}, {10, 20}, {20, NAN}, {30, 5}};
        const auto same = [](double value) { return value; };
        const StepLine steps = stepLine(points, 40, same, same);
        QCOMPARE(steps.starts, (std::vector<qsizetype>{0, 4}));
        const QPolygonF wanted{{{0, 10}, {10, 10}, {10, 20}, {20, 20}, {30, 5}, {40, 5}}};
        QCOMPARE(steps.line, wanted);
        QVERIFY(stepLine({}, 40, same, same).line.isEmpty());
    }

    void choosesByHandAndKey()
    {
        HistoryPlot plot;
        plot.resize(700, 240);
        plot.show();
        QVERIFY(QTest::qWaitForWindowExposed(&plot));
        plot.setPicture(pictureOf(20));
        plot.grab(); // Laid out.
        QSignalSpy chosen(&plot, &HistoryPlot::signOffChosen);
        const auto at = [&](int i) {
            return QPoint(static_cast<int>(std::lround(plot.xOf(plot.picture().marks[static_cast<std::size_t>(i)].instant))), 120);
        };
        QTest::mouseClick(&plot, Qt::LeftButton, {}, at(7) + QPoint(4, 0));
        QCOMPARE(chosen.count(), 1);
        QCOMPARE(chosen.takeFirst().at(0).toLongLong(), 107);
        plot.setFocus();
        const std::pair<Qt::Key, qint64> keys[] = {
            {Qt::Key_Right, 108}, {Qt::Key_Left, 107}, {Qt::Key_Home, 100}, {Qt::Key_End, 119}, {Qt::Key_Left, 118}};
        for (const auto& [key, id] : keys) {
            QTest::keyClick(&plot, key);
            QCOMPARE(chosen.takeFirst().at(0).toLongLong(), id);
            QVERIFY(plot.chosen() == id);
        }
        QTest::keyClick(&plot, Qt::Key_Home);
        chosen.clear();
        QTest::keyClick(&plot, Qt::Key_Left); // There is none before.
        QCOMPARE(chosen.count(), 0);
        plot.choose(105); // Told from outside: no signal back.
        QCOMPARE(chosen.count(), 0);
        QVERIFY(plot.accessibleDescription().contains(QStringLiteral("20 sign-offs")));
        QVERIFY(plot.accessibleDescription().contains(QStringLiteral("expected cheapest: 85.00")));
        plot.setPicture({});
        QVERIFY(!plot.chosen());
        QTest::keyClick(&plot, Qt::Key_Right);
        QTest::mouseClick(&plot, Qt::LeftButton, {}, QPoint(300, 100));
        QCOMPARE(chosen.count(), 0);
        plot.grab();
    }

    // On one pixel's width of paper the ink is where the values are.
    void drawsWhereTheValuesAre()
    {
        HistoryPlot plot;
        plot.resize(600, 240);
        HistoryPicture picture = pictureOf(3);
        picture.series = {picture.series[1]};
        plot.setPicture(picture);
        const QImage image = plot.grab().toImage();
        const double half = 0.5 * (plot.xOf(picture.marks[1].instant) + plot.xOf(picture.marks[2].instant));
        const double y = plot.yAxis->coordToPixel(8'100); // What the second one asks, until the third.
        QVERIFY(image.pixelColor(static_cast<int>(half), static_cast<int>(std::lround(y))) != plot.look().paper);
        const double elsewhere = plot.yAxis->coordToPixel(8'137);
        QCOMPARE(image.pixelColor(static_cast<int>(half), static_cast<int>(std::lround(elsewhere))), plot.look().paper);
    }

    void manySignOffs()
    {
        HistoryPlot plot;
        plot.resize(900, 300);
        plot.setPicture(pictureOf(10'000));
        plot.grab();
        for (const StepLine& steps : plot.lines())
            QVERIFY(steps.line.size() < 4 * 900);
    }
};

QTEST_MAIN(TestHistory)
#include "history_test.moc"
