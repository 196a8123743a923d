// SPDX-License-Identifier: GPL-3.0-or-later
// From the program's start to the first painted bench: milliseconds, as JSON. Checks that the bench shows core's gap before it reports.
//   start_to_bench [RUNS]
#include "ladder_plot.h"
#include "main_window.h"
#include "questions.h"
#include "wording.h"

#include <QApplication>
#include <QElapsedTimer>
#include <QLabel>
#include <QTemporaryDir>

#include <algorithm>
#include <cstdio>
#include <vector>

using namespace rungwright;

namespace
{

/// Notices the first paint of the ladder with a tier on it.
class FirstPaint : public QObject
{
public:
    FirstPaint(MainWindow& window, QElapsedTimer& clock) : m_window(window), m_clock(clock)
    {
        window.findChild<LadderPlot*>()->installEventFilter(this);
    }
    double milliseconds = -1;

protected:
    bool eventFilter(QObject* watched, QEvent* event) override
    {
        if (event->type() == QEvent::Paint && milliseconds < 0 && m_window.bench().tierCase()) {
            watched->removeEventFilter(this);
            watched->event(event); // the paint itself is part of what is timed
            milliseconds = static_cast<double>(m_clock.nsecsElapsed()) / 1e6;
            return true;
        }
        return false;
    }

private:
    MainWindow& m_window;
    QElapsedTimer& m_clock;
};

double once(const QString& scenario)
{
    QElapsedTimer clock;
    clock.start();
    QTemporaryDir folder;
    QSettings settings(folder.filePath(QStringLiteral("settings.ini")), QSettings::IniFormat);
    Questions questions;
    const QString copy = folder.filePath(QStringLiteral("scenario.rungs.json"));
    QFile::copy(scenario, copy); // the desk keeps unsaved work beside what it opens
    MainWindow window(questions, settings, folder.filePath(QStringLiteral("state")));
    window.resize(1440, 900);
    FirstPaint paint(window, clock);
    window.show();
    window.openFile(copy);
    while (paint.milliseconds < 0 && clock.elapsed() < 30000)
        QCoreApplication::processEvents(QEventLoop::WaitForMoreEvents, 100);
    const Workbench& bench = window.bench();
    const QString gap =
        paint.milliseconds < 0
            ? QString()
            : moneyText(*measured(bench.tierCase()->tier, bench.workedPrices(), bench.settings()).gap.gap, bench.currency());
    const auto* headline = window.findChild<QLabel*>(QStringLiteral("gapHeadline"));
    if (gap.isEmpty() || !headline->text().contains(gap)) {
        std::fprintf(stderr, "start_to_bench: the bench did not come up with core's gap\n");
        std::exit(1);
    }
    return paint.milliseconds;
}

} // namespace

int main(int argc, char** argv)
{
    QElapsedTimer sinceMain;
    sinceMain.start();
    QApplication application(argc, argv);
    const double applicationUp = static_cast<double>(sinceMain.nsecsElapsed()) / 1e6;
    const int runs = argc > 1 ? qBound(1, QString::fromLocal8Bit(argv[1]).toInt(), 100) : 15;
    const QString scenario = QStringLiteral(RUNGWRIGHT_SAMPLES "/quillmere-storage.rungs.json");
    const double cold = once(scenario); // fonts and styles are loaded on the way
    std::vector<double> warm;
    for (int i = 0; i < runs; ++i)
        warm.push_back(once(scenario));
    std::sort(warm.begin(), warm.end());
    std::printf(
        "{\"benchmark\": \"start_to_bench\", \"unit\": \"ms\", \"application\": %.1f, \"first_window\": %.1f, \"later_windows_p50\": %.1f, "
        "\"runs\": %zu}\n",
        applicationUp, cold, warm[warm.size() / 2], warm.size());
    return 0;
}
