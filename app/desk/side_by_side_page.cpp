// SPDX-License-Identifier: GPL-3.0-or-later
#include "side_by_side_page.h"

#include "caution.h"
#include "pick_menu.h"
#include "plot_words.h"
#include "side_by_side_export.h"
#include "table_names.h"
#include "table_text.h"
#include "ui_side_by_side_page.h"
#include "words.h"

#include <QEvent>
#include <QHeaderView>
#include <QSignalBlocker>

#include <algorithm>

namespace rungwright
{

namespace
{

/// What the picture leaves between two columns.
constexpr int kBetween = 20;

/// Neither a candidate nor the current ladder.
constexpr int kNoCandidate = -2;

const auto kWeights = QStringLiteral("sideBySide/weights");

} // namespace

SideBySidePage::SideBySidePage(Workbench& bench, Questions& questions, QSettings* settings, QWidget* parent) :
    QWidget(parent), m_bench(bench), m_questions(questions), m_settings(settings), m_ui(std::make_unique<Ui::SideBySidePage>())
{
    m_ui->setupUi(this);
    m_ui->sideBySideCaution->setText(cautionText());
    m_ui->sideBySideSplitter->setStretchFactor(0, 1);
    m_ui->sideBySideSplitter->setStretchFactor(1, 1);
    m_pickMenu = new PickMenu(m_ui->compareButton);
    m_pickMenu->setObjectName(QStringLiteral("compareMenu"));
    m_ui->compareButton->setMenu(m_pickMenu);
    connect(m_pickMenu, &PickMenu::ticked, this, &SideBySidePage::pickLadder);
    prepareTable();
    prepareMoves();
    prepareUnitPrices();
    prepareWeights();
    prepareAgainst();
    prepareExport();
    dress();

    m_ui->plotArea->setBackgroundRole(QPalette::Base);
    connect(m_ui->overButton, &QRadioButton::toggled, this, [this](bool over) {
        m_ui->sideBySidePlot->setArrangement(over ? SideBySidePlot::Arrangement::overlay : SideBySidePlot::Arrangement::columns);
        alignPlot();
    });
    connect(m_ui->chooseButton, &QPushButton::clicked, this, &SideBySidePage::choose);
    connect(&bench.document(), &Document::changed, this, [this](const DocumentChange& change) {
        if (change.kind != DocumentChange::Kind::everything)
            return;
        m_picks.clear();
        refresh();
    });
    connect(&bench, &Workbench::reset, this, &SideBySidePage::refresh);
    refresh();
}

SideBySidePage::~SideBySidePage()
{
    m_ui->sideBySideTable->selectionModel()->disconnect(this);
    m_ui->sideBySideTable->horizontalHeader()->disconnect(this);
}

void SideBySidePage::prepareTable()
{
    QTableView* table = m_ui->sideBySideTable;
    table->setVerticalHeader(new RowNames(table));
    table->setHorizontalHeader(new ColumnNames(table));
    table->setModel(&m_model);
    const QHeaderView* columns = table->horizontalHeader();
    // While the header is still moving its sections the model must stand still.
    connect(columns, &QHeaderView::sectionMoved, this, &SideBySidePage::adoptHeaderOrder, Qt::QueuedConnection);
    connect(columns, &QHeaderView::geometriesChanged, this, &SideBySidePage::alignPlot);
    connect(table->selectionModel(), &QItemSelectionModel::currentChanged, this, &SideBySidePage::showChoice);
    makeCopyable(*table);
}

void SideBySidePage::prepareMoves()
{
    const auto add = [this](const QString& text, const char* name, Qt::Key key, int by) {
        auto* action = new QAction(text, this);
        action->setObjectName(QLatin1String(name));
        action->setShortcut(QKeySequence(Qt::ALT | key));
        action->setShortcutContext(Qt::WidgetWithChildrenShortcut);
        connect(action, &QAction::triggered, this, [this, by] { moveSelected(by); });
        addAction(action);
        m_ui->sideBySideTable->addAction(action);
    };
    add(tr("Move column &left"), "moveLeftAction", Qt::Key_Left, -1);
    add(tr("Move column &right"), "moveRightAction", Qt::Key_Right, +1);
}

void SideBySidePage::prepareUnitPrices()
{
    QTableView* table = m_ui->unitPricesTable;
    table->setModel(&m_unitPrices);
    QHeaderView* header = table->horizontalHeader();
    header->setHighlightSections(false);
    header->setSectionResizeMode(QHeaderView::Stretch);
    header->setTextElideMode(Qt::ElideMiddle);
    makeCopyable(*table);
    connect(m_ui->unitPricesBox, &QCheckBox::toggled, this, [this](bool on) {
        m_ui->tables->setCurrentWidget(on ? m_ui->unitPricesTable : m_ui->sideBySideTable);
        m_ui->againstBox->setEnabled(!on);
        alignPlot();
    });
}

void SideBySidePage::prepareWeights()
{
    const QStringList kept = m_settings ? m_settings->value(kWeights).toStringList() : QStringList();
    QSpinBox* const boxes[] = {m_ui->weightGapBox, m_ui->weightTotalBox, m_ui->weightAmountBox, m_ui->weightFloorBox};
    qsizetype i = 0;
    for (QSpinBox* box : boxes) {
        box->setValue(kept.value(i++).toInt());
        box->setToolTip(tr("0: does not count. Each figure is scaled between its worst (0) and its best (100) among the ladders shown;\n"
                           "the scaled figures are averaged by weight. With other ladders beside it a ladder's points change."));
        connect(box, qOverload<int>(&QSpinBox::valueChanged), this, [this] {
            const RankingWeights w = weights();
            if (m_settings)
                m_settings->setValue(kWeights, QStringList{QString::number(w.gap), QString::number(w.totalChange),
                                                           QString::number(w.amountOfChange), QString::number(w.floorMet)});
            refresh();
        });
    }
}

RankingWeights SideBySidePage::weights() const
{
    return {m_ui->weightGapBox->value(), m_ui->weightTotalBox->value(), m_ui->weightAmountBox->value(), m_ui->weightFloorBox->value()};
}

void SideBySidePage::prepareAgainst()
{
    connect(m_ui->againstBox, qOverload<int>(&QComboBox::activated), this, [this](int index) {
        const QVariant candidate = m_ui->againstBox->itemData(index);
        m_against = candidate.isValid() ? std::optional(candidate.toString()) : std::nullopt;
        refresh();
    });
}

/// The ladders shown, in the order of the columns; one that is shown no longer is no longer compared with.
void SideBySidePage::showAgainst()
{
    QComboBox* box = m_ui->againstBox;
    box->clear();
    box->addItem(tr("as they are"));
    for (const ComparedLadder& ladder : m_model.ladders()) {
        const QString name = ladder.candidate < 0 ? QString(QLatin1String("")) : ladder.name;
        box->addItem(tr("against “%1”").arg(ladder.name), name);
        if (m_against == name)
            box->setCurrentIndex(box->count() - 1);
    }
}

void SideBySidePage::prepareExport()
{
    auto* ways = new SideBySideExport(
        {m_bench, m_model, m_unitPrices, *m_ui->sideBySideTable, *m_ui->unitPricesTable, *m_ui->sideBySidePlot, m_questions}, this);
    connect(ways, &SideBySideExport::told, this, &SideBySidePage::told);
    auto* menu = new QMenu(m_ui->exportButton);
    menu->setObjectName(QStringLiteral("exportMenu"));
    ways->fill(*menu);
    m_ui->exportButton->setMenu(menu);
}

void SideBySidePage::dress()
{
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    m_ui->sideBySideTitle->setFont(strong);
    QTableView* table = m_ui->sideBySideTable;
    table->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
    m_ui->unitPricesTable->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
    // The rows that a choice turns on show at once.
    m_ui->tables->setMinimumHeight(6 * (fontMetrics().height() + 8));
}

SideBySidePage::TierKey SideBySidePage::tierKey() const
{
    const TierCase* tierCase = m_bench.tierCase();
    return tierCase ? TierKey(tierCase->tier.site, tierCase->tier.name) : TierKey();
}

// What is compared ---------------------------------------------------------------------------------------------------

std::vector<int> SideBySidePage::shownCandidates() const
{
    std::vector<int> shown;
    for (const ComparedLadder& ladder : m_model.ladders())
        shown.push_back(ladder.candidate);
    return shown;
}

int SideBySidePage::selectedCandidate() const
{
    const QModelIndex at = m_ui->sideBySideTable->currentIndex();
    return at.isValid() ? m_model.ladders()[static_cast<std::size_t>(at.column())].candidate : -1;
}

QStringList SideBySidePage::candidateNames() const
{
    QStringList names;
    if (const TierCase* tierCase = m_bench.tierCase()) {
        for (const Candidate& candidate : tierCase->candidates)
            names << QString::fromStdString(candidate.name);
    }
    return names;
}

void SideBySidePage::refresh()
{
    if (!isVisible()) {
        m_stale = true;
        return;
    }
    m_stale = false;
    const QStringList names = candidateNames();
    if (!m_bench.tierCase() || names.isEmpty()) {
        showEmpty();
        return;
    }
    pick().update(names, m_bench.candidate());
    showPick(names);
    const bool sameTier = m_shownTier == tierKey() && !m_model.ladders().empty();
    if (!sameTier)
        m_against.reset(); // a name means another ladder elsewhere
    m_shownTier = tierKey();
    showLadders(sameTier ? selectedCandidate() : kNoCandidate);
    m_ui->stack->setCurrentWidget(m_ui->comparePage);
}

void SideBySidePage::showEmpty()
{
    m_model.show({}, m_bench.currency());
    m_ui->emptyLabel->setText(m_bench.document().empty() ? tr("Open a scenario or import a unit list to compare ladders.")
                              : !m_bench.tierCase()      ? tr("Choose a tier in the worklist to compare its ladders.")
                                                         : tr("So far there is only the current ladder.\n"
                                                                   "Drag a rung on the bench to make a candidate; it will stand here beside it."));
    m_ui->stack->setCurrentWidget(m_ui->emptyPage);
}

void SideBySidePage::showPick(const QStringList& names)
{
    QPushButton* button = m_ui->compareButton;
    m_pickMenu->setLadders(names, pick());
    button->setText(tr("Com&pare %1 of %2").arg(pick().shown().size()).arg(names.size() + 1));
    // The style leaves the arrow no air.
    button->setMinimumWidth(button->minimumSizeHint().width() + 8);
}

void SideBySidePage::pickLadder(int candidate, bool on)
{
    pick().setShown(candidate, on);
    refresh();
}

void SideBySidePage::showLadders(int selected)
{
    const TierCase& tierCase = *m_bench.tierCase();
    std::vector<ComparedLadder> ladders;
    for (const int candidate : pick().shown()) {
        ComparedLadder ladder;
        ladder.candidate = candidate;
        ladder.name = candidate < 0 ? tr("current") : QString::fromStdString(tierCase.candidates[static_cast<std::size_t>(candidate)].name);
        ladder.chosen = candidate >= 0 && tierCase.chosen == candidate;
        ladder.prices = pricesOf(tierCase, candidate);
        ladder.measurement = measured(tierCase.tier, ladder.prices, m_bench.settings());
        ladder.change = ladderChange(tierCase.tier.units, ladder.prices);
        ladder.typicalChange = typicalChange(tierCase.tier.units, ladder.prices, modelUnits(m_bench.settings().kind));
        ladders.push_back(std::move(ladder));
    }
    QTableView* table = m_ui->sideBySideTable;
    const int row = std::max(0, table->currentIndex().row());
    straightenHeader();
    std::optional<int> against;
    for (const ComparedLadder& ladder : ladders) {
        if (m_against && (ladder.candidate < 0 ? m_against->isEmpty() : *m_against == ladder.name))
            against = ladder.candidate;
    }
    if (!against)
        m_against.reset();
    m_model.setAgainst(against);
    m_model.setWeights(weights());
    m_unitPrices.show(tierCase.tier, ladders, m_bench.currency());
    m_model.show(std::move(ladders), m_bench.currency());
    showAgainst();
    m_ui->rankingLabel->setText(weights().any() ? m_model.rankingText() : tr("Set weights to rank the ladders."));
    m_ui->rankingLabel->setToolTip(m_ui->rankingLabel->text());

    // No figure is cut; where that takes more room than there is, the table scrolls.
    int widest = fontMetrics().averageCharWidth() * 10;
    for (int shown = 0; shown < m_model.columnCount(); ++shown)
        widest = std::max(widest, static_cast<QAbstractItemView*>(table)->sizeHintForColumn(shown));
    table->horizontalHeader()->setMinimumSectionSize(widest);

    // The column that was selected before; else the one worked on; else the first candidate.
    int column = m_model.columnOf(selected);
    if (column < 0 && m_bench.candidate() >= 0)
        column = m_model.columnOf(m_bench.candidate());
    if (column < 0)
        column = m_model.ladders().front().candidate < 0 ? 1 : 0;
    table->setCurrentIndex(m_model.index(row, column));
    showInPlot();
    showTitle();
    showChoice();
}

/// The order is the model's: what a drag moved in the header is undone there before the model takes it over.
void SideBySidePage::straightenHeader()
{
    QHeaderView* header = m_ui->sideBySideTable->horizontalHeader();
    const QSignalBlocker quiet(header);
    for (int column = 0; column < header->count(); ++column)
        header->moveSection(header->visualIndex(column), column);
}

void SideBySidePage::showInPlot()
{
    std::vector<SideLadder> shown;
    for (const ComparedLadder& ladder : m_model.ladders())
        shown.push_back({ladder.name, ladder.measurement, ladder.prices});
    m_ui->sideBySidePlot->setLadders(m_bench.tierCase()->tier, m_bench.currency(), shown);
    alignPlot();
}

/// Brings each column of the picture over its column of the table.
void SideBySidePage::alignPlot()
{
    QMargins margins;
    const QTableView& table = *m_ui->sideBySideTable;
    const bool scrolls = table.horizontalHeader()->length() > table.viewport()->width();
    if (m_ui->sideBySidePlot->arrangement() == SideBySidePlot::Arrangement::columns && !scrolls) {
        const QRect columns = table.viewport()->geometry();
        const QMargins inside = m_ui->sideBySidePlot->areaMargins();
        // The picture leaves some room between its columns, the table none: the last one ends that much earlier.
        margins.setLeft(std::max(0, columns.left() - inside.left()));
        margins.setRight(std::max(0, table.width() - 1 - columns.right() + kBetween - inside.right()));
    }
    m_ui->plotLayout->setContentsMargins(margins);
}

// Words --------------------------------------------------------------------------------------------------------------

void SideBySidePage::showTitle()
{
    const TierCase* tierCase = m_bench.tierCase();
    if (!tierCase)
        return;
    const QString tier = tr("%1 · %2").arg(isolated(shownText(tierCase->tier.site)), isolated(shownText(tierCase->tier.name)));
    const Measurement& m = m_model.ladders().front().measurement;
    QString model = modelName(m.model);
    if (m.odds.left)
        model += *m.odds.left == 1 ? tr(", 1 unit left") : tr(", %1 units left").arg(numberText(*m.odds.left, 0));
    const QString title = tr("%1 · advertised from %2 · %3").arg(tier, floorText(m.advertisedFloor, m_bench.currency()), model);
    m_ui->sideBySideTitle->setToolTip(title);
    m_ui->sideBySideTitle->setText(title);
    m_ui->sideBySidePlot->setPictureHeading(title);
}

void SideBySidePage::showChoice()
{
    const int candidate = selectedCandidate();
    const QStringList names = candidateNames();
    const bool can = candidate >= 0 && candidate < names.size();
    m_ui->chooseButton->setEnabled(can);
    m_ui->chooseButton->setText(can ? tr("&Choose “%1”").arg(buttonName(names[candidate])) : tr("&Choose a candidate"));
    m_ui->chooseButton->setToolTip(can ? names[candidate]
                                       : tr("The current ladder is what is asked today. Select the column of a candidate."));
}

// Order --------------------------------------------------------------------------------------------------------------

void SideBySidePage::adoptHeaderOrder()
{
    const QHeaderView* header = m_ui->sideBySideTable->horizontalHeader();
    if (header->count() != m_model.columnCount())
        return;
    std::vector<int> order;
    order.reserve(static_cast<std::size_t>(header->count()));
    for (int visual = 0; visual < header->count(); ++visual)
        order.push_back(m_model.ladders()[static_cast<std::size_t>(header->logicalIndex(visual))].candidate);
    if (order == pick().shown())
        return;
    pick().reorder(std::move(order));
    showLadders(selectedCandidate());
}

void SideBySidePage::moveSelected(int by)
{
    std::vector<int> order = shownCandidates();
    const int candidate = selectedCandidate();
    const auto from = static_cast<int>(std::ranges::find(order, candidate) - order.begin());
    const int to = from + by;
    if (m_ui->stack->currentWidget() != m_ui->comparePage || to < 0 || to >= static_cast<int>(order.size()))
        return;
    std::swap(order[static_cast<std::size_t>(from)], order[static_cast<std::size_t>(to)]);
    pick().reorder(std::move(order));
    showLadders(candidate);
}

void SideBySidePage::choose()
{
    const int candidate = selectedCandidate();
    if (candidate < 0)
        return;
    m_bench.document().chooseCandidate(m_bench.tier(), candidate);
    emit chosen(candidate);
}

// Events -------------------------------------------------------------------------------------------------------------

void SideBySidePage::showEvent(QShowEvent* event)
{
    QWidget::showEvent(event);
    if (m_stale)
        refresh();
}

void SideBySidePage::resizeEvent(QResizeEvent* event)
{
    QWidget::resizeEvent(event);
    alignPlot();
}

void SideBySidePage::changeEvent(QEvent* event)
{
    QWidget::changeEvent(event);
    if (event->type() == QEvent::FontChange)
        dress();
}

} // namespace rungwright
