// SPDX-License-Identifier: GPL-3.0-or-later
// How long from a mouse move of a drag to its painted frame, beside one full replot of the same bench in the same run.
// Prints JSON: wall time, and the processor time of this process, which neighbours on a busy machine do not lengthen. Fails only when
// what is shown is not what core says; times depend on the machine and are for reading.
#include "bench_plots.h"
#include "invented_tiers.h"
#include "wording.h"

#include <QApplication>
#include <QElapsedTimer>
#include <QJsonArray>
#include <QJsonDocument>
#include <QJsonObject>
#include <QMouseEvent>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <ctime>
#include <vector>

using namespace rungwright;

namespace
{

class PaintWatch : public QObject
{
public:
    explicit PaintWatch(QWidget* widget) { widget->installEventFilter(this); }
    bool eventFilter(QObject*, QEvent* event) override
    {
        count += event->type() == QEvent::Paint;
        return false;
    }
    int count = 0;
};

QJsonObject quantiles(std::vector<double> times)
{
    std::sort(times.begin(), times.end());
    const auto at = [&times](double share) {
        return times[static_cast<std::size_t>(std::ceil(share * static_cast<double>(times.size()))) - 1];
    };
    const auto rounded = [](double ms) { return std::round(ms * 1000) / 1000; };
    return {{"p50", rounded(at(0.50))}, {"p95", rounded(at(0.95))}, {"p99", rounded(at(0.99))}};
}

/// Takes wall and processor time of one thing many times over.
class Stopwatch
{
public:
    void start()
    {
        m_cpu = std::clock();
        m_wall.start();
    }
    void stop()
    {
        wall.push_back(static_cast<double>(m_wall.nsecsElapsed()) / 1e6);
        cpu.push_back(1e3 * static_cast<double>(std::clock() - m_cpu) / CLOCKS_PER_SEC);
    }
    qint64 elapsed() const { return m_wall.elapsed(); }
    std::vector<double> wall, cpu;

private:
    QElapsedTimer m_wall;
    std::clock_t m_cpu = 0;
};

void mouse(QWidget& widget, QEvent::Type type, QPointF at)
{
    const Qt::MouseButton button = type == QEvent::MouseMove ? Qt::NoButton : Qt::LeftButton;
    QMouseEvent event(type, at, widget.mapToGlobal(at), button, type == QEvent::MouseButtonRelease ? Qt::NoButton : Qt::LeftButton, {});
    QApplication::sendEvent(&widget, &event);
}

void settle()
{
    for (int i = 0; i < 20; ++i)
        QCoreApplication::processEvents();
}

/// The gap written on the ladder is core's own for the prices on the bench.
bool showsCoresGap(const BenchPlots& plots, const Workbench& bench)
{
    const Measurement own = measured(bench.tierCase()->tier, bench.workedPrices(), bench.settings());
    if (!own.gap.gap)
        return false;
    const QString wanted = moneyText(*own.gap.gap, bench.currency());
    const auto& labels = plots.ladder()->bandLayout().labels;
    return std::any_of(labels.begin(), labels.end(),
                       [&](const PlacedLabel& l) { return l.text.contains(QStringLiteral("gap ") + wanted); });
}

} // namespace

int main(int argc, char** argv)
{
    if (qEnvironmentVariableIsEmpty("QT_QPA_PLATFORM"))
        qputenv("QT_QPA_PLATFORM", "offscreen");
    qputenv("QT_QPA_UPDATE_IDLE_TIME", "0"); // Frames are wanted at once, not after an idle time.
    QApplication app(argc, argv);
    const int moves = argc > 1 ? std::max(20, std::atoi(argv[1])) : 300;
    const QSize size(1920, 1080);
    QJsonArray runs;
    bool right = true;
    for (const int units : {12, 60, 500, 1000}) {
        Scenario scenario = invented::scenarioOf(invented::leaningTier(units, Price{6900}, 6100));
        invented::addLowered(scenario, "Lower the low end");
        Document document;
        document.begin(std::move(scenario), {}, true);
        Workbench bench(document);
        bench.showTier(0, 0); // A candidate: the current ladder's trace and curves are drawn too.
        BenchPlots plots;
        plots.resize(size);
        plots.setWorkbench(&bench);
        plots.show();
        settle();
        LadderPlot& ladder = *plots.ladder();
        std::uint32_t unit = 0;
        for (const std::uint32_t u : bench.columns()) {
            if (bench.tierCase()->tier.units[u].onOffer()) {
                unit = u; // The cheapest on offer: its move changes the gap and every curve.
                break;
            }
        }
        const QPointF at = ladder.rungPosition(unit);
        mouse(ladder, QEvent::MouseButtonPress, at);
        mouse(ladder, QEvent::MouseMove, at + QPointF(0, 20));
        settle();
        if (!showsCoresGap(plots, bench) || bench.gesture() != Workbench::Gesture::move) {
            std::fprintf(stderr, "%d units: the gap shown is not core's\n", units);
            right = false;
        }
        PaintWatch ladderPaints(plots.ladder());
        PaintWatch curtainPaints(plots.curtain());
        PaintWatch thinningPaints(plots.thinning());
        Stopwatch frames;
        int unpainted = 0;
        for (int i = 0; i < moves; ++i) {
            const QPointF to = at + QPointF(0, 20.0 + 60.0 * std::sin(0.37 * i));
            const int before = ladderPaints.count;
            const Price was = bench.workedPrices()[unit];
            frames.start();
            mouse(ladder, QEvent::MouseMove, to);
            if (bench.workedPrices()[unit] == was)
                continue; // The same price point: no frame.
            while (ladderPaints.count == before && frames.elapsed() < 1000)
                QCoreApplication::processEvents();
            frames.stop();
            unpainted += ladderPaints.count == before;
        }
        const auto painted = static_cast<int>(frames.wall.size());
        right = right && unpainted == 0 && curtainPaints.count >= painted && thinningPaints.count >= painted && showsCoresGap(plots, bench);
        Stopwatch full;
        for (int i = 0; i < std::max(20, moves / 5); ++i) {
            full.start();
            for (QCustomPlot* plot : {static_cast<QCustomPlot*>(plots.ladder()), static_cast<QCustomPlot*>(plots.curtain()),
                                      static_cast<QCustomPlot*>(plots.thinning())})
                plot->replot(QCustomPlot::rpImmediateRefresh);
            full.stop();
        }
        mouse(ladder, QEvent::MouseButtonRelease, at);
        const QJsonObject frameCpu = quantiles(frames.cpu);
        const QJsonObject fullCpu = quantiles(full.cpu);
        runs.append(
            QJsonObject{{"units", units},
                        {"frames", painted},
                        {"frame_ms", quantiles(frames.wall)},
                        {"frame_cpu_ms", frameCpu},
                        {"full_replot_ms", quantiles(full.wall)},
                        {"full_replot_cpu_ms", fullCpu},
                        {"frame_share_of_full_replot", std::round(1000 * frameCpu["p50"].toDouble() / fullCpu["p50"].toDouble()) / 1000}});
    }
    const QJsonObject report{{"benchmark", "drag_frames"},
                             {"width", size.width()},
                             {"height", size.height()},
                             {"platform", QGuiApplication::platformName()},
                             {"gap_shown_is_cores", right},
                             {"frame_of_60_hz_ms", 16.667},
                             {"runs", runs}};
    std::fputs(QJsonDocument(report).toJson().constData(), stdout);
    return right ? 0 : 1;
}
