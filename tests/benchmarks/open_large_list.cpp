// SPDX-License-Identifier: GPL-3.0-or-later
// From the drop of a large unit list to its worklist, on a whole window: one JSON line.
//   open_large_list [RUNS [UNITS]]
// first_rows_ms: until the first rows of the list are painted, be it while the rest is still being read. worklist_ms: until the worklist
// itself is painted, the whole list read. figures_ms: until every tier's figures are there. scan_ms: what a scan of the same file takes in
// this process with as many threads, and the two as shares of it. longest_block_ms: the longest that input would have waited for the
// window's thread while opening; save_block_ms: the same while saving. save_ms: until the scenario is written. peak_rss_mb: of the whole
// process. With RUNS of at most 20 and no UNITS the list is small: a check that it works.
#include "fast_unit_list.h"
#include "in_parallel.h"
#include "invented_list.h"
#include "main_window.h"
#include "questions.h"
#include "worklist_csv.h"
#include "worklist_panel.h"

#include <QApplication>
#include <QElapsedTimer>
#include <QTableView>
#include <QTemporaryDir>

#include <sys/resource.h>

#include <algorithm>
#include <chrono>
#include <cstdio>
#include <optional>
#include <semaphore>
#include <thread>
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

/// How long the window's thread lets others wait: a thread of its own asks it for an answer every millisecond, as input would come.
/// (A timer of 0 ms would do without a thread, but keeps a core busy that the work needs.)
class Watchdog : public QObject
{
public:
    ~Watchdog() override { stop(); }
    void start()
    {
        m_longest = 0;
        m_asking = std::jthread([this](const std::stop_token& end) {
            while (!end.stop_requested()) {
                QElapsedTimer asked;
                asked.start();
                QMetaObject::invokeMethod(
                    this,
                    [this, asked] {
                        m_longest = std::max(m_longest, static_cast<double>(asked.nsecsElapsed()) / 1e6);
                        m_answered.release();
                    },
                    Qt::QueuedConnection);
                while (!end.stop_requested() && !m_answered.try_acquire_for(std::chrono::milliseconds(1)))
                    ;
                std::this_thread::sleep_for(std::chrono::milliseconds(1));
            }
        });
    }
    double stop()
    {
        m_asking = {};
        QCoreApplication::removePostedEvents(this);
        while (m_answered.try_acquire())
            ;
        return m_longest;
    }

private:
    double m_longest = 0;
    std::counting_semaphore<> m_answered{0};
    std::jthread m_asking;
};

/// Notices the first paint of a table with rows in it.
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
    double scan = 0, firstRows = 0, worklist = 0, figures = 0, longestBlock = 0, save = 0, saveBlock = 0;
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

/// What the command `scan` does between opening the list and writing, by as many threads as the desk takes; milliseconds.
double scanned(const QString& path, int units)
{
    QElapsedTimer clock;
    clock.start();
    QFile file(path);
    FastUnitList list;
    if (!file.open(QIODevice::ReadOnly) || readFast(file, {}, KeepUnits::forFigures, {}, {}, list) != FastEnd::done)
        fail("the list was not scanned");
    const unsigned threads = threadsFor(0);
    std::vector<TierCase> tiers(threads);
    std::vector<std::vector<std::uint64_t>> names(threads);
    const auto ladderAt = [&](std::size_t place, unsigned thread) -> std::optional<ChosenLadder> {
        if (!list.units.namesDiffer(place, names[thread]))
            fail("two units of one name");
        list.units.fill(place, tiers[thread].tier);
        return ChosenLadder{&tiers[thread], -1, {}};
    };
    const auto worklist = WorklistCsv::of(list.currency, list.units.tiers(), threads, ladderAt, {});
    qsizetype size = 0;
    const NextPiece next = worklist->pieces();
    for (QByteArrayView piece = next(); !piece.isEmpty(); piece = next())
        size += piece.size();
    if (size < units / 2)
        fail("the scan's worklist is too short");
    return static_cast<double>(clock.nsecsElapsed()) / 1e6;
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
    // The desk readies itself while the start page is looked at.
    QElapsedTimer looked;
    for (looked.start(); looked.elapsed() < 500;)
        QCoreApplication::processEvents(QEventLoop::AllEvents, 20);

    Times times;
    times.scan = scanned(list, units);
    QElapsedTimer clock;
    FirstRows soFar(*window.findChild<QTableView*>(QStringLiteral("readingTable")), clock);
    FirstRows rows(*window.findChild<QTableView*>(QStringLiteral("worklistTable")), clock);
    Watchdog watchdog;
    clock.start();
    watchdog.start();
    window.openFile(list);
    waitFor([&rows] { return rows.milliseconds.has_value(); }, "no row of the worklist was painted");
    times.worklist = *rows.milliseconds;
    times.firstRows = soFar.milliseconds.value_or(times.worklist);
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
    const double scan = median(all, &Times::scan), firstRows = median(all, &Times::firstRows), worklist = median(all, &Times::worklist);
    std::printf("{\"benchmark\": \"open_large_list\", \"units\": %d, \"scan_ms\": %.0f, \"first_rows_ms\": %.0f, \"worklist_ms\": %.0f, "
                "\"first_rows_per_scan\": %.2f, \"worklist_per_scan\": %.2f, \"figures_ms\": %.0f, \"longest_block_ms\": %.1f, "
                "\"save_ms\": %.0f, \"save_block_ms\": %.1f, \"peak_rss_mb\": %.0f, \"runs\": %d}\n",
                units, scan, firstRows, worklist, firstRows / scan, worklist / scan, median(all, &Times::figures), block,
                median(all, &Times::save), saveBlock, static_cast<double>(usage.ru_maxrss) / 1024, runs);
    return 0;
}
