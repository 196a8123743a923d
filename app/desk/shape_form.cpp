// SPDX-License-Identifier: GPL-3.0-or-later
#include "shape_form.h"

#include "ladder_change.h"
#include "rules_text.h"
#include "spin_values.h"
#include "table_text.h"
#include "ui_shape_form.h"
#include "wording.h"

#include <QHeaderView>
#include <QScopedValueRollback>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

/// Either side: the power shapes end at a third.
constexpr double kMostLean = 0.32;
constexpr double kLeanPlaces = 1000;

} // namespace

ShapeForm::ShapeForm(QWidget* parent) : QWidget(parent), m_ui(std::make_unique<Ui::ShapeForm>())
{
    m_ui->setupUi(this);
    QTableWidget* table = m_ui->stepsTable;
    table->setHorizontalHeaderLabels({tr("Price"), tr("Share, %")});
    table->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
    for (int row = 0; row < table->rowCount(); ++row) {
        for (int column = 0; column < table->columnCount(); ++column) {
            auto* cell = new QTableWidgetItem;
            cell->setTextAlignment(Qt::AlignRight | Qt::AlignVCenter);
            table->setItem(row, column, cell);
        }
    }
    table->setFixedHeight(table->rowCount() * (fontMetrics().height() + 8) + table->horizontalHeader()->sizeHint().height() + 2);
    makeCopyable(*table);
    m_ui->saidLabel->setMinimumHeight(4 * fontMetrics().lineSpacing());
    connectFields();
    showChoices();
}

ShapeForm::~ShapeForm() = default;

void ShapeForm::connectFields()
{
    const auto touched = [this] {
        if (!m_showing)
            tryNow();
    };
    connect(m_ui->kindBox, &QComboBox::currentIndexChanged, this, [this] {
        showChoices();
        if (!m_showing)
            tryNow(); // steps that are not written down yet are asked for
    });
    connect(m_ui->leanSlider, &QSlider::valueChanged, this, [this](int place) {
        if (m_showing)
            return;
        showLean(place / kLeanPlaces);
        tryNow();
    });
    onNewValue(*m_ui->leanSpin, this, [this](double lean) {
        if (m_showing)
            return;
        showLean(lean);
        tryNow();
    });
    for (QDoubleSpinBox* spin : {m_ui->floorSpin, m_ui->topSpin, m_ui->alphaSpin, m_ui->betaSpin})
        onNewValue(*spin, this, [touched](double) { touched(); });
    connect(m_ui->orderBox, &QComboBox::currentIndexChanged, this, touched);
    for (QCheckBox* box : {m_ui->takenBox, m_ui->pointsBox, m_ui->rulesBox})
        connect(box, &QCheckBox::toggled, this, touched);
    connect(m_ui->rulesBox, &QCheckBox::toggled, this, &ShapeForm::showChoices);
    connect(m_ui->stepsTable, &QTableWidget::itemChanged, this, touched);
    connect(m_ui->likeTodayButton, &QPushButton::clicked, this, [this] {
        takeWeightsOfToday();
        tryNow();
    });
    connect(m_ui->tryButton, &QPushButton::clicked, this, &ShapeForm::tryNow);
}

void ShapeForm::attach(Workbench& bench)
{
    m_bench = &bench;
    connect(&bench, &Workbench::reset, this, &ShapeForm::onReset);
    connect(&bench, &Workbench::gestureChanged, this, [this] {
        if (!m_trying && m_bench->gesture() != Workbench::Gesture::trial)
            showNothing();
    });
    onReset();
}

void ShapeForm::focusFirst() { m_ui->kindBox->setFocus(); }

ShapeForm::Kind ShapeForm::kind() const { return static_cast<Kind>(std::max(0, m_ui->kindBox->currentIndex())); }

Among ShapeForm::among() const { return m_ui->takenBox->isChecked() ? Among::onOffer : Among::rentable; }

// From today's ladder ------------------------------------------------------------------------------------------------

void ShapeForm::onReset()
{
    if (m_trying)
        return;
    const bool there = m_bench->tierCase() != nullptr;
    setEnabled(there);
    const auto now = m_bench->currentPrices();
    const bool same = there && tier().site == m_fittedSite && tier().name == m_fittedTier &&
                      std::equal(now.begin(), now.end(), m_fittedPrices.begin(), m_fittedPrices.end());
    if (there)
        takeOrderOfRules();
    if (there && !same)
        beginFromToday();
    if (m_bench->gesture() != Workbench::Gesture::trial)
        showNothing();
}

void ShapeForm::takeOrderOfRules()
{
    const std::tuple now(tier().site, tier().name, m_bench->rules().order);
    if (m_orderOf == now)
        return;
    m_orderOf = now;
    const QScopedValueRollback<bool> showing(m_showing, true);
    m_ui->orderBox->setCurrentIndex(m_bench->rules().order == OrderKept::grade ? 1 : 0);
}

void ShapeForm::beginFromToday()
{
    const QScopedValueRollback<bool> showing(m_showing, true);
    m_fittedSite = tier().site;
    m_fittedTier = tier().name;
    m_fittedPrices.assign(m_bench->currentPrices().begin(), m_bench->currentPrices().end());
    const Currency& currency = m_bench->currency();
    const auto ladder = sortedLadder(tier().units, m_bench->currentPrices(), among());
    for (QDoubleSpinBox* spin : {m_ui->floorSpin, m_ui->topSpin}) {
        spin->setDecimals(currency.decimals);
        spin->setRange(currency.major(1), currency.major(inMinor(kGreatestPrice)));
        spin->setSingleStep(currency.major(std::max(1.0, inMinor(m_bench->rules().points.step))));
        spin->setGroupSeparatorShown(true);
    }
    if (ladder.empty())
        return;
    m_ui->floorSpin->setValue(currency.major(inMinor(ladder.front().price)));
    m_ui->topSpin->setValue(currency.major(inMinor(ladder.back().price)));
    const auto moments = unitLMoments(ladder);
    showLean(moments ? moments->skewness : 0);
    takeWeightsOfToday();
}

void ShapeForm::takeWeightsOfToday()
{
    const QScopedValueRollback<bool> showing(m_showing, true);
    const auto moments = unitLMoments(sortedLadder(tier().units, m_bench->currentPrices(), among()));
    const auto beta = moments ? betaFromLMoments(moments->mean, moments->scale) : std::nullopt;
    m_ui->alphaSpin->setValue(beta ? beta->alpha : 1);
    m_ui->betaSpin->setValue(beta ? beta->beta : 1);
}

// What the form says -------------------------------------------------------------------------------------------------

void ShapeForm::showLean(double lean)
{
    const QScopedValueRollback<bool> showing(m_showing, true);
    lean = std::clamp(lean, -kMostLean, kMostLean);
    m_ui->leanSpin->setValue(lean);
    m_ui->leanSlider->setValue(static_cast<int>(std::lround(m_ui->leanSpin->value() * kLeanPlaces)));
    const double shown = m_ui->leanSpin->value();
    m_ui->leanSaid->setText(shown < -0.005  ? tr("Leans left: prices crowd near the top.")
                            : shown > 0.005 ? tr("Leans right: prices crowd near the floor.")
                                            : tr("Even: leans nowhere."));
}

void ShapeForm::showChoices()
{
    m_ui->leanPage->setVisible(kind() == oneLean);
    m_ui->betaPage->setVisible(kind() == twoWeights);
    m_ui->evenPage->setVisible(kind() == evenSteps);
    m_ui->stepsPage->setVisible(kind() == priceSteps);
    const bool ends = kind() != priceSteps;
    for (QWidget* widget : std::initializer_list<QWidget*>{m_ui->floorLabel, m_ui->floorSpin, m_ui->topLabel, m_ui->topSpin})
        widget->setVisible(ends);
    m_ui->pointsBox->setEnabled(!m_ui->rulesBox->isChecked()); // the rules hold prices on their points
}

Outcome<std::vector<PriceStep>> ShapeForm::readSteps() const
{
    std::vector<PriceStep> steps;
    const Currency& currency = m_bench->currency();
    for (int row = 0; row < m_ui->stepsTable->rowCount(); ++row) {
        const QString price = m_ui->stepsTable->item(row, 0)->text().trimmed();
        const QString share = m_ui->stepsTable->item(row, 1)->text().trimmed();
        if (price.isEmpty() && share.isEmpty())
            continue;
        const auto amount = readAmount(price, currency);
        if (!amount.ok() || !amount.value())
            return Trouble{tr("Row %1: “%2” is no price. Write it as %3.")
                               .arg(row + 1)
                               .arg(price, moneyText(Price{79 * currency.minorPerMajor()}, currency))
                               .toStdString()};
        const auto percent = readPercent(share);
        if (!percent.ok() || !percent.value())
            return Trouble{tr("Row %1: “%2” is no share of the units. Write it as 25.").arg(row + 1).arg(share).toStdString()};
        steps.push_back({*amount.value(), *percent.value() / 100});
    }
    if (steps.empty())
        return Trouble{tr("Write at least one price and its share of the units.").toStdString()};
    return steps;
}

Outcome<LadderShape> ShapeForm::shape() const
{
    LadderShape shape;
    const auto minor = [this](const QDoubleSpinBox* spin) {
        return Price{std::llround(spin->value() * static_cast<double>(m_bench->currency().minorPerMajor()))};
    };
    shape.floor = minor(m_ui->floorSpin);
    shape.top = minor(m_ui->topSpin);
    switch (kind()) {
    case oneLean:
        shape.beta = betaFromLean(m_ui->leanSpin->value()).value_or(BetaShape{});
        break;
    case twoWeights:
        shape.beta = {m_ui->alphaSpin->value(), m_ui->betaSpin->value()};
        break;
    case evenSteps:
        break;
    case priceSteps: {
        auto steps = readSteps();
        if (!steps.ok())
            return Trouble{steps.trouble()};
        shape.steps = std::move(steps).value();
        break;
    }
    }
    return shape;
}

QString ShapeForm::shapeName(const LadderShape& shape) const
{
    if (kind() == priceSteps)
        return shape.steps.size() == 1 ? tr("Shape: one price") : tr("Shape: %1 price steps").arg(shape.steps.size());
    const QString from = moneyText(shape.floor, m_bench->currency());
    const QString to = moneyText(shape.top, m_bench->currency());
    if (kind() == evenSteps)
        return tr("Shape: even steps, %1 to %2").arg(from, to);
    if (kind() == twoWeights)
        return tr("Shape: weights %1 and %2, %3 to %4").arg(numberText(shape.beta.alpha), numberText(shape.beta.beta), from, to);
    return tr("Shape: lean %1, %2 to %3").arg(numberText(m_ui->leanSpin->value()), from, to);
}

void ShapeForm::tryNow()
{
    if (!m_bench || !m_bench->tierCase())
        return;
    const QScopedValueRollback<bool> trying(m_trying, true);
    const auto wanted = shape();
    ShapePlacing placing;
    placing.among = among();
    placing.order = m_ui->orderBox->currentIndex() == 1 ? OrderKept::grade : OrderKept::present;
    placing.onPricePoints = m_ui->pointsBox->isChecked();
    placing.withinRules = m_ui->rulesBox->isChecked();
    const auto prices = wanted.ok() ? shapedPrices(tier(), m_bench->rules(), wanted.value(), placing)
                                    : Outcome<std::vector<Price>>(Trouble{wanted.trouble()});
    if (!prices.ok()) {
        if (m_bench->gesture() == Workbench::Gesture::trial)
            m_bench->giveUpGesture();
        m_ui->saidLabel->setText(QString::fromStdString(prices.trouble()));
        return;
    }
    m_bench->beginTrial(shapeName(wanted.value()));
    m_bench->tryPrices(prices.value());
    say(wanted.value(), prices.value());
}

void ShapeForm::say(const LadderShape& shape, std::span<const Price> prices)
{
    const Currency& currency = m_bench->currency();
    const LadderChange change = ladderChange(tier().units, prices);
    QStringList said;
    if (change.unitsChanged == 0)
        said << tr("These are today's prices.");
    else
        said << (change.unitsChanged == 1 ? tr("%1 unit changes, by %2.") : tr("%1 units change, by %2 at most."))
                    .arg(QString::number(change.unitsChanged), signedMoneyText(inMinor(*change.greatest), currency));
    if (change.askingTotal)
        said << (*change.askingTotal == Price{}
                     ? tr("The asking total stays.")
                     : tr("The asking total changes by %1.").arg(signedMoneyText(inMinor(*change.askingTotal), currency)));
    // Rules and locks may keep units from where the shape wants them.
    const auto ladder = sortedLadder(tier().units, prices, among());
    if (!ladder.empty() && shape.steps.empty() && m_ui->rulesBox->isChecked() &&
        (ladder.front().price != shape.floor || ladder.back().price != shape.top))
        said << tr("Within rules and locks it reaches from %1 to %2.")
                    .arg(moneyText(ladder.front().price, currency), moneyText(ladder.back().price, currency));
    m_ui->saidLabel->setText(said.join(QLatin1Char(' ')));
}

void ShapeForm::showNothing()
{
    if (!m_bench->tierCase())
        m_ui->saidLabel->setText(tr("Choose a tier in the worklist."));
    else if (sortedLadder(tier().units, m_bench->currentPrices(), among()).empty())
        m_ui->saidLabel->setText(tr("No unit to shape: nothing is on offer."));
    else
        m_ui->saidLabel->setText(tr("Begins as today's ladder. Turn a dial: the ladder follows at once."));
}

} // namespace rungwright
