// SPDX-License-Identifier: GPL-3.0-or-later
// Labels never cover each other and never leave the plot, whatever the gap looks like.
#include "label_layout.h"

#include <QTest>

#include <cmath>
#include <limits>
#include <random>

using namespace rungwright;

class LabelLayoutTest : public QObject
{
    Q_OBJECT

private slots:
    void labelsStayApartAndInside()
    {
        std::mt19937 random(20260117);
        const auto between = [&random](double low, double high) { return std::uniform_real_distribution<double>(low, high)(random); };
        const QFont font;
        QFont bold = font;
        bold.setBold(true);
        const QFontMetricsF plain(font);
        const QFontMetricsF strong(bold);
        int withGap = 0;
        int withParts = 0;
        for (int round = 0; round < 3000; ++round) {
            const QRectF area(between(30, 90), between(20, 60), between(260, 1400), between(90, 900));
            std::vector<QPointF> rungs;
            const int count = static_cast<int>(between(0, 60));
            for (int i = 0; i < count; ++i)
                rungs.emplace_back(area.left() + (i + 0.5) * area.width() / count, between(area.top(), area.bottom()));
            BandInput in;
            in.floorY = between(area.top() - 40, area.bottom() + 40);
            in.expectedY = round % 9 == 0 ? std::numeric_limits<double>::quiet_NaN() : between(area.top() - 40, area.bottom() + 40);
            in.claimY = round % 3 == 0 ? std::numeric_limits<double>::quiet_NaN() : between(in.expectedY, in.floorY);
            in.expectedText = QStringLiteral("expected cheapest 1,234,567.00");
            in.floorText = QStringLiteral("advertised floor 69.00");
            in.gapText = QStringLiteral("gap 29.19 (42 %)");
            in.claimText = QStringLiteral("floor not on sale 21.00");
            in.shapeText = QStringLiteral("thin low end 8.19");
            LabelRoom room(area, rungs, 5);
            BandLayout out;
            layOutBand(in, plain, strong, room, out);
            const QRectF box =
                placeBeside(QPointF(between(area.left(), area.right()), between(area.top(), area.bottom())), {170, 44}, 14, room);
            std::vector<QRectF> rects;
            for (const PlacedLabel& label : out.labels) {
                rects.push_back(label.rect);
                withGap += label.text == in.gapText;
                withParts += label.text == in.claimText;
                QVERIFY(label.rect.width() >= strong.horizontalAdvance(label.text) || !label.strong);
                QVERIFY(label.rect.width() >= plain.horizontalAdvance(label.text));
            }
            if (!box.isEmpty())
                rects.push_back(box);
            for (std::size_t i = 0; i < rects.size(); ++i) {
                QVERIFY(area.contains(rects[i]));
                for (std::size_t j = 0; j < i; ++j)
                    QVERIFY(!rects[i].intersects(rects[j]));
            }
            if (!out.band.isNull())
                QVERIFY(area.adjusted(-1e-9, -1e-9, 1e-9, 1e-9).contains(out.band)); // Corners are sums, exact to rounding.
            if (!out.hatched.isNull())
                QVERIFY(out.band.adjusted(-1e-9, -1e-9, 1e-9, 1e-9).contains(out.hatched));
        }
        QVERIFY(withGap > 500); // The test saw what it is about.
        QVERIFY(withParts > 100);
    }

    void aThinBandCarriesItsGapBesideTheExpectedCheapest()
    {
        const QFont font;
        const QFontMetricsF metrics(font);
        const QRectF area(50, 20, 600, 300);
        LabelRoom room(area, {}, 5);
        BandInput in;
        in.floorY = 250;
        in.expectedY = 246;
        in.claimY = std::numeric_limits<double>::quiet_NaN();
        in.expectedText = QStringLiteral("expected cheapest 70.00");
        in.floorText = QStringLiteral("advertised floor 69.00");
        in.gapText = QStringLiteral("gap 1.00 (1.4 %)");
        BandLayout out;
        layOutBand(in, metrics, metrics, room, out);
        QCOMPARE(out.labels.size(), std::size_t{2});
        QVERIFY(out.labels[0].text.contains(in.expectedText) && out.labels[0].text.contains(in.gapText));
        QVERIFY(out.labels[0].rect.bottom() <= in.expectedY);
        QVERIFY(out.labels[1].rect.top() >= in.floorY);
        QVERIFY(out.bracket.isNull());
    }
};

QTEST_MAIN(LabelLayoutTest)
#include "label_layout_test.moc"
