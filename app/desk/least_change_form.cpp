// SPDX-License-Identifier: GPL-3.0-or-later
#include "least_change_form.h"

#include "axis_ticks.h"
#include "ladder_change.h"
#include "reshape_words.h"
#include "spin_values.h"
#include "ui_least_change_form.h"
#include "wording.h"

#include <QScopedValueRollback>

#include <algorithm>
#include <cmath>
#include <utility>

namespace rungwright
{

namespace
{

/// Steps of a money slider from nothing to today's gap, about.
constexpr double kSliderSteps = 200;

constexpr std::array kTargets{TargetKind::gap, TargetKind::gapShare, TargetKind::floorMet, TargetKind::none};

/// Today's figure that the target begins from, as the spin box shows it: money in major units, shares in percent.
std::optional<double> shownToday(const Measurement& today, TargetKind kind, const Currency& currency)
{
    switch (kind) {
    case TargetKind::none:
        break;
    case TargetKind::gap:
        return today.gap.gap ? std::optional(currency.major(std::ceil(*today.gap.gap - 1e-6))) : std::nullopt;
    case TargetKind::gapShare:
        return today.gap.gapShare ? std::optional(std::ceil(1000 * *today.gap.gapShare - 1e-6) / 10) : std::nullopt;
    case TargetKind::floorMet:
        return today.gap.chanceFloorMet && today.gap.gap ? std::optional(std::floor(1000 * *today.gap.chanceFloorMet + 1e-6) / 10)
                                                         : std::nullopt;
    }
    return {};
}

} // namespace

LeastChangeForm::LeastChangeForm(QWidget* parent) : QWidget(parent), m_ui(std::make_unique<Ui::LeastChangeForm>())
{
    m_ui->setupUi(this);
    const auto touched = [this] {
        if (m_showing)
            return;
        showChoices();
        tryNow();
    };
    connect(m_ui->targetBox, &QComboBox::currentIndexChanged, this, [this] {
        if (m_showing || !m_bench)
            return;
        // What is tried was for another aim: the slider now stands at today's figure, and so does the bench.
        if (m_bench->gesture() == Workbench::Gesture::trial)
            m_bench->giveUpGesture();
        fitTarget(false);
        showChoices();
        if (kind() == TargetKind::none)
            tryNow();
    });
    connect(m_ui->targetSlider, &QSlider::valueChanged, this, [this](int place) {
        if (m_showing)
            return;
        setTarget(place == m_ui->targetSlider->maximum() ? m_ui->targetSpin->maximum() : place * m_step);
        tryNow();
    });
    onNewValue(*m_ui->targetSpin, this, [this](double shown) {
        if (m_showing)
            return;
        setTarget(shown);
        tryNow();
    });
    for (QComboBox* box : {m_ui->totalBox, m_ui->orderBox, m_ui->weightBox})
        connect(box, &QComboBox::currentIndexChanged, this, touched);
    onNewValue(*m_ui->totalSpin, this, [touched](double) { touched(); });
    connect(m_ui->takenBox, &QCheckBox::toggled, this, touched);
    connect(m_ui->nearestButton, &QPushButton::clicked, this, &LeastChangeForm::useNearest);
    m_ui->nearestButton->hide();
    // Four lines of words or two: what stands below must not jump while the slider moves.
    m_ui->saidLabel->setMinimumHeight(4 * fontMetrics().lineSpacing());
}

LeastChangeForm::~LeastChangeForm() = default;

void LeastChangeForm::attach(Workbench& bench)
{
    m_bench = &bench;
    connect(&bench, &Workbench::reset, this, &LeastChangeForm::onReset);
    connect(&bench, &Workbench::gestureChanged, this, [this] {
        if (!m_trying && m_bench->gesture() != Workbench::Gesture::trial)
            showNothing();
    });
    onReset();
}

void LeastChangeForm::focusTarget() { m_ui->targetSlider->setFocus(); }

TargetKind LeastChangeForm::kind() const { return kTargets[static_cast<std::size_t>(std::max(0, m_ui->targetBox->currentIndex()))]; }

// The target's slider ------------------------------------------------------------------------------------------------

void LeastChangeForm::onReset()
{
    if (m_trying)
        return;
    if (m_bench->tierCase())
        takeOrderOfRules();
    fitTarget(true);
    showChoices();
    if (m_bench->gesture() != Workbench::Gesture::trial)
        showNothing();
}

void LeastChangeForm::takeOrderOfRules()
{
    const std::tuple now(tier().site, tier().name, m_bench->rules().order);
    if (m_orderOf == now)
        return;
    m_orderOf = now;
    const QScopedValueRollback<bool> showing(m_showing, true);
    m_ui->orderBox->setCurrentIndex(m_bench->rules().order == OrderKept::grade ? 1 : 0);
}

void LeastChangeForm::fitTarget(bool keepValue)
{
    const QScopedValueRollback<bool> showing(m_showing, true);
    QDoubleSpinBox* spin = m_ui->targetSpin;
    QSlider* slider = m_ui->targetSlider;
    const bool there = m_bench->tierCase() != nullptr;
    const auto today = there ? shownToday(m_bench->current(), kind(), m_bench->currency()) : std::nullopt;
    for (QWidget* widget : std::initializer_list<QWidget*>{spin, slider})
        widget->setEnabled(today.has_value());
    if (!today) {
        m_fitted.reset();
        slider->setRange(0, 0);
        return;
    }
    Fitted now{tier().site, tier().name, kind(), m_bench->settings(), *today};
    if (keepValue && m_fitted == now)
        return;
    m_fitted = std::move(now);
    const bool money = kind() == TargetKind::gap;
    const bool met = kind() == TargetKind::floorMet;
    const int decimals = money ? m_bench->currency().decimals : 1;
    const double least = std::pow(10.0, -decimals);
    // Of the floor met, from today's share up to everybody; of a gap, from nothing up to today's.
    const double top = met ? 100 : std::max(*today, least);
    m_step = met     ? 1
             : money ? least * roundStep(top / least / kSliderSteps)
                     : std::max(least, least * roundStep(top / least / kSliderSteps));
    spin->setDecimals(decimals);
    spin->setRange(met ? least : 0, top);
    spin->setSingleStep(m_step);
    spin->setSuffix(money ? QString() : QStringLiteral(" %"));
    slider->setRange(0, static_cast<int>(std::ceil(top / m_step - 1e-9)));
    slider->setPageStep(std::max(1, slider->maximum() / 10));
    setTarget(std::max(*today, spin->minimum()));
}

/// Puts slider and spin box to a target, without trying it.
void LeastChangeForm::setTarget(double shown)
{
    const QScopedValueRollback<bool> showing(m_showing, true);
    m_ui->targetSpin->setValue(shown);
    m_ui->targetSlider->setValue(static_cast<int>(std::lround(m_ui->targetSpin->value() / m_step)));
}

// The wish -----------------------------------------------------------------------------------------------------------

ChangeTarget LeastChangeForm::target() const
{
    const double shown = m_ui->targetSpin->value();
    switch (kind()) {
    case TargetKind::none:
        break;
    case TargetKind::gap:
        return {TargetKind::gap, std::round(shown * static_cast<double>(m_bench->currency().minorPerMajor()))};
    case TargetKind::gapShare:
        return {TargetKind::gapShare, shown / 100};
    case TargetKind::floorMet:
        return {TargetKind::floorMet, shown / 100};
    }
    return {};
}

ChangeWish LeastChangeForm::wish() const
{
    ChangeWish wish;
    wish.order = m_ui->orderBox->currentIndex() == 1 ? OrderKept::grade : OrderKept::present;
    wish.target = target();
    wish.total.free = m_ui->totalBox->currentIndex() == totalFree;
    wish.total.changePercent = m_ui->totalBox->currentIndex() == totalChanged ? m_ui->totalSpin->value() : 0;
    wish.takenStay = modelUnits(m_bench->settings().kind) != Among::onOffer && m_ui->takenBox->isChecked();
    return wish;
}

void LeastChangeForm::showChoices()
{
    const bool there = m_bench && m_bench->tierCase();
    m_ui->totalSpin->setVisible(m_ui->totalBox->currentIndex() == totalChanged);
    // Under the other models taken units are not looked at, and stay.
    m_ui->takenBox->setVisible(there && modelUnits(m_bench->settings().kind) != Among::onOffer);
    for (QWidget* widget : std::initializer_list<QWidget*>{m_ui->targetBox, m_ui->totalBox, m_ui->orderBox, m_ui->weightBox})
        widget->setEnabled(there);
}

void LeastChangeForm::tryNow()
{
    if (!m_bench || !m_bench->tierCase())
        return;
    const QScopedValueRollback<bool> trying(m_trying, true);
    m_solved = wish();
    if (m_ui->weightBox->currentIndex() == 1) {
        m_weights.clear();
        for (const Unit& unit : tier().units)
            m_weights.push_back(1 / (inMinor(unit.asking) * inMinor(unit.asking)));
        m_solved.weights = m_weights;
    }
    const LeastChangeAnswer& answer = m_solver.solve(tier(), m_bench->settings(), m_bench->rules(), m_solved);
    m_answer = answer;
    if (answer.obstacle == Obstacle::none && m_bench->beginTrial(leastChangeName(m_solved.target, m_bench->currency())))
        m_bench->tryPrices(answer.prices);
    else if (m_bench->gesture() == Workbench::Gesture::trial)
        m_bench->giveUpGesture();
    showAnswer();
}

void LeastChangeForm::useNearest()
{
    const auto nearest = nearestTarget(m_answer, tier(), m_solved);
    if (!nearest)
        return;
    setTarget(nearest->kind == TargetKind::gap ? m_bench->currency().major(nearest->value) : 100 * nearest->value);
    tryNow();
    focusTarget();
}

// What it comes to ---------------------------------------------------------------------------------------------------

void LeastChangeForm::setFigure(const QLabel& name, QLabel& value, const QString& text)
{
    value.setText(text);
    value.setAccessibleName(tr("%1: %2").arg(name.text(), text));
}

void LeastChangeForm::showNothing()
{
    const std::initializer_list<std::pair<const QLabel*, QLabel*>> figures{
        {m_ui->changedName, m_ui->changedValue}, {m_ui->typicalName, m_ui->typicalValue}, {m_ui->greatestName, m_ui->greatestValue},
        {m_ui->reachedName, m_ui->gapValue},     {m_ui->metName, m_ui->metValue},         {m_ui->totalName, m_ui->totalValue}};
    for (const auto& [name, value] : figures)
        setFigure(*name, *value, undefinedText());
    m_ui->nearestButton->hide();
    if (!m_bench->tierCase())
        m_ui->saidLabel->setText(tr("Choose a tier in the worklist."));
    else if (!tier().hasFloor())
        m_ui->saidLabel->setText(
            tr("No advertised floor is known, so there is no gap to aim at. Order and total can be put right all the same."));
    else if (!m_bench->current().gap.gap)
        m_ui->saidLabel->setText(m_bench->current().odds.note ? oddsNoteText(*m_bench->current().odds.note)
                                                              : tr("There is no gap to aim at."));
    else
        m_ui->saidLabel->setText(tr("Move the slider: the ladder follows at once. Nothing is kept until you say so."));
}

void LeastChangeForm::showAnswer()
{
    const Currency& currency = m_bench->currency();
    if (m_answer.obstacle != Obstacle::none) {
        showNothing();
        QStringList said{obstacleText(m_answer, tier(), m_solved, currency)};
        said += easingTexts(m_answer, m_solved, currency);
        m_ui->saidLabel->setText(said.join(QLatin1Char(' ')));
        m_ui->nearestButton->setVisible(nearestTarget(m_answer, tier(), m_solved).has_value());
        return;
    }
    m_ui->nearestButton->hide();
    const LadderChange change = ladderChange(tier().units, m_answer.prices);
    setFigure(*m_ui->changedName, *m_ui->changedValue, tr("%1 of %2").arg(m_answer.changed).arg(m_solver.chain().places.size()));
    setFigure(*m_ui->typicalName, *m_ui->typicalValue, moneyText(m_answer.rms, currency));
    QString greatest = undefinedText();
    if (change.greatest)
        greatest = signedMoneyText(inMinor(*change.greatest), currency);
    setFigure(*m_ui->greatestName, *m_ui->greatestValue, greatest);
    QString gap = undefinedText();
    if (m_answer.gap)
        gap = tr("%1 (%2)").arg(moneyText(*m_answer.gap, currency), percentText(*m_answer.gap / inMinor(tier().advertisedFloor), true));
    setFigure(*m_ui->reachedName, *m_ui->gapValue, gap);
    setFigure(*m_ui->metName, *m_ui->metValue, m_answer.floorMet ? percentText(*m_answer.floorMet, true) : undefinedText());
    const double by = inMinor(m_answer.total - m_solver.chain().total);
    const QString total = moneyText(m_answer.total, currency);
    setFigure(*m_ui->totalName, *m_ui->totalValue,
              by == 0 ? tr("%1 (as today)").arg(total) : tr("%1 (%2)").arg(total, signedMoneyText(by, currency)));
    QStringList said;
    if (m_answer.changed == 0)
        said << tr("Today's ladder is as wished: nothing to change.");
    else
        said << roundingText(m_answer, currency);
    if (!m_answer.exact)
        said << tr("Under the fitted range a somewhat smaller change may do as well.");
    m_ui->saidLabel->setText(said.join(QLatin1Char(' ')));
}

} // namespace rungwright
