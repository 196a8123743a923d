// SPDX-License-Identifier: GPL-3.0-or-later
// The palette: readable, and told apart by people with the common colour-vision deficiencies.
#include "colour_difference.h"
#include "look.h"
#include "plot_fixture.h"

#include <QWidget>

using namespace rungwright;
using eyes::Vision;

class LookTest : public QObject
{
    Q_OBJECT

private:
    /// The least colour difference of two colours over normal and the three deficient visions.
    static double leastDifference(const QColor& a, const QColor& b)
    {
        double least = 1000;
        for (const Vision vision : {Vision::normal, Vision::protan, Vision::deutan, Vision::tritan}) {
            least = std::min(
                least, eyes::difference(eyes::lab(eyes::seen(eyes::linear(a), vision)), eyes::lab(eyes::seen(eyes::linear(b), vision))));
        }
        return least;
    }
    /// Adjacent patches differ visibly from about 1; marks and lines that lie apart on a screen want several times that. The factor is a
    /// house rule, no source.
    static constexpr double kApart = 10.0;

private slots:
    void theMeasureItselfIsRight()
    {
        // Test data of Sharma, Wu & Dalal 2005, table 1 (from memory), given to four decimals.
        struct {
            eyes::Lab a, b;
            double wanted;
        } const rows[] = {{{50, 2.6772, -79.7751}, {50, 0, -82.7485}, 2.0425},
                          {{50, 3.1571, -77.2803}, {50, 0, -82.7485}, 2.8615},
                          {{50, 2.8361, -74.0200}, {50, 0, -82.7485}, 3.4412},
                          {{50, 2.5, 0}, {50, 0, -2.5}, 4.3065},
                          {{50, 2.5, 0}, {73, 25, -18}, 27.1492},
                          {{60.2574, -34.0099, 36.2677}, {60.4626, -34.1751, 39.4387}, 1.2644},
                          {{2.0776, 0.0795, -1.1350}, {0.9033, -0.0636, -0.5514}, 0.9082}};
        for (const auto& row : rows)
            QVERIFY2(std::abs(eyes::difference(row.a, row.b) - row.wanted) < 0.5e-4 + 1e-9, qPrintable(QString::number(row.wanted)));
        // WCAG 2.1: black on white is 21 to 1, equal colours 1 to 1.
        QVERIFY(std::abs(eyes::contrast(Qt::black, Qt::white) - 21.0) < 1e-9);
        QVERIFY(std::abs(eyes::contrast(Qt::red, Qt::red) - 1.0) < 1e-12);
        // sRGB white is L* = 100 without colour, to the digits of the matrix.
        const eyes::Lab white = eyes::lab(eyes::linear(Qt::white));
        QVERIFY(std::abs(white[0] - 100) < 1e-3 && std::abs(white[1]) < 0.02 && std::abs(white[2]) < 0.02);
        // The deficiencies keep greys grey: the matrices' rows sum to 1, to their six decimals.
        for (const Vision vision : {Vision::protan, Vision::deutan, Vision::tritan}) {
            for (const double v : eyes::seen({0.4, 0.4, 0.4}, vision))
                QVERIFY(std::abs(v - 0.4) < 2e-6);
        }
    }

    void readable_data()
    {
        QTest::addColumn<bool>("night");
        QTest::newRow("light") << false;
        QTest::newRow("night") << true;
    }
    void readable()
    {
        QFETCH(bool, night);
        const Look& look = night ? Look::night() : Look::light();
        QCOMPARE(look.dark, night);
        // WCAG 2.1 success criterion 1.4.3: text at least 4.5 to 1.
        for (const QColor& text : {look.ink, look.faintInk, look.floor, look.gapLine, look.onOffer})
            QVERIFY2(eyes::contrast(text, look.paper) >= 4.5, qPrintable(text.name()));
        for (const QColor& back : {look.gapFill, look.selectionFill})
            QVERIFY2(eyes::contrast(look.ink, back) >= 4.5, qPrintable(back.name()));
        // 1.4.11: what is needed to understand a graphic, at least 3 to 1 against what it lies on.
        for (const QColor& mark : {look.onOffer, look.taken, look.floor, look.gapLine, look.trace, look.selection, look.focus}) {
            QVERIFY2(eyes::contrast(mark, look.paper) >= 3.0, qPrintable(mark.name()));
            QVERIFY2(eyes::contrast(mark, look.gapFill) >= 3.0, qPrintable(mark.name()));
        }
        for (const QColor& line : look.series)
            QVERIFY2(eyes::contrast(line, look.paper) >= 3.0, qPrintable(line.name()));
    }

    void toldApart_data() { readable_data(); }
    void toldApart()
    {
        QFETCH(bool, night);
        const Look& look = night ? Look::night() : Look::light();
        const auto apart = [](const auto& colours) {
            for (std::size_t i = 0; i < colours.size(); ++i) {
                for (std::size_t j = 0; j < i; ++j) {
                    const double d = leastDifference(colours[i], colours[j]);
                    QVERIFY2(d >= kApart, qPrintable(QStringLiteral("%1 %2: %3").arg(colours[i].name(), colours[j].name()).arg(d)));
                }
            }
        };
        apart(std::array{look.onOffer, look.taken, look.floor, look.gapLine, look.selection, look.paper});
        apart(std::array{look.trace, look.floor, look.gapLine, look.onOffer, look.paper});
        apart(look.series);
        // The gap's fill must show on the paper at all; it is also edged by lines.
        QVERIFY(leastDifference(look.gapFill, look.paper) >= 5.0);
    }

    void plotsFollowTheWindow()
    {
        OnBench on(invented::scenarioOf(invented::leaningTier(24, Price{6900}, 6100)));
        QPalette palette = on.plots.palette();
        palette.setColor(QPalette::Window, QColor(250, 250, 250));
        on.plots.setPalette(palette);
        OnBench::settle();
        QCOMPARE(&on.ladder().look(), &Look::light());
        QCOMPARE(on.plots.grab().toImage().pixelColor(2, 200), Look::light().paper);
        palette.setColor(QPalette::Window, QColor(20, 20, 24));
        on.plots.setPalette(palette);
        OnBench::settle();
        QCOMPARE(&on.ladder().look(), &Look::night());
        const QImage night = on.plots.grab().toImage();
        QCOMPARE(night.pixelColor(2, 200), Look::night().paper);
        QCOMPARE(night.pixelColor(300, night.height() - 1), Look::night().paper); // Down to the last row.
        // No pixel of the light paper is left anywhere.
        for (int y = 0; y < night.height(); y += 5) {
            for (int x = 0; x < night.width(); x += 5)
                QVERIFY(night.pixelColor(x, y) != Look::light().paper);
        }
    }
};

QTEST_MAIN(LookTest)
#include "look_test.moc"
