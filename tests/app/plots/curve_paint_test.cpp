// SPDX-License-Identifier: GPL-3.0-or-later
// Curves with fewer points, fills by rectangles, and the curtain's area as a shape.
#include "curtain_shape.h"
#include "curve_paint.h"
#include "invented_tiers.h"

#include <QPainter>
#include <QTest>

#include <cmath>
#include <random>

using namespace rungwright;

class CurvePaintTest : public QObject
{
    Q_OBJECT

private:
    static double heightAt(const QPolygonF& line, double x)
    {
        for (qsizetype i = 1; i < line.size(); ++i) {
            if (x <= line[i].x()) {
                const double dx = line[i].x() - line[i - 1].x();
                return dx > 0 ? line[i - 1].y() + (x - line[i - 1].x()) / dx * (line[i].y() - line[i - 1].y()) : line[i].y();
            }
        }
        return line.back().y();
    }

private slots:
    void fewerPointsMissNone()
    {
        std::mt19937 random(7);
        std::normal_distribution<double> jitter(0, 1);
        for (int round = 0; round < 200; ++round) {
            QPolygonF all;
            QPolygonF kept;
            CurveBuilder curve(kept);
            double y = 100;
            for (int i = 0; i < 300; ++i) {
                y += round % 3 == 0 ? -200.0 / ((i + 1) * (i + 1)) : (round % 3 == 1 ? 0.02 * jitter(random) : 3 * jitter(random));
                const QPointF point(10 + 1.7 * i, y);
                all << point;
                if (i == 0)
                    curve.begin(point);
                else
                    curve.add(point);
            }
            QCOMPARE(kept.front(), all.front());
            QCOMPARE(kept.back(), all.back());
            for (const QPointF& point : all) {
                // An eighth of a pixel, the builder's promise, and rounding.
                QVERIFY2(std::abs(heightAt(kept, point.x()) - point.y()) <= 0.125 + 1e-9,
                         qPrintable(QString::number(heightAt(kept, point.x()) - point.y())));
            }
            if (round % 3 == 0)
                QVERIFY(kept.size() < 60); // A hyperbola's flat tail is a few lines.
        }
    }

    void theFillCoversTheAreaUnderTheCurve()
    {
        QPolygonF line;
        for (int i = 0; i <= 200; ++i)
            line << QPointF(20.25 + 3.1 * i, 40 + 300.0 / (i + 2));
        std::vector<QRectF> rects;
        appendFill(line.constData(), line.size(), 250, rects);
        double filled = 0;
        double right = line.front().x();
        for (const QRectF& rect : rects) {
            QVERIFY(std::abs(rect.left() - right) < 1e-9); // Side by side, no overlap and no crack.
            right = rect.right();
            filled += rect.width() * rect.height();
        }
        QVERIFY(std::abs(right - line.back().x()) < 1e-9);
        double exact = 0;
        for (qsizetype i = 1; i < line.size(); ++i)
            exact += (line[i].x() - line[i - 1].x()) * (250 - 0.5 * (line[i].y() + line[i - 1].y()));
        // Heights are rounded to whole pixels: half a pixel a column at most, and far less on average.
        QVERIFY2(std::abs(filled - exact) < 0.5 * (line.back().x() - line.front().x()), qPrintable(QString::number(filled - exact)));
    }

    void theCurtainsAreaIsTheGap_data()
    {
        QTest::addColumn<int>("model");
        QTest::addColumn<qint64>("floor");
        for (const ModelKind model : kModels)
            QTest::addRow("model %d", static_cast<int>(model)) << static_cast<int>(model) << qint64{6900};
        QTest::newRow("units below the floor") << static_cast<int>(ModelKind::remainder) << qint64{9500};
        QTest::newRow("floor above all") << static_cast<int>(ModelKind::perceived) << qint64{20000};
    }
    void theCurtainsAreaIsTheGap()
    {
        // What the plot claims: area above the floor under the curve, less what is missing below it, is the gap (method of survival
        // functions: E[X] - s). Taken from the painted pixels, against core's figure.
        QFETCH(int, model);
        QFETCH(qint64, floor);
        Tier tier = invented::leaningTier(40, Price{6900}, 6100);
        tier.advertisedFloor = Price{floor};
        ModelSettings settings;
        settings.kind = static_cast<ModelKind>(model);
        const Measurement m = measured(tier, askingPrices(tier.units), settings);
        QVERIFY(m.gap.gap);
        const CurtainFrame frame{QRectF(0, 0, 400, 1600), 6000, 22000};
        CurtainShape shape;
        shape.build(m, frame);
        // Without hatching, which would count for less than the area it stands for.
        Look flat = Look::light();
        flat.paper = Qt::white;
        flat.gapFill = Qt::black;
        flat.gapHatch = Qt::black;
        QImage image(400, 1600, QImage::Format_RGB32);
        image.fill(Qt::white);
        QPainter painter(&image);
        shape.paintArea(painter, flat);
        painter.end();
        const double floorY = frame.y(static_cast<double>(floor));
        double above = 0;
        for (int y = 0; y < std::lround(floorY); ++y) {
            for (int x = 0; x < image.width(); ++x)
                above += image.pixelColor(x, y).lightness() < 128;
        }
        const double money = (frame.high - frame.low) / frame.area.height() / frame.area.width(); // Minor units a pixel of area.
        double below = 0;
        if (m.ladder.front().price < tier.advertisedFloor) {
            // The missing part is hatched only; its area comes from the curve's definition instead of from pixels.
            double from = frame.low;
            double chance = m.curtain.front().chance;
            for (const CurtainStep& step : m.curtain) {
                chance = step.chance;
                below += (1 - chance) * std::max(0.0, std::min(step.price, static_cast<double>(floor)) - from);
                from = std::max(from, std::min(step.price, static_cast<double>(floor)));
            }
            below += std::max(0.0, static_cast<double>(floor) - from);
            QVERIFY(shape.reachesBelowFloor());
        }
        // A row of pixels is 10 minor units high and a step's width is rounded by half a pixel of 400: one row and half a percent of the
        // width in money.
        const double tolerance = 10.0 + 0.005 * (frame.high - frame.low) / 2;
        const double shown = above * money - below;
        QVERIFY2(std::abs(shown - *m.gap.gap) <= tolerance, qPrintable(QStringLiteral("%1 %2").arg(shown).arg(*m.gap.gap)));
    }
};

QTEST_MAIN(CurvePaintTest)
#include "curve_paint_test.moc"
