// SPDX-License-Identifier: GPL-3.0-or-later
#include "frontier_page.h"

#include "caution.h"
#include "file_names.h"
#include "plot_words.h"
#include "questions.h"
#include "reshape_words.h"
#include "ui_frontier_page.h"
#include "whole_file.h"
#include "wording.h"

#include <QClipboard>
#include <QFileInfo>
#include <QGuiApplication>
#include <QSignalBlocker>
#include <QtConcurrent>

#include <algorithm>
#include <cmath>
#include <utility>

namespace rungwright
{

FrontierPage::FrontierPage(Workbench& bench, Questions& questions, QWidget* parent) :
    QWidget(parent), m_bench(bench), m_questions(questions), m_ui(std::make_unique<Ui::FrontierPage>())
{
    m_ui->setupUi(this);
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    m_ui->frontierTitle->setFont(strong);
    m_ui->frontierSaid->setMinimumHeight(2 * fontMetrics().lineSpacing());
    servePlot();
    for (QComboBox* box : {m_ui->againstBox, m_ui->totalBox, m_ui->orderBox})
        connect(box, &QComboBox::currentIndexChanged, this, &FrontierPage::refresh);
    connect(m_ui->takenBox, &QCheckBox::toggled, this, &FrontierPage::refresh);
    connect(&bench, &Workbench::reset, this, &FrontierPage::refresh);
    connect(&m_watcher, &QFutureWatcherBase::finished, this, [this] {
        m_tracing = false;
        const bool again = std::exchange(m_again, false);
        if (m_stale)
            return; // traced anew when the page is shown
        if (again)
            refresh();
        else
            showTraced(m_watcher.result());
    });
}

FrontierPage::~FrontierPage()
{
    // A curve may still be traced, from copies of its own: nobody waits for it, and nobody is left to show it.
    m_watcher.disconnect(this);
}

void FrontierPage::servePlot()
{
    FrontierPlot* plot = m_ui->frontierPlot;
    plot->setAskPath([this](QWidget* over, const QString& title, const QString& suggestion, const QString& filter) {
        const QString path = m_questions.savePath(over, title, suggestion, filter);
        return path.isEmpty() ? path : withSuffix(path, QStringLiteral("png"));
    });
    connect(plot, &PaperPlot::told, this, &FrontierPage::told);
    connect(plot, &PaperPlot::saveFailed, this,
            [this](const QString& reason) { m_questions.tell(this, tr("The picture was not saved."), reason); });
    connect(plot, &FrontierPlot::pointTaken, this, &FrontierPage::takePoint);
    connect(plot, &FrontierPlot::candidateChosen, &m_bench, &Workbench::workOn);
    connect(plot, &FrontierPlot::saveTableWanted, this, &FrontierPage::saveTable);
    connect(plot, &FrontierPlot::copyTableWanted, this, [this] {
        QGuiApplication::clipboard()->setText(frontierTable(m_ui->frontierPlot->picture()));
        emit told(tr("Table copied. %1").arg(cautionText()));
    });
}

void FrontierPage::showEvent(QShowEvent* event)
{
    QWidget::showEvent(event);
    if (m_stale)
        refresh();
}

// Tracing ------------------------------------------------------------------------------------------------------------

void FrontierPage::refresh()
{
    const bool there = m_bench.tierCase() != nullptr;
    const auto against = m_ui->againstBox->currentIndex() == 1 ? Against::total : Against::prices;
    for (QWidget* widget : std::initializer_list<QWidget*>{m_ui->totalLabel, m_ui->totalBox})
        widget->setVisible(against == Against::prices);
    m_ui->takenBox->setVisible(there && modelUnits(m_bench.settings().kind) != Among::onOffer);
    m_stale = !isVisible();
    if (m_stale)
        return;
    if (m_tracing) {
        m_again = true;
        return;
    }
    m_ask = {};
    m_ask.against = against;
    if (!there) {
        m_ui->frontierTitle->clear();
        showTraced({});
        return;
    }
    const TierCase& tc = *m_bench.tierCase();
    m_ask.tier = tc.tier;
    // The order is the rules', until the user says otherwise for this tier.
    const std::tuple order(tc.tier.site, tc.tier.name, m_bench.rules().order);
    if (m_orderOf != order) {
        m_orderOf = order;
        const QSignalBlocker quiet(m_ui->orderBox);
        m_ui->orderBox->setCurrentIndex(m_bench.rules().order == OrderKept::grade ? 1 : 0);
    }
    m_ask.model = m_bench.settings();
    m_ask.rules = m_bench.rules();
    m_ask.wish.order = m_ui->orderBox->currentIndex() == 1 ? OrderKept::grade : OrderKept::present;
    m_ask.wish.total.free = against == Against::prices && m_ui->totalBox->currentIndex() == 1;
    m_ask.wish.takenStay = modelUnits(m_ask.model.kind) != Among::onOffer && m_ui->takenBox->isChecked();
    m_ui->frontierTitle->setText(tr("%1 · %2").arg(QString::fromStdString(tc.tier.site), QString::fromStdString(tc.tier.name)));
    trace();
}

void FrontierPage::trace()
{
    if (m_ask.tier.units.size() <= kAtOnce) {
        showTraced(traceFrontier(m_ask));
        return;
    }
    m_tracing = true;
    m_ui->frontierSaid->setText(tr("tracing …"));
    m_watcher.setFuture(QtConcurrent::run([ask = m_ask] { return traceFrontier(ask); }));
}

void FrontierPage::showTraced(FrontierTraced traced)
{
    FrontierPicture picture;
    picture.against = m_ask.against;
    picture.currency = m_bench.currency();
    picture.floor = m_ask.tier.advertisedFloor;
    picture.curve = std::move(traced.curve);
    picture.worked = m_bench.candidate();
    if (const TierCase* tc = m_bench.tierCase()) {
        for (const Unit& unit : m_ask.tier.units)
            picture.total += unit.onOffer() ? unit.asking : Price{};
        picture.heading = tr("%1 · %2 · trade-off").arg(isolated(tc->tier.site), isolated(tc->tier.name));
        const int candidates = static_cast<int>(tc->candidates.size());
        for (int candidate = -1; candidate < candidates; ++candidate) {
            const QString name =
                candidate < 0 ? tr("current") : QString::fromStdString(tc->candidates[static_cast<std::size_t>(candidate)].name);
            if (auto mark = frontierMark(m_ask, name, candidate, pricesOf(*tc, candidate)))
                picture.marks.push_back(*std::move(mark));
        }
    }
    if (picture.curve.empty())
        picture.note = emptyText(traced.why);
    const QString said = picture.curve.empty() ? picture.note : sentence(picture);
    m_ui->frontierSaid->setText(said);
    m_ui->frontierPlot->show(std::move(picture));
}

// Words --------------------------------------------------------------------------------------------------------------

QString FrontierPage::emptyText(const LeastChangeAnswer& why) const
{
    if (!m_bench.tierCase())
        return tr("Choose a tier in the worklist.");
    if (m_ask.against == Against::total && m_ask.model.kind == ModelKind::fitted)
        return tr("Against the asking total nothing is traced under the fitted range. The perceived range is the nearest model.");
    ChangeWish wish = m_ask.wish;
    wish.target = {TargetKind::gap, 0};
    const QString obstacle = obstacleText(why, m_ask.tier, wish, m_bench.currency());
    return obstacle.isEmpty() ? tr("There is no trade-off to show here.") : obstacle;
}

QString FrontierPage::sentence(const FrontierPicture& picture) const
{
    const auto money = [&](double minor) { return moneyText(minor, picture.currency); };
    const auto& curve = picture.curve;
    const FrontierPoint& last = curve.back();
    if (picture.against == Against::total) {
        const auto today = std::ranges::min_element(curve, {}, [](const FrontierPoint& p) { return std::abs(p.totalChange); });
        return tr("However much prices change: at today's asking total the smallest gap is about %1, at %2 it is %3, at %4 it is %5.")
            .arg(money(today->gap), signedMoneyText(curve.front().totalChange, picture.currency), money(curve.front().gap),
                 signedMoneyText(last.totalChange, picture.currency), money(last.gap));
    }
    if (curve.size() == 1)
        return tr("Within rules, order and asking total the gap cannot be made smaller than %1.").arg(money(last.gap));
    const double half = (curve.front().gap + last.gap) / 2;
    const auto middle = std::ranges::find_if(curve, [half](const FrontierPoint& p) { return p.gap <= half + 1e-9; });
    return tr("From a gap of %1 down to %2 at best, for a typical change of %3 a unit. Half of that way takes %4.")
        .arg(money(curve.front().gap), money(last.gap), money(last.rmsChange), money(middle->rmsChange));
}

// What is done with it -----------------------------------------------------------------------------------------------

void FrontierPage::takePoint(int point)
{
    const auto& curve = m_ui->frontierPlot->picture().curve;
    if (m_tracing || !m_bench.tierCase() || point < 0 || point >= static_cast<int>(curve.size()))
        return;
    const FrontierPoint at = curve[static_cast<std::size_t>(point)];
    ChangeWish wish = m_ask.wish;
    // A whole minor unit, so that the name says what was asked for.
    wish.target = {TargetKind::gap, std::ceil(at.gap - 1e-6)};
    if (m_ask.against == Against::total)
        wish.total.changePercent = 100 * std::round(at.totalChange) / inMinor(m_ui->frontierPlot->picture().total);
    const LeastChangeAnswer& answer = m_solver.solve(m_ask.tier, m_ask.model, m_ask.rules, wish);
    if (answer.obstacle != Obstacle::none) {
        emit told(obstacleText(answer, m_ask.tier, wish, m_bench.currency()));
        return;
    }
    const QString rounding = answer.targetMet && answer.totalMiss == Price{} ? QString() : roundingText(answer, m_bench.currency());
    QString name = leastChangeName(wish.target, m_bench.currency());
    if (m_ask.against == Against::total)
        name = tr("%1, total %2").arg(name, signedMoneyText(std::round(at.totalChange), m_bench.currency()));
    if (!m_bench.beginTrial(name))
        return;
    m_bench.tryPrices(answer.prices);
    m_bench.finishGesture();
    if (!rounding.isEmpty())
        emit told(tr("%1. %2").arg(name, rounding));
}

void FrontierPage::saveTable()
{
    const QString suggestion = fileNameFrom(
        {QString::fromStdString(m_ask.tier.site), QString::fromStdString(m_ask.tier.name), tr("trade-off")}, QStringLiteral("csv"));
    const QString chosen = m_questions.savePath(this, tr("Save the table"), suggestion, tr("Comma-separated table (*.csv)"));
    if (chosen.isEmpty())
        return;
    const QString path = withSuffix(chosen, QStringLiteral("csv"));
    const auto written = writeWhole(path, frontierCsv(m_ui->frontierPlot->picture()));
    if (written.ok())
        emit told(tr("Table saved as %1. %2").arg(QFileInfo(path).fileName(), cautionText()));
    else
        m_questions.tell(this, tr("The table was not saved."), QString::fromStdString(written.trouble()));
}

} // namespace rungwright
