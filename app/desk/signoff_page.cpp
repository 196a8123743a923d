// SPDX-License-Identifier: GPL-3.0-or-later
#include "signoff_page.h"

#include "caution.h"
#include "plot_words.h"
#include "reminders.h"
#include "signoff_words.h"
#include "table_text.h"
#include "ui_signoff_page.h"
#include "wording.h"
#include "words.h"

#include <QCheckBox>
#include <QEvent>
#include <QHeaderView>

#include <algorithm>
#include <map>

namespace rungwright
{

namespace
{

const auto kPlaces = QStringLiteral("signoff/jurisdictions");
const auto kTime = QStringLiteral("signoff/leastTimeAtFloor");

} // namespace

SignOffPage::SignOffPage(Workbench& bench, Questions& questions, QSettings& settings, std::function<bool()> saveFirst, QWidget* parent) :
    QWidget(parent),
    m_bench(bench),
    m_questions(questions),
    m_settings(settings),
    m_saveFirst(std::move(saveFirst)),
    m_ui(std::make_unique<Ui::SignOffPage>())
{
    m_ui->setupUi(this);
    m_ui->signOffCaution->setText(cautionText());
    m_ui->signOffResult->hide();
    m_ui->signOffSplitter->setStretchFactor(0, 1);
    m_ui->signOffSplitter->setStretchFactor(1, 1);
    m_ui->claimsArea->setMinimumWidth(fontMetrics().averageCharWidth() * 54); // nothing in it is cut
    m_ui->signOffSplitter->setSizes({520, 480});
    prepareTable();
    prepareChecks();
    preparePlaces();
    prepareWays();
    dress();
    connect(m_ui->ladderBox, qOverload<int>(&QComboBox::activated), this, [this](int index) {
        m_pick = m_ui->ladderBox->itemData(index).toString().toStdString();
        refresh();
    });
    connect(&bench, &Workbench::reset, this, &SignOffPage::refresh);
    refresh();
}

SignOffPage::~SignOffPage() { m_ui->changesTable->setModel(nullptr); }

void SignOffPage::prepareTable()
{
    QTableView* table = m_ui->changesTable;
    QHeaderView* header = table->horizontalHeader();
    header->setHighlightSections(false);
    header->setSortIndicatorClearable(true);
    header->setSortIndicator(-1, Qt::AscendingOrder);
    table->setSortingEnabled(true);
    makeCopyable(*table);
    connect(m_ui->onlyChangedBox, &QCheckBox::toggled, this, [this](bool on) {
        if (m_filter)
            m_filter->setChangedOnly(on);
    });
    connect(m_ui->copyChangesButton, &QPushButton::clicked, this, [this] {
        const int rows = copyTable(*m_ui->changesTable, CopyPart::everything);
        emit told(tr("%1 copied. %2").arg(rows == 1 ? tr("1 row") : tr("%1 rows").arg(numberText(rows, 0)), cautionText()));
    });
}

void SignOffPage::prepareChecks()
{
    QGridLayout* grid = m_ui->checksGrid;
    grid->setColumnStretch(1, 1);
    for (int row = 0; row < 7; ++row) {
        CheckLine line{new QLabel, new QLabel};
        for (QLabel* label : {line.outcome, line.words}) {
            label->setTextFormat(Qt::PlainText);
            label->setAlignment(Qt::AlignLeft | Qt::AlignTop);
            label->setTextInteractionFlags(Qt::TextSelectableByMouse);
        }
        line.words->setWordWrap(true);
        line.words->setObjectName(QStringLiteral("check%1").arg(row));
        grid->addWidget(line.outcome, row, 0);
        grid->addWidget(line.words, row, 1);
        m_checkLines.push_back(line);
    }
    QSpinBox* least = m_ui->leastTimeBox;
    least->setSpecialValueText(tr("not set"));
    least->setValue(m_settings.value(kTime, 0).toInt());
    connect(least, qOverload<int>(&QSpinBox::valueChanged), this, [this](int percent) {
        m_settings.setValue(kTime, percent);
        refresh();
    });
}

void SignOffPage::preparePlaces()
{
    const QStringList picked = m_settings.value(kPlaces).toStringList();
    int i = 0;
    for (const Jurisdiction& place : jurisdictions()) {
        auto* box = new QCheckBox(jurisdictionName(place));
        box->setObjectName(QLatin1String("place-") + QLatin1String(place.key));
        box->setChecked(picked.contains(QLatin1String(place.key)));
        connect(box, &QCheckBox::toggled, this, [this] {
            m_settings.setValue(kPlaces, places());
            showReminders();
        });
        m_ui->placesGrid->addWidget(box, i / 2, i % 2);
        m_places.push_back(box);
        ++i;
    }
    showReminders();
}

void SignOffPage::dress()
{
    QFont title = font();
    title.setPointSizeF(title.pointSizeF() * 1.2);
    title.setWeight(QFont::DemiBold);
    m_ui->signOffTitle->setFont(title);
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    for (QLabel* label : {m_ui->checksHeading, m_ui->remindersHeading, m_ui->changesHeading, m_ui->signOffResult})
        label->setFont(strong);
    for (const CheckLine& line : m_checkLines)
        line.outcome->setFont(strong);
    m_ui->changesTable->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
}

// What is shown ------------------------------------------------------------------------------------------------------

int SignOffPage::candidateToShow() const
{
    const TierCase& tierCase = *m_bench.tierCase();
    if (m_pick) {
        if (m_pick->empty())
            return -1;
        const auto found = std::ranges::find(tierCase.candidates, *m_pick, &Candidate::name);
        if (found != tierCase.candidates.end())
            return static_cast<int>(found - tierCase.candidates.begin());
    }
    return tierCase.chosen.value_or(m_bench.candidate());
}

QStringList SignOffPage::places() const
{
    QStringList keys;
    for (std::size_t i = 0; i < m_places.size(); ++i) {
        if (m_places[i]->isChecked())
            keys << QLatin1String(jurisdictions()[i].key);
    }
    return keys;
}

void SignOffPage::refresh()
{
    if (!isVisible()) {
        m_stale = true;
        return;
    }
    m_stale = false;
    if (!m_signing)
        m_ui->signOffResult->hide();
    const TierCase* tierCase = m_bench.tierCase();
    if (!tierCase) {
        showEmpty();
        return;
    }
    // Another tier, or another choice: what was picked here before is no longer meant.
    if (m_site != tierCase->tier.site || m_tier != tierCase->tier.name || m_chosen != tierCase->chosen) {
        const bool otherTier = m_site != tierCase->tier.site || m_tier != tierCase->tier.name;
        if (otherTier || tierCase->chosen)
            m_pick.reset();
        if (otherTier && m_ui->noteEdit->text().trimmed() == m_signedNote)
            m_ui->noteEdit->clear();
        m_site = tierCase->tier.site;
        m_tier = tierCase->tier.name;
        m_chosen = tierCase->chosen;
    }
    std::optional<double> leastTime;
    if (m_ui->leastTimeBox->value() > 0)
        leastTime = m_ui->leastTimeBox->value() / 100.0;
    m_case = std::make_shared<const SignOffCase>(
        signOffCase(m_bench.document(), m_bench.tier(), candidateToShow(), m_bench.settings(), leastTime));
    showLadderBox();
    showCase();
    m_ui->stack->setCurrentWidget(m_ui->signPage);
}

void SignOffPage::showEmpty()
{
    m_case.reset();
    m_ui->emptyLabel->setText(m_bench.document().empty() ? tr("Open a scenario or import a unit list to sign off its prices.")
                                                         : tr("Choose a tier in the worklist to sign off its prices."));
    m_ui->stack->setCurrentWidget(m_ui->emptyPage);
}

void SignOffPage::showLadderBox()
{
    QComboBox* box = m_ui->ladderBox;
    box->clear();
    box->addItem(tr("current"), QString());
    const TierCase& tierCase = *m_bench.tierCase();
    for (std::size_t i = 0; i < tierCase.candidates.size(); ++i) {
        const QString name = QString::fromStdString(tierCase.candidates[i].name);
        box->addItem(tierCase.chosen == static_cast<int>(i) ? tr("✓ %1").arg(name) : name, name);
    }
    box->setCurrentIndex(m_case->candidate + 1);
    box->setToolTip(m_case->ladder);
}

void SignOffPage::showTitle()
{
    const SignOffCase& c = *m_case;
    const QString title = tr("%1 · %2 · advertised from %3 %4")
                              .arg(isolated(shownText(c.tier.site)), isolated(shownText(c.tier.name)),
                                   floorText(c.tier.advertisedFloor, c.currency), QString::fromStdString(c.currency.code));
    m_ui->signOffTitle->setText(title);
    m_ui->signOffTitle->setToolTip(title);
    m_ui->keySentence->setText(SignOffWords::keySentence(c));
    m_ui->changesHeading->setText(c.change.unitsChanged == 0 ? tr("No price changes")
                                  : c.change.unitsChanged == 1
                                      ? tr("1 price changes")
                                      : tr("%1 prices change").arg(numberText(static_cast<double>(c.change.unitsChanged), 0)));
}

void SignOffPage::showCase()
{
    const SignOffCase& c = *m_case;
    showTitle();
    QTableView* table = m_ui->changesTable;
    const int sorted = table->horizontalHeader()->sortIndicatorSection();
    const Qt::SortOrder order = table->horizontalHeader()->sortIndicatorOrder();
    table->setModel(nullptr);
    std::map<std::string, QString> broken;
    for (const RuleBreach& breach : c.breaches)
        broken[c.tier.units[breach.unit].name] = SignOffWords::broken(breach);
    m_filter.reset();
    m_model = std::make_unique<SheetModel>(c.rows, c.currency, std::move(broken));
    m_filter = std::make_unique<SheetFilter>(*m_model);
    m_ui->onlyChangedBox->setEnabled(c.change.unitsChanged > 0);
    m_filter->setChangedOnly(m_ui->onlyChangedBox->isChecked() && c.change.unitsChanged > 0);
    table->setModel(m_filter.get());
    table->sortByColumn(sorted < m_filter->columnCount() ? sorted : -1, order);
    QHeaderView* header = table->horizontalHeader();
    header->setSectionResizeMode(SheetModel::unitColumn, QHeaderView::Stretch);
    header->setMinimumSectionSize(fontMetrics().averageCharWidth() * 8);
    table->setColumnHidden(SheetModel::statusColumn, true);
    for (int column = SheetModel::fromColumn; column < SheetModel::ruleColumn; ++column)
        header->setSectionResizeMode(column, QHeaderView::ResizeToContents);
    header->setSectionResizeMode(SheetModel::ruleColumn, QHeaderView::ResizeToContents);
    table->setColumnHidden(SheetModel::ruleColumn, c.breaches.empty());
    showChecks();
}

void SignOffPage::showChecks()
{
    const SignOffCase& c = *m_case;
    for (std::size_t i = 0; i < m_checkLines.size(); ++i) {
        const Check& check = c.checks[i];
        const QString outcome = SignOffWords::outcome(check.outcome);
        const QString name = SignOffWords::checkName(check.kind);
        const QString why = SignOffWords::why(check, c.tier.advertisedFloor, c.currency);
        m_checkLines[i].outcome->setText(SignOffWords::outcomeSign(check.outcome) + QLatin1Char(' ') + outcome);
        m_checkLines[i].words->setText(tr("%1. %2").arg(name, why));
        m_checkLines[i].words->setAccessibleName(tr("%1: %2. %3").arg(name, outcome, why));
    }
}

void SignOffPage::showReminders()
{
    QStringList paragraphs;
    QStringList keys = places();
    keys << QString();
    for (const QString& key : std::as_const(keys)) {
        for (const Reminder& reminder : remindersOf(key))
            paragraphs << tr("%1: %2").arg(reminder.rule, reminder.text);
    }
    paragraphs << remindersCaution();
    m_ui->remindersLabel->setText(paragraphs.join(QStringLiteral("\n\n")));
}

// Events -------------------------------------------------------------------------------------------------------------

void SignOffPage::showEvent(QShowEvent* event)
{
    QWidget::showEvent(event);
    if (m_stale)
        refresh();
}

void SignOffPage::changeEvent(QEvent* event)
{
    QWidget::changeEvent(event);
    if (event->type() == QEvent::FontChange)
        dress();
}

} // namespace rungwright
