// SPDX-License-Identifier: GPL-3.0-or-later
#include "bench_page.h"

#include "bench_plots.h"
#include "candidates_panel.h"
#include "file_names.h"
#include "ladder_plot.h"
#include "look.h"
#include "questions.h"
#include "ui_bench_page.h"
#include "wording.h"

#include <QEvent>

namespace rungwright
{

namespace
{

/// The least value of a spin box stands for "as the tier has it".
constexpr int kAsNow = 0;

} // namespace

BenchPage::BenchPage(Workbench& bench, Questions& questions, QWidget* parent) :
    QWidget(parent), m_bench(bench), m_questions(questions), m_ui(std::make_unique<Ui::BenchPage>())
{
    m_ui->setupUi(this);
    m_ui->benchPlots->setWorkbench(&bench);
    m_ui->candidatesPanel->attach(bench, questions);
    m_ui->benchSplitter->setStretchFactor(0, 1);
    m_ui->benchSplitter->setStretchFactor(1, 0);
    fillModels();
    servePictures();
    dressLabels();

    m_ui->leftBox->setKeyboardTracking(false);
    m_ui->loadBox->setKeyboardTracking(false);
    m_ui->loadBox->setRange(0.0, 100000.0);
    m_ui->loadBox->setDecimals(4);
    m_ui->loadBox->setSpecialValueText(tr("inferred"));

    connect(m_ui->modelBox, &QComboBox::activated, this, [this] {
        // Choosing the model there is already must not write back what the boxes only show.
        if (m_ui->modelBox->currentData().toInt() != static_cast<int>(m_bench.settings().kind))
            applyModel();
    });
    connect(m_ui->leftBox, &QSpinBox::valueChanged, this, &BenchPage::applyModel);
    connect(m_ui->loadBox, &QDoubleSpinBox::valueChanged, this, &BenchPage::applyModel);
    connect(m_ui->holdTotalBox, &QCheckBox::toggled, &bench, &Workbench::setHoldTotal);
    connect(m_ui->benchPlots->ladder(), &LadderPlot::priceEditRequested, this, &BenchPage::askPrice);
    connect(&bench, &Workbench::reset, this, [this] {
        showTitle();
        showModel();
        showReading();
    });
    connect(&bench, &Workbench::moving, this, &BenchPage::showReading);
    connect(&bench, &Workbench::gestureChanged, this, &BenchPage::showTitle);
    showTitle();
    showModel();
    showReading();
}

BenchPage::~BenchPage() = default;

BenchPlots& BenchPage::plots() { return *m_ui->benchPlots; }

CandidatesPanel& BenchPage::candidates() { return *m_ui->candidatesPanel; }

void BenchPage::servePictures()
{
    for (PaperPlot* plot : std::initializer_list<PaperPlot*>{plots().ladder(), plots().curtain(), plots().thinning()}) {
        plot->setAskPath([this](QWidget* over, const QString& title, const QString& suggestion, const QString& filter) {
            const QString path = m_questions.savePath(over, title, suggestion, filter);
            return path.isEmpty() ? path : withSuffix(path, QStringLiteral("png"));
        });
        connect(plot, &PaperPlot::told, this, &BenchPage::told);
        connect(plot, &PaperPlot::saveFailed, this,
                [this](const QString& reason) { m_questions.tell(window(), tr("The picture was not saved."), reason); });
    }
}

void BenchPage::fillModels()
{
    for (const ModelKind kind : kModels) {
        m_ui->modelBox->addItem(modelName(kind), static_cast<int>(kind));
        m_ui->modelBox->setItemData(m_ui->modelBox->count() - 1, modelExplanation(kind), Qt::ToolTipRole);
    }
}

void BenchPage::dressLabels()
{
    QFont title = font();
    title.setWeight(QFont::DemiBold);
    m_ui->tierTitle->setFont(title);
    QFont headline = font();
    headline.setPointSizeF(headline.pointSizeF() * 2.1);
    headline.setWeight(QFont::DemiBold);
    m_ui->gapHeadline->setFont(headline);
    QFont share = font();
    share.setPointSizeF(share.pointSizeF() * 1.4);
    m_ui->gapShare->setFont(share);
    m_ui->gapShare->setContentsMargins(0, 0, 0, 5); // onto the headline's base line
    // Two lines, always: the plots below must not jump when the sentence grows by a word during a drag.
    m_ui->readingSentence->setFixedHeight(2 * fontMetrics().lineSpacing() + 2);
    const Look& look = Look::of(this);
    QPalette faint = palette();
    faint.setColor(QPalette::WindowText, look.faintInk);
    m_ui->gapShare->setPalette(faint);
    m_ui->workingOn->setPalette(faint);
    QPalette gap = palette();
    gap.setColor(QPalette::WindowText, look.gapLine);
    m_ui->gapHeadline->setPalette(gap);
}

void BenchPage::changeEvent(QEvent* event)
{
    QWidget::changeEvent(event);
    if (event->type() == QEvent::PaletteChange || event->type() == QEvent::FontChange)
        dressLabels();
}

void BenchPage::showReading()
{
    if (!m_bench.tierCase()) {
        m_ui->gapHeadline->setText(tr("No tier on the bench"));
        m_ui->gapShare->clear();
        m_ui->readingSentence->setText(tr("Choose one in the worklist."));
        return;
    }
    const Reading r = reading(m_bench.worked(), m_bench.currency());
    m_ui->gapHeadline->setText(r.headline);
    m_ui->gapShare->setText(r.share);
    m_ui->readingSentence->setText(r.sentence);
    m_ui->readingSentence->setToolTip(r.sentence);
}

void BenchPage::showTitle()
{
    const TierCase* tc = m_bench.tierCase();
    m_ui->holdTotalBox->setEnabled(tc);
    if (!tc) {
        m_ui->tierTitle->clear();
        m_ui->workingOn->clear();
        return;
    }
    const Measurement& m = m_bench.current();
    const QString title = tr("%1 · %2").arg(QString::fromStdString(tc->tier.site), QString::fromStdString(tc->tier.name));
    m_ui->tierTitle->setText(title);
    m_ui->tierTitle->setToolTip(title);
    if (m_bench.gesture() == Workbench::Gesture::trial)
        m_ui->workingOn->setText(tr("%1 of %2 on offer · a trial, not kept yet").arg(m.onOffer).arg(m.rentable));
    else if (m_bench.candidate() < 0)
        m_ui->workingOn->setText(tr("%1 of %2 on offer · current ladder").arg(m.onOffer).arg(m.rentable));
    else
        m_ui->workingOn->setText(tr("%1 of %2 on offer · working on “%3”").arg(m.onOffer).arg(m.rentable).arg(m_bench.candidateName()));
    m_ui->workingOn->setToolTip(m_bench.candidate() < 0 ? tr("The current ladder is never altered: a first change makes a candidate.")
                                                        : QString());
}

void BenchPage::showModel()
{
    m_showing = true;
    const ModelSettings& s = m_bench.settings();
    const Measurement& m = m_bench.worked();
    m_ui->modelBox->setCurrentIndex(m_ui->modelBox->findData(static_cast<int>(s.kind)));
    m_ui->modelBox->setToolTip(modelExplanation(s.kind));
    m_ui->modelBox->setEnabled(m_bench.tierCase());
    const bool left = takesLeft(s.kind);
    m_ui->leftLabel->setVisible(left);
    m_ui->leftBox->setVisible(left);
    m_ui->leftBox->setEnabled(m_bench.tierCase() && m.rentable > 0);
    m_ui->leftBox->setRange(kAsNow, qMax(s.left.value_or(1), static_cast<int>(m.rentable)));
    m_ui->leftBox->setSpecialValueText(tr("as now (%1)").arg(m.onOffer));
    m_ui->leftBox->setValue(s.left.value_or(kAsNow));
    const bool load = s.kind == ModelKind::turnover;
    m_ui->loadLabel->setVisible(load);
    m_ui->loadBox->setVisible(load);
    if (m.odds.load && !s.load)
        m_ui->loadBox->setSpecialValueText(tr("inferred (%1)").arg(numberText(*m.odds.load)));
    else
        m_ui->loadBox->setSpecialValueText(tr("inferred"));
    m_ui->loadBox->setValue(s.load.value_or(0.0));
    m_ui->holdTotalBox->setChecked(m_bench.holdsTotal());
    m_showing = false;
}

void BenchPage::applyModel()
{
    if (m_showing || !m_bench.tierCase())
        return;
    ModelSettings s = m_bench.settings();
    const ModelKind was = s.kind;
    s.kind = static_cast<ModelKind>(m_ui->modelBox->currentData().toInt());
    if (s.kind == was) {
        const int left = m_ui->leftBox->value();
        const double load = m_ui->loadBox->value();
        if (takesLeft(s.kind))
            s.left = left == kAsNow ? std::nullopt : std::optional(left);
        if (s.kind == ModelKind::turnover)
            s.load = load <= 0 ? std::nullopt : std::optional(load);
    }
    QString name = tr("Model: %1").arg(modelName(s.kind));
    if (s.kind == was && takesLeft(s.kind))
        name = s.left ? (*s.left == 1 ? tr("1 unit left") : tr("%1 units left").arg(*s.left)) : tr("Units left as now");
    else if (s.kind == was && s.kind == ModelKind::turnover)
        name = s.load ? tr("Offered load %1").arg(numberText(*s.load)) : tr("Offered load inferred");
    m_bench.document().setModel(m_bench.tier(), s, name);
}

void BenchPage::askPrice(std::uint32_t unit)
{
    const TierCase* tc = m_bench.tierCase();
    const QString name = QString::fromStdString(tc->tier.units[unit].name);
    QString label = tr("Asking price:");
    QString answer = moneyText(m_bench.workedPrices()[unit], m_bench.currency());
    while (true) {
        answer = m_questions.text(window(), tr("Price of %1").arg(name), label, answer);
        if (answer.isNull())
            return;
        const auto price = moneyFromText(answer, m_bench.currency());
        if (price && price->minor > 0) {
            m_bench.setPrice(unit, *price);
            return;
        }
        label = tr("That is not a price above zero. Asking price, for example %1:")
                    .arg(moneyText(m_bench.workedPrices()[unit], m_bench.currency()));
    }
}

} // namespace rungwright
