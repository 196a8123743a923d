// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist and the portfolio picture at 20,000 tiers: how long it takes to sort by each column, to filter, to scroll by a frame, to
// repaint and to point. Prints one line of JSON; times in milliseconds, medians and worst of the runs (first argument, 20 unless said).
// Fails only when what is shown is not what the figures say.
#include "app/session/invented_portfolio.h"
#include "portfolio_plot.h"
#include "worklist_panel.h"

#include <QApplication>
#include <QElapsedTimer>
#include <QHeaderView>
#include <QJsonDocument>
#include <QJsonObject>
#include <QMouseEvent>
#include <QScrollBar>
#include <QTableView>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <functional>
#include <vector>

using namespace rungwright;

namespace
{

QJsonObject timed(int runs, const std::function<void(int)>& what)
{
    std::vector<double> times;
    for (int i = 0; i < runs; ++i) {
        QElapsedTimer timer;
        timer.start();
        what(i);
        times.push_back(static_cast<double>(timer.nsecsElapsed()) / 1e6);
    }
    std::sort(times.begin(), times.end());
    const auto rounded = [](double ms) { return std::round(ms * 100) / 100; };
    return {{"median", rounded(times[times.size() / 2])}, {"worst", rounded(times.back())}};
}

/// The longest time the event loop was kept from turning.
class LoopWatch : public QObject
{
public:
    LoopWatch()
    {
        startTimer(0);
        m_since.start();
    }
    double worst = 0;

protected:
    void timerEvent(QTimerEvent*) override
    {
        worst = std::max(worst, static_cast<double>(m_since.nsecsElapsed()) / 1e6);
        m_since.start();
    }

private:
    QElapsedTimer m_since;
};

} // namespace

int main(int argc, char** argv)
{
    if (qEnvironmentVariableIsEmpty("QT_QPA_PLATFORM"))
        qputenv("QT_QPA_PLATFORM", "offscreen");
    qputenv("QT_QPA_UPDATE_IDLE_TIME", "0"); // Frames are wanted at once, not after an idle time.
    QApplication app(argc, argv);
    const int runs = argc > 1 ? std::max(1, std::atoi(argv[1])) : 20;
    constexpr int kTiers = 20'000;
    const Scenario scenario = inventedPortfolio(kTiers, 50);

    Document document;
    Worklist list(document);
    Workbench bench(document);
    WorklistPanel panel(bench, list);
    PortfolioPlot plot;
    plot.setSources(&list, &bench);
    panel.resize(420, 860);
    plot.resize(900, 760);
    panel.show();
    plot.show();
    QCoreApplication::processEvents();

    QElapsedTimer timer;
    timer.start();
    document.begin(scenario, {}, true);
    const double named = static_cast<double>(timer.nsecsElapsed()) / 1e6;
    double blocked = 0;
    {
        LoopWatch watch;
        while (list.measuring())
            QCoreApplication::processEvents(QEventLoop::WaitForMoreEvents);
        blocked = watch.worst;
    }
    const double measured = static_cast<double>(timer.nsecsElapsed()) / 1e6;
    for (int i = 0; i < 20; ++i)
        QCoreApplication::processEvents();

    WorklistModel& model = panel.model();
    bool right = model.rowCount() == kTiers && model.tierAt(0) == list.worstTier();
    const auto paint = [](QWidget& widget) { widget.repaint(); };
    QTableView& table = panel.table();
    QJsonObject sorts;
    for (int column = 0; column < WorklistModel::columnCount_; ++column) {
        const QString name = model.headerData(column, Qt::Horizontal, Qt::DisplayRole).toString();
        sorts[name] = timed(runs, [&](int i) {
            table.sortByColumn(column, i % 2 ? Qt::AscendingOrder : Qt::DescendingOrder);
            paint(*table.viewport());
        });
    }
    table.sortByColumn(WorklistModel::gapColumn, Qt::DescendingOrder);
    const auto filter = [&](const QString& words) {
        WorklistWish wish = model.wish();
        wish.setWords(words);
        model.setWish(wish);
        paint(*table.viewport());
    };
    const QJsonObject filtered =
        timed(runs, [&](int i) { filter(i % 2 ? QStringLiteral("site 12 left") : QStringLiteral("room 1 floor")); });
    filter({});
    right = right && model.rowCount() == kTiers;
    const QJsonObject grouped = timed(runs, [&](int i) {
        panel.setGrouped(i % 2 == 0);
        paint(*table.viewport());
    });
    panel.setGrouped(false);
    QScrollBar* bar = table.verticalScrollBar();
    const QJsonObject scrolled = timed(runs * 10, [&](int i) {
        bar->setValue(i * 977 % std::max(1, bar->maximum()));
        paint(*table.viewport());
    });
    const QJsonObject flagged = timed(runs, [&](int i) { document.setFlagThresholds({-0.5 - 0.01 * i, 3, 0.1}); });
    document.undoStack().clear();

    const QJsonObject built = timed(runs, [&](int) { plot.replot(QCustomPlot::rpImmediateRefresh); });
    const QJsonObject repainted = timed(runs * 5, [&](int) { paint(plot); });
    const QJsonObject hovered = timed(runs * 10, [&](int i) {
        const QPointF at(plot.area().left() + std::fmod(i * 37.3, plot.area().width()),
                         plot.area().top() + std::fmod(i * 91.7, plot.area().height()));
        QMouseEvent move(QEvent::MouseMove, at, plot.mapToGlobal(at), Qt::NoButton, Qt::NoButton, {});
        QApplication::sendEvent(&plot, &move);
        paint(plot);
    });
    right = right && static_cast<int>(plot.points().points.size()) + plot.points().leftOut.total() == kTiers;

    const QJsonObject report{{"benchmark", "worklist_speed"},
                             {"tiers", kTiers},
                             {"units", kTiers * 50},
                             {"names_shown_ms", std::round(named)},
                             {"all_measured_ms", std::round(measured)},
                             {"longest_block_while_measuring_ms", std::round(blocked * 10) / 10},
                             {"sort_and_paint_ms", sorts},
                             {"filter_and_paint_ms", filtered},
                             {"group_and_paint_ms", grouped},
                             {"scroll_frame_ms", scrolled},
                             {"new_thresholds_ms", flagged},
                             {"portfolio_full_replot_ms", built},
                             {"portfolio_repaint_ms", repainted},
                             {"portfolio_hover_frame_ms", hovered},
                             {"shown_is_right", right}};
    std::puts(QJsonDocument(report).toJson(QJsonDocument::Compact).constData());
    return right ? 0 : 1;
}
