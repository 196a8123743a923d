// SPDX-License-Identifier: GPL-3.0-or-later
// From the drop of a large unit list to its worklist, on a whole window: one JSON line.
//   open_large_list [RUNS [UNITS]]
// first_rows_ms: until the worklist's first painted rows. figures_ms: until every tier's figures are there. longest_block_ms: the longest
// the window's thread did not come back to its event loop, while opening; save_block_ms: the same while saving. save_ms: until the scenario
// is written. peak_rss_mb: of the whole process. With RUNS of at most 20 and no UNITS the list is small: a check that it works.
#include "invented_list.h"
#include "main_window.h"
#include "questions.h"
#include "worklist_panel.h"

#include <QApplication>
#include <QElapsedTimer>
#include <QTableView>
#include <QTemporaryDir>
#include <QTimer>

#include <sys/resource.h>

#include <algorithm>
#include <cstdio>
#include <optional>
#include <vector>

using namespace rungwright;

namespace
{

class PresetPath : public Questions
{
public:
    QString path;
    QString savePath(QWidget*, const QString&, const QString&, const QString&) override { return path; }
    int choose(QWidget*, const QString&, const QString&, const QStringList& answers) override
    {
        return answers.size() > 1 ? 1 : 0; // go on without saving
    }
};

/// The longest time between two turns of the event loop. A timer of 0 ms fires in every turn.
class Watchdog : public QObject
{
public:
    Watchdog()
    {
        m_timer.setInterval(0);
        QObject::connect(&m_timer, &QTimer::timeout, this, [this] { look(); });
    }
    void start()
    {
        m_longest = 0;
        m_last.start();
        m_timer.start();
    }
    double stop()
    {
        look();
        m_timer.stop();
        return m_longest;
    }

private:
    void look()
    {
        m_longest = std::max(m_longest, static_cast<double>(m_last.nsecsElapsed()) / 1e6);
        m_last.start();
    }

    QTimer m_timer;
    QElapsedTimer m_last;
    double m_longest = 0;
};

/// Notices the first paint of the worklist with rows in it.
class FirstRows : public QObject
{
public:
    FirstRows(QTableView& table, QElapsedTimer& clock) : m_table(table), m_clock(clock) { table.viewport()->installEventFilter(this); }
    std::optional<double> milliseconds;

protected:
    bool eventFilter(QObject* watched, QEvent* event) override
    {
        if (event->type() != QEvent::Paint || milliseconds || m_table.model()->rowCount() == 0)
            return false;
        watched->removeEventFilter(this);
        watched->event(event); // the paint itself is part of what is timed
        milliseconds = static_cast<double>(m_clock.nsecsElapsed()) / 1e6;
        return true;
    }

private:
    QTableView& m_table;
    QElapsedTimer& m_clock;
};

struct Times {
    double firstRows = 0, figures = 0, longestBlock = 0, save = 0, saveBlock = 0;
};

[[noreturn]] void fail(const char* why)
{
    std::fprintf(stderr, "open_large_list: %s\n", why);
    std::exit(1);
}

template <class Condition>
void waitFor(const Condition& condition, const char* what)
{
    QElapsedTimer clock;
    clock.start();
    while (!condition()) {
        if (clock.elapsed() > 300'000)
            fail(what);
        QCoreApplication::processEvents(QEventLoop::WaitForMoreEvents);
    }
}

Times once(const QString& list, int units)
{
    QTemporaryDir folder;
    QSettings settings(folder.filePath(QStringLiteral("settings.ini")), QSettings::IniFormat);
    PresetPath questions;
    questions.path = folder.filePath(QStringLiteral("saved.rungs.json"));
    MainWindow window(questions, settings, folder.filePath(QStringLiteral("state")));
    window.resize(1440, 900);
    window.show();
    QCoreApplication::processEvents();

    Times times;
    QElapsedTimer clock;
    FirstRows rows(*window.findChild<QTableView*>(QStringLiteral("worklistTable")), clock);
    Watchdog watchdog;
    clock.start();
    watchdog.start();
    window.openFile(list);
    waitFor([&rows] { return rows.milliseconds.has_value(); }, "no row of the worklist was painted");
    times.firstRows = *rows.milliseconds;
    const Worklist& worklist = window.tiers();
    waitFor([&worklist] { return !worklist.measuring(); }, "the figures did not come in");
    times.figures = static_cast<double>(clock.nsecsElapsed()) / 1e6;
    times.longestBlock = watchdog.stop();
    std::size_t seen = 0;
    for (const TierCase& tier : std::as_const(window.document().scenario()).tiers)
        seen += tier.tier.units.size();
    if (seen != static_cast<std::size_t>(units) || worklist.count() == 0)
        fail("not every unit came in");

    SaveFlow& saving = window.files().saving();
    watchdog.start();
    clock.start();
    if (!saving.saveAs())
        fail("saving did not begin");
    waitFor([&saving] { return !saving.writing(); }, "the scenario was not written");
    times.save = static_cast<double>(clock.nsecsElapsed()) / 1e6;
    times.saveBlock = watchdog.stop();
    if (window.document().modified() || !QFile::exists(questions.path))
        fail("the scenario was not saved");
    return times;
}

double median(std::vector<Times>& all, double Times::*figure)
{
    std::sort(all.begin(), all.end(), [figure](const Times& a, const Times& b) { return a.*figure < b.*figure; });
    return all[all.size() / 2].*figure;
}

} // namespace

int main(int argc, char** argv)
{
    QApplication application(argc, argv);
    const int runs = argc > 1 ? qBound(1, QString::fromLocal8Bit(argv[1]).toInt(), 100) : 3;
    const int units = argc > 2                 ? qBound(1000, QString::fromLocal8Bit(argv[2]).toInt(), 10'000'000)
                      : argc > 1 && runs <= 20 ? 20'000
                                               : 1'000'000;
    QTemporaryDir folder;
    const QString list = folder.filePath(QStringLiteral("units.csv"));
    QFile file(list);
    if (!file.open(QIODevice::WriteOnly))
        fail("no place for the list");
    benchmarks::inventedList(units, [&file](std::string_view piece) { file.write(piece.data(), static_cast<qint64>(piece.size())); });
    file.close();
    std::vector<Times> all;
    for (int i = 0; i < runs; ++i)
        all.push_back(once(list, units));
    rusage usage{};
    getrusage(RUSAGE_SELF, &usage);
    // What blocks is told by its worst run, what lasts by the median.
    double block = 0, saveBlock = 0;
    for (const Times& one : all) {
        block = std::max(block, one.longestBlock);
        saveBlock = std::max(saveBlock, one.saveBlock);
    }
    std::printf("{\"benchmark\": \"open_large_list\", \"units\": %d, \"first_rows_ms\": %.0f, \"figures_ms\": %.0f, "
                "\"longest_block_ms\": %.1f, \"save_ms\": %.0f, \"save_block_ms\": %.1f, \"peak_rss_mb\": %.0f, \"runs\": %d}\n",
                units, median(all, &Times::firstRows), median(all, &Times::figures), block, median(all, &Times::save), saveBlock,
                static_cast<double>(usage.ru_maxrss) / 1024, runs);
    return 0;
}
