// SPDX-License-Identifier: GPL-3.0-or-later
// Pictures of plots: readable again, whole or not there, with the caution on them.
#include "bench_picture.h"
#include "picture_file.h"
#include "plot_fixture.h"
#include "side_by_side_plot.h"

#include <QAction>
#include <QClipboard>
#include <QContextMenuEvent>
#include <QMenu>
#include <QSignalSpy>
#include <QSvgRenderer>
#include <QTemporaryDir>

using namespace rungwright;

class PicturesTest : public QObject
{
    Q_OBJECT

private:
    static Scenario plain()
    {
        Scenario scenario = invented::scenarioOf(invented::leaningTier(24, Price{6900}, 6100));
        invented::addLowered(scenario, "Lower the low end");
        return scenario;
    }
    static QByteArray bytesOf(const QString& path)
    {
        QFile file(path);
        return file.open(QIODevice::ReadOnly) ? file.readAll() : QByteArray();
    }
    /// The picture reads back, and its words are there as words.
    static void checkPicture(const QString& path, QSize least, const QByteArray& word)
    {
        const QByteArray bytes = bytesOf(path);
        QVERIFY(!bytes.isEmpty());
        if (path.endsWith(QLatin1String(".png"))) {
            const QImage image = QImage::fromData(bytes, "PNG");
            QVERIFY(!image.isNull());
            QVERIFY(image.width() >= 2 * least.width() && image.height() >= 2 * least.height()); // Two pixels a logical pixel.
            QVERIFY(image.pixelColor(2, 2).alpha() == 255);
            int colours = 0;
            QSet<QRgb> seen;
            for (int y = 0; y < image.height(); y += 3) {
                for (int x = 0; x < image.width(); x += 3)
                    seen.insert(image.pixel(x, y));
            }
            colours = static_cast<int>(seen.size());
            QVERIFY(colours > 20); // Not an empty sheet.
        } else if (path.endsWith(QLatin1String(".svg"))) {
            QSvgRenderer renderer(bytes);
            QVERIFY(renderer.isValid());
            QVERIFY(renderer.viewBoxF().width() >= least.width() && renderer.viewBoxF().height() >= least.height());
            QVERIFY(bytes.contains(word));
            QVERIFY(!bytes.contains("fill=\"#000000\" fill-opacity=\"1\" stroke=\"none\"")); // Nothing is drawn in a colour not ours.
            QVERIFY(bytes.contains("regulated"));                                            // The caution.
        } else {
            QVERIFY(bytes.startsWith("%PDF"));
            QVERIFY(bytes.trimmed().endsWith("%%EOF"));
            QVERIFY(bytes.contains("/ToUnicode")); // Text that can be selected, not outlines.
        }
    }

private slots:
    /// The offscreen platform says that it cannot raise menus; anything else is ours.
    void init() { QTest::failOnWarning(QRegularExpression(QStringLiteral("^(?!This plugin does not support)"))); }

    void everyPlotSavesItself_data()
    {
        QTest::addColumn<QString>("ending");
        for (const char* ending : {"png", "svg", "pdf"})
            QTest::newRow(ending) << QString::fromLatin1(ending);
    }
    void everyPlotSavesItself()
    {
        QFETCH(QString, ending);
        QTemporaryDir folder;
        OnBench on(plain(), 0);
        const QRectF area = on.ladder().area();
        struct {
            PaperPlot* plot;
            QByteArray word;
        } const all[] = {{&on.ladder(), ">100<"}, {on.plots.curtain(), "area = gap"}, {&on.thinning(), ">20<"}}; // Axis numbers too.
        for (const auto& [plot, word] : all) {
            const QString path = folder.filePath(plot->objectName() + QLatin1Char('.') + ending);
            const Outcome<bool> saved = plot->savePlot(path);
            QVERIFY2(saved.ok(), saved.ok() ? "" : saved.trouble().c_str());
            checkPicture(path, plot->size(), word);
        }
        OnBench::settle();
        QCOMPARE(on.ladder().area(), area); // The screen's own layout is back.
        SideBySidePlot sides;
        std::vector<SideLadder> ladders(2);
        for (std::size_t i = 0; i < 2; ++i) {
            ladders[i].name = i == 0 ? QStringLiteral("current") : QStringLiteral("lower");
            ladders[i].prices = pricesOf(*on.bench.tierCase(), static_cast<int>(i) - 1);
            ladders[i].measurement = measured(on.tier(), ladders[i].prices, ModelSettings{});
        }
        sides.resize(700, 400);
        sides.setLadders(on.tier(), on.bench.currency(), ladders);
        for (const auto arrangement : {SideBySidePlot::Arrangement::columns, SideBySidePlot::Arrangement::overlay}) {
            sides.setArrangement(arrangement);
            const QString path = folder.filePath(QStringLiteral("sides.") + ending);
            QVERIFY(sides.savePlot(path).ok());
            checkPicture(path, sides.size(), "asking price");
        }
    }

    void theBenchIsDrawnWithoutAWindow_data() { everyPlotSavesItself_data(); }
    void theBenchIsDrawnWithoutAWindow()
    {
        QFETCH(QString, ending);
        QTemporaryDir folder;
        Document document;
        document.begin(plain(), {}, true);
        const QString path = folder.filePath(QStringLiteral("bench.") + ending);
        const Outcome<bool> drawn = renderBench(document, 0, 0, path, QSize(1000, 760));
        QVERIFY2(drawn.ok(), drawn.ok() ? "" : drawn.trouble().c_str());
        checkPicture(path, QSize(1000, 760), "Lower the low end");
        QVERIFY(!document.modified());
    }

    void aPictureOnAnotherPaperIsStillLight()
    {
        // Whatever the screen looks like, a bench picture is on light paper.
        const QPalette before = QApplication::palette();
        QPalette night = before;
        night.setColor(QPalette::Window, Qt::black);
        QApplication::setPalette(night);
        QTemporaryDir folder;
        Document document;
        document.begin(plain(), {}, true);
        const QString path = folder.filePath(QStringLiteral("bench.png"));
        QVERIFY(renderBench(document, 0, -1, path).ok());
        QApplication::setPalette(before);
        const QImage image(path);
        QCOMPARE(image.pixelColor(3, 3), Look::light().paper);
        QCOMPARE(image.pixelColor(image.width() - 4, image.height() / 2), Look::light().paper);
    }

    void troubleIsTold()
    {
        QTemporaryDir folder;
        OnBench on(plain());
        QVERIFY(!on.ladder().savePlot(folder.filePath(QStringLiteral("no/such/folder/x.png"))).ok());
        const Outcome<bool> odd = on.ladder().savePlot(folder.filePath(QStringLiteral("x.bmp")));
        QVERIFY(!odd.ok());
        QVERIFY(QString::fromStdString(odd.trouble()).contains(QLatin1String(".svg")));
        Document document;
        document.begin(plain(), {}, true);
        QVERIFY(!renderBench(document, 7, -1, folder.filePath(QStringLiteral("x.png"))).ok());
        QVERIFY(!renderBench(document, 0, -1, folder.filePath(QStringLiteral("x.png")), QSize(100, 100)).ok());
        QVERIFY(QDir(folder.path()).isEmpty());
    }

    void theContextMenuSavesAndCopies()
    {
        QTemporaryDir folder;
        OnBench on(plain());
        const QString path = folder.filePath(QStringLiteral("by-menu.png"));
        on.ladder().setAskPath([&path](QWidget*, const QString&, const QString&, const QString&) { return path; });
        QSignalSpy told(&on.ladder(), &PaperPlot::told);
        QContextMenuEvent event(QContextMenuEvent::Mouse, QPoint(200, 200), on.ladder().mapToGlobal(QPoint(200, 200)));
        QApplication::sendEvent(&on.ladder(), &event);
        auto* menu = on.ladder().findChild<QMenu*>(QStringLiteral("pictureMenu"));
        QVERIFY(menu);
        menu->findChild<QAction*>(QStringLiteral("savePicture"))->trigger();
        QCOMPARE(told.count(), 1);
        QVERIFY(!QImage(path).isNull());
        menu->findChild<QAction*>(QStringLiteral("copyPicture"))->trigger();
        QCOMPARE(told.count(), 2);
        QVERIFY(QApplication::clipboard()->image().width() >= 2 * on.ladder().width());
        menu->close();
        // Given up: nothing is said, nothing written.
        on.ladder().setAskPath([](QWidget*, const QString&, const QString&, const QString&) { return QString(); });
    }

    void twoPixelsAPixelLooksTheSameButFiner()
    {
        OnBench on(plain());
        const QSize size = on.ladder().size();
        const auto draw = [&](QCPPainter& painter) { on.ladder().paintInto(painter, QRect(QPoint(0, 0), size)); };
        const QImage once = pictureImage(size, 1.0, draw);
        const QImage twice = pictureImage(size, 2.0, draw);
        QCOMPARE(twice.size(), 2 * once.size());
        // Scaled down it is the same picture, but for antialiasing: the mean difference of a channel stays below a few of 255 levels.
        const QImage down = twice.scaled(once.size(), Qt::IgnoreAspectRatio, Qt::SmoothTransformation).convertToFormat(once.format());
        double difference = 0;
        for (int y = 0; y < once.height(); ++y) {
            for (int x = 0; x < once.width(); ++x)
                difference += std::abs(qGray(once.pixel(x, y)) - qGray(down.pixel(x, y)));
        }
        QVERIFY2(difference / (once.width() * once.height()) < 4.0,
                 qPrintable(QString::number(difference / (once.width() * once.height()))));
    }
};

QTEST_MAIN(PicturesTest)
#include "pictures_test.moc"
