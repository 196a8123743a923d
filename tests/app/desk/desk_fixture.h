// SPDX-License-Identifier: GPL-3.0-or-later
// A whole desk with preset answers, for tests that use it as a person would.
#pragma once

#include "bench_plots.h"
#include "figures_model.h"
#include "main_window.h"
#include "questions.h"
#include "wording.h"

#include <QLabel>
#include <QSignalSpy>
#include <QTableView>
#include <QTemporaryDir>
#include <QTest>

namespace rungwright
{

/// Answers what was preset, and keeps what was asked and told. A question nobody preset is given up.
class PresetQuestions : public Questions
{
public:
    QString nextPath;
    QList<int> answers;
    QStringList texts;
    QStringList asked;
    QStringList told;

    QString openPath(QWidget*, const QString& title, const QString&) override { return path(title); }
    QString savePath(QWidget*, const QString& title, const QString&, const QString&) override { return path(title); }
    int choose(QWidget*, const QString& text, const QString& detail, const QStringList& choices) override
    {
        asked << text + QLatin1Char(' ') + detail;
        return answers.isEmpty() ? static_cast<int>(choices.size()) - 1 : answers.takeFirst();
    }
    void tell(QWidget*, const QString& text, const QString& detail) override { told << text + QLatin1Char(' ') + detail; }
    QString text(QWidget*, const QString&, const QString& label, const QString&) override
    {
        asked << label;
        return texts.isEmpty() ? QString() : texts.takeFirst();
    }
    QString longText(QWidget*, const QString& title, const QString&, const QString&) override
    {
        asked << title;
        return texts.isEmpty() ? QString() : texts.takeFirst();
    }

private:
    QString path(const QString& title)
    {
        asked << title;
        return std::exchange(nextPath, QString());
    }
};

class DeskFixture
{
public:
    DeskFixture() : settings(folder.filePath(QStringLiteral("settings.ini")), QSettings::IniFormat)
    {
        window = std::make_unique<MainWindow>(questions, settings, folder.filePath(QStringLiteral("state")));
        window->resize(1440, 900);
        window->show();
        if (!QTest::qWaitForWindowExposed(window.get()))
            qFatal("the window did not come up");
        // Shortcuts work in the active window only, and without a window manager no window becomes active by itself.
        window->activateWindow();
        if (!QTest::qWaitForWindowActive(window.get()))
            qFatal("the window did not become active");
    }

    /// A copy of a sample: the desk keeps unsaved work beside the file it opens.
    QString sample(const char* name)
    {
        const QString copy = folder.filePath(QString::fromLatin1(name));
        if (!QFile::exists(copy) && !QFile::copy(QStringLiteral(RUNGWRIGHT_SAMPLES "/") + QString::fromLatin1(name), copy))
            qFatal("no such sample: %s", name);
        return copy;
    }

    /// Opens a file and waits until it is on the desk (or refused).
    bool open(const QString& path)
    {
        QSignalSpy done(&window->files(), &FileFlow::done);
        window->openFile(path);
        return done.count() > 0 || done.wait(20000);
    }

    Workbench& bench() { return window->bench(); }
    LadderPlot& ladder() { return *window->findChild<LadderPlot*>(); }
    ThinningPlot& thinning() { return *window->findChild<ThinningPlot*>(); }
    template <class T>
    T& child(const char* name)
    {
        T* found = window->findChild<T*>(QString::fromLatin1(name));
        if (!found)
            qFatal("no child of that name: %s", name);
        return *found;
    }

    /// What the Figures table shows in a row, by the figure's key.
    QString figure(const char* key, FiguresModel::Column column)
    {
        const auto rows = figureRows();
        for (std::size_t row = 0; row < rows.size(); ++row) {
            if (qstrcmp(rows[row].key, key) == 0)
                return child<QTableView>("figuresTable").model()->index(static_cast<int>(row), column).data().toString();
        }
        return {};
    }
    /// The gap of the worked prices, from core alone.
    QString coreGap()
    {
        const Workbench& b = bench();
        return moneyText(*measured(b.tierCase()->tier, b.workedPrices(), b.settings()).gap.gap, b.currency());
    }
    /// The unit on offer at a place among those on offer, cheapest first.
    std::uint32_t unitOnOffer(std::size_t place)
    {
        const auto ladder = sortedLadder(bench().tierCase()->tier.units, bench().workedPrices(), Among::onOffer);
        return ladder[place].unit;
    }
    QPoint rung(std::uint32_t unit) { return ladder().rungPosition(unit).toPoint(); }

    /// Real mouse moves from one place to another, in steps of a few pixels; the button stays down.
    static void pressAndMove(QWidget& on, QPoint from, QPoint to, int steps = 6, Qt::KeyboardModifiers keys = {})
    {
        QTest::mousePress(&on, Qt::LeftButton, keys, from);
        for (int i = 1; i <= steps; ++i)
            QTest::mouseMove(&on, from + (to - from) * i / steps);
        QCoreApplication::processEvents();
    }
    static void drag(QWidget& on, QPoint from, QPoint to, int steps = 6)
    {
        pressAndMove(on, from, to, steps);
        QTest::mouseRelease(&on, Qt::LeftButton, {}, to);
        QCoreApplication::processEvents();
    }

    QTemporaryDir folder;
    QSettings settings;
    PresetQuestions questions;
    std::unique_ptr<MainWindow> window;
};

} // namespace rungwright
