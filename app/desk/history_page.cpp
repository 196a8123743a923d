// SPDX-License-Identifier: GPL-3.0-or-later
#include "history_page.h"

#include "caution.h"
#include "file_names.h"
#include "picture_file.h"
#include "plot_words.h"
#include "questions.h"
#include "refresh_words.h"
#include "sheet_cells.h"
#include "signed_check.h"
#include "signoff_words.h"
#include "table_text.h"
#include "ui_history_page.h"
#include "whole_file.h"
#include "wording.h"
#include "words.h"

#include <QHeaderView>
#include <QMenu>
#include <QScopedValueRollback>
#include <QtConcurrent>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

CellsModel::Cell textCell(const std::string& utf8) { return {shownText(utf8, 200), QString::fromStdString(utf8), false}; }

CellsModel::Cell moneyCell(Price price, const Currency& currency)
{
    return {moneyText(price, currency), QString::fromStdString(plainText(price, currency)), true};
}

CellsModel::Cell changeCell(Price before, Price after, const Currency& currency)
{
    return {signedMoneyText(inMinor(after - before), currency), QString::fromStdString(plainText(after - before, currency)), true};
}

QString checkWords(CheckOutcome outcome)
{
    // In the words and signs of the sign-off itself.
    ClaimOutcome claim = ClaimOutcome::notChecked;
    if (outcome == CheckOutcome::holds)
        claim = ClaimOutcome::holds;
    else if (outcome == CheckOutcome::lookAtThis)
        claim = ClaimOutcome::lookAtThis;
    return SignOffWords::outcomeSign(claim) + QLatin1Char(' ') + SignOffWords::outcome(claim);
}

std::int64_t nowInstant() { return QDateTime::currentMSecsSinceEpoch(); }

} // namespace

HistoryPage::HistoryPage(Workbench& bench, Questions& questions, QWidget* parent) :
    QWidget(parent), m_bench(bench), m_questions(questions), m_ui(std::make_unique<Ui::HistoryPage>())
{
    m_ui->setupUi(this);
    m_ui->historyCaution->setText(cautionText());
    m_ui->plotArea->setBackgroundRole(QPalette::Base);
    m_ui->historySplitter->setStretchFactor(0, 1);
    m_ui->historySplitter->setStretchFactor(1, 1);
    m_ui->belowSplitter->setStretchFactor(0, 3);
    m_ui->belowSplitter->setStretchFactor(1, 2);
    prepareTables();
    prepareWaysOut();
    dress();

    connect(&m_reading, &QFutureWatcher<HistoryRead>::finished, this, &HistoryPage::onRead);
    connect(&m_entryReading, &QFutureWatcher<EntryRead>::finished, this, &HistoryPage::onEntryRead);
    connect(m_ui->rereadButton, &QPushButton::clicked, this, &HistoryPage::start);
    connect(m_ui->emptyRereadButton, &QPushButton::clicked, this, &HistoryPage::start);
    connect(m_ui->daysSpin, &QSpinBox::valueChanged, this, &HistoryPage::reread);
    connect(m_ui->unitChooser, &QComboBox::currentIndexChanged, this, [this] {
        if (!m_filling)
            reread();
    });
    for (HistoryPlot* plot : {m_ui->pricesPlot, m_ui->gapPlot})
        connect(plot, &HistoryPlot::signOffChosen, this, &HistoryPage::choose);
    connect(&bench, &Workbench::reset, this, &HistoryPage::reread);
    connect(&bench.document(), &Document::saveStateChanged, this, [this] {
        if (m_read.ask.path != ask().path)
            reread();
    });
    reread();
}

HistoryPage::~HistoryPage()
{
    m_reading.disconnect(this);
    m_entryReading.disconnect(this);
    m_ui->signOffTable->selectionModel()->disconnect(this);
}

void HistoryPage::prepareTables()
{
    const std::pair<QTableView*, QAbstractItemModel*> tables[] = {{m_ui->signOffTable, &m_signOffs},
                                                                  {m_ui->historyChangesTable, &m_changes},
                                                                  {m_ui->historyChecksTable, &m_checks},
                                                                  {m_ui->lowestTable, &m_lowest},
                                                                  {m_ui->todayTable, &m_today}};
    for (const auto& [table, model] : tables) {
        table->setModel(model);
        table->verticalHeader()->hide();
        table->horizontalHeader()->setStretchLastSection(true);
        table->horizontalHeader()->setHighlightSections(false);
        table->horizontalHeader()->setDefaultAlignment(Qt::AlignLeft | Qt::AlignVCenter);
        makeCopyable(*table);
    }
    connect(m_ui->signOffTable->selectionModel(), &QItemSelectionModel::currentRowChanged, this, &HistoryPage::onSelected);
}

void HistoryPage::prepareWaysOut()
{
    for (PaperPlot* plot : {static_cast<PaperPlot*>(m_ui->pricesPlot), static_cast<PaperPlot*>(m_ui->gapPlot)}) {
        plot->setAskPath([this](QWidget* over, const QString& title, const QString& suggestion, const QString& filter) {
            const QString path = m_questions.savePath(over, title, suggestion, filter);
            return path.isEmpty() ? path : withSuffix(path, QStringLiteral("png"));
        });
        connect(plot, &PaperPlot::told, this, &HistoryPage::told);
        connect(plot, &PaperPlot::saveFailed, this,
                [this](const QString& reason) { m_questions.tell(this, tr("The picture was not saved."), reason); });
    }
    auto* menu = new QMenu(m_ui->historyExportButton);
    menu->setObjectName(QStringLiteral("historyExportMenu"));
    const auto add = [menu](const QString& text, const char* name, const std::function<void()>& does) {
        menu->addAction(text, does)->setObjectName(QLatin1String(name));
    };
    add(tr("Copy picture of the &prices"), "copyPricesPicture", [this] { m_ui->pricesPlot->copyPlot(); });
    add(tr("Copy picture of the &gap"), "copyGapPicture", [this] { m_ui->gapPlot->copyPlot(); });
    add(tr("&Save picture of the prices…"), "savePricesPicture", [this] { savePicture(m_ui->pricesPlot); });
    add(tr("Save picture of the g&ap…"), "saveGapPicture", [this] { savePicture(m_ui->gapPlot); });
    menu->addSeparator();
    add(tr("Save the &list of sign-offs as CSV…"), "saveSignOffs", [this] { saveTable(m_signOffs, tr("sign-offs")); });
    add(tr("Save the &changes of the chosen one as CSV…"), "saveChanges", [this] { saveTable(m_changes, tr("changes signed")); });
    add(tr("Save the l&owest prices as CSV…"), "saveLowest", [this] { saveTable(m_lowest, tr("lowest prices")); });
    m_ui->historyExportButton->setMenu(menu);
}

void HistoryPage::dress()
{
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    m_ui->historyTitle->setFont(strong);
    const int row = fontMetrics().height() + 8;
    for (QTableView* table :
         {m_ui->signOffTable, m_ui->historyChangesTable, m_ui->historyChecksTable, m_ui->lowestTable, m_ui->todayTable}) {
        table->verticalHeader()->setSectionResizeMode(QHeaderView::Fixed);
        table->verticalHeader()->setDefaultSectionSize(row);
    }
}

// Reading ------------------------------------------------------------------------------------------------------------

HistoryAsk HistoryPage::ask() const
{
    HistoryAsk wanted;
    wanted.path = ledgerPathFor(m_bench.document().path());
    if (const TierCase* tierCase = m_bench.tierCase()) {
        wanted.site = tierCase->tier.site;
        wanted.tier = tierCase->tier.name;
    }
    wanted.currency = m_bench.currency();
    wanted.window = {nowInstant(), m_ui->daysSpin->value()};
    // A unit of another tier is no unit of this one.
    if (wanted.sameTier(m_read.ask) && m_ui->unitChooser->currentIndex() > 0)
        wanted.unit = m_ui->unitChooser->currentData().toString().toStdString();
    return wanted;
}

void HistoryPage::reread()
{
    if (isVisible())
        start();
}

void HistoryPage::start()
{
    if (!m_bench.tierCase()) {
        showEmpty(tr("No tier is on the bench."), false);
        return;
    }
    const HistoryAsk wanted = ask();
    if (wanted.path.isEmpty()) {
        showEmpty(tr("The price ledger stands beside the scenario's file. Save the scenario, then sign off a ladder: from then on the "
                     "history of this tier is shown here."),
                  false);
        return;
    }
    // What was asked before is let go: its answer is no longer waited for.
    m_reading.setFuture(QtConcurrent::run([wanted] { return readHistory(wanted); }));
}

void HistoryPage::onRead()
{
    m_read = m_reading.result();
    const HistoryAsk now = ask();
    if (!m_read.ask.sameTier(now))
        return; // Another answer is on its way.
    if (!m_read.trouble.empty()) {
        showEmpty(tr("The price ledger cannot be read.") + QStringLiteral("\n\n") + QString::fromStdString(m_read.trouble), true);
        return;
    }
    if (m_read.lines.empty()) {
        showEmpty(tr("No price sheet of this tier has been signed off yet. Sign-offs are kept in %1.").arg(shownText(m_read.ask.path, 120)),
                  true);
        return;
    }
    const QScopedValueRollback<bool> filling(m_filling, true);
    const int row = m_ui->signOffTable->currentIndex().row();
    // The newest is followed; an older one that was chosen stays.
    const std::int64_t chosen = row > 0 && row < m_signOffs.rowCount() ? m_signOffs.line(row).id : m_read.lines.back().id;
    m_signOffs.show(m_read.lines);
    m_ui->historyStack->setCurrentWidget(m_ui->historyShown);
    showTitle();
    showUnits();
    showPlots();
    showLowest();
    showToday();
    // As wide as the newest rows want; ten thousand need not be looked at for that.
    m_ui->signOffTable->horizontalHeader()->setResizeContentsPrecision(40);
    m_ui->signOffTable->resizeColumnsToContents();
    choose(m_signOffs.rowOf(chosen) >= 0 ? chosen : m_read.lines.back().id);
}

void HistoryPage::choose(std::int64_t id)
{
    const int row = m_signOffs.rowOf(id);
    if (row < 0)
        return;
    if (m_ui->signOffTable->currentIndex().row() == row)
        onSelected(); // the table has nothing to tell
    else
        m_ui->signOffTable->setCurrentIndex(m_signOffs.index(row, 0));
}

void HistoryPage::onSelected()
{
    const int row = m_ui->signOffTable->currentIndex().row();
    if (row < 0 || row >= m_signOffs.rowCount())
        return;
    const std::int64_t id = m_signOffs.line(row).id;
    m_ui->pricesPlot->choose(id);
    m_ui->gapPlot->choose(id);
    m_entryReading.setFuture(QtConcurrent::run([path = m_read.ask.path, id] { return readEntry(path, id); }));
}

void HistoryPage::onEntryRead()
{
    m_entry = m_entryReading.result();
    showEntry();
}

// Showing ------------------------------------------------------------------------------------------------------------

void HistoryPage::showEmpty(const QString& words, bool canReread)
{
    m_signOffs.show({});
    m_ui->historyEmptyLabel->setText(words);
    m_ui->emptyRereadButton->setVisible(canReread);
    m_ui->historyStack->setCurrentWidget(m_ui->historyEmpty);
}

void HistoryPage::showTitle()
{
    const Tier& tier = m_bench.tierCase()->tier;
    const QString name = tr("%1 · %2").arg(isolated(shownText(tier.site)), isolated(shownText(tier.name)));
    const std::size_t count = m_read.lines.size();
    const QString title = count == 1 ? tr("%1 · 1 sign-off").arg(name)
                                     : tr("%1 · %2 sign-offs").arg(name, QLocale().toString(static_cast<qulonglong>(count)));
    m_ui->historyTitle->setText(title);
    m_ui->historyTitle->setToolTip((title + QLatin1Char('\n') + m_read.ask.path).toHtmlEscaped());
    for (HistoryPlot* plot : {m_ui->pricesPlot, m_ui->gapPlot})
        plot->setPictureHeading(title);
}

void HistoryPage::showUnits()
{
    QComboBox* chooser = m_ui->unitChooser;
    const QString before = m_read.ask.unit.empty() ? QString() : QString::fromStdString(m_read.ask.unit);
    chooser->clear();
    chooser->addItem(tr("no unit"));
    for (const std::string& unit : m_read.units)
        chooser->addItem(shownText(unit), QString::fromStdString(unit));
    chooser->setCurrentIndex(before.isEmpty() ? 0 : std::max(0, chooser->findData(before)));
}

void HistoryPage::showPlots()
{
    const Currency& currency = m_bench.currency();
    HistoryPicture prices;
    prices.currency = currency;
    prices.until = nowInstant();
    prices.title = priceAxisTitle(currency);
    HistoryPicture gaps = prices;
    gaps.title = gapAxisTitle(currency);
    gaps.fromZero = true;
    HistorySeries floor{HistorySeries::Kind::floor, tr("advertised floor"), {}};
    HistorySeries cheapest{HistorySeries::Kind::cheapest, tr("expected cheapest"), {}};
    HistorySeries gap{HistorySeries::Kind::gap, tr("gap"), {}};
    std::size_t others = 0;
    for (const SignOffLine& line : m_read.lines) {
        if (line.currency != currency) {
            ++others; // Amounts of two currencies do not go on one axis.
            continue;
        }
        prices.marks.push_back({line.instant, line.id});
        floor.points.push_back({line.instant, line.advertisedFloor ? inMinor(*line.advertisedFloor) : NAN});
        cheapest.points.push_back({line.instant, line.cheapestAfter.value_or(NAN)});
        gap.points.push_back({line.instant, line.gapAfter.value_or(NAN)});
    }
    gaps.marks = prices.marks;
    prices.series = {std::move(floor), std::move(cheapest)};
    gaps.series = {std::move(gap)};
    if (!m_read.ask.unit.empty()) {
        HistorySeries unit{HistorySeries::Kind::unit, tr("unit %1").arg(shownText(m_read.ask.unit, 24)), {}};
        for (const UnitLine& line : m_read.unit) {
            if (line.currency == currency)
                unit.points.push_back({line.instant, inMinor(line.after)});
        }
        prices.series.push_back(std::move(unit));
    }
    if (others > 0)
        prices.title += tr(" · %1 sign-offs in another currency are not drawn").arg(others);
    m_ui->pricesPlot->setPicture(std::move(prices));
    m_ui->gapPlot->setPicture(std::move(gaps));
    const int numbers = std::max(m_ui->pricesPlot->numbersWidth(), m_ui->gapPlot->numbersWidth());
    m_ui->pricesPlot->setNumbersWidth(numbers);
    m_ui->gapPlot->setNumbersWidth(numbers);
}

void HistoryPage::showLowest()
{
    const LowestOfTier& lowest = m_read.lowest;
    const Currency& currency = m_read.ask.currency;
    QString said;
    if (lowest.tier) {
        said = tr("Lowest asked in this tier since %1: %2, for unit %3.")
                   .arg(localTime(m_read.ask.window.from()), moneyText(*lowest.tier->lowest, currency), shownText(lowest.tier->unit));
        if (!lowest.tier->whole)
            said += u' ' + tr("Of the days before the first sign-off nothing is known.");
    } else {
        said = tr("Nothing is known of the prices since %1.").arg(localTime(m_read.ask.window.from()));
    }
    if (lowest.otherCurrency > 0)
        said += u' ' + tr("%1 in another currency left out.").arg(lowest.otherCurrency);
    said += u' ' + tr("Days of 24 hours; prices changed past the ledger are not known to it.");
    m_ui->lowestSentence->setText(said);
    std::vector<std::vector<CellsModel::Cell>> rows;
    rows.reserve(lowest.units.size());
    for (const LowestAsked& unit : lowest.units)
        rows.push_back({textCell(unit.unit),
                        moneyCell(unit.lowest.value_or(Price{}), currency),
                        {unit.whole ? tr("all of them") : tr("from the first sign-off on"), {}, false}});
    m_lowest.show({tr("Unit"), tr("Lowest"), tr("Days known")}, std::move(rows));
    m_ui->lowestTable->resizeColumnsToContents();
}

void HistoryPage::showToday()
{
    if (!m_read.last || m_read.last->currency != m_read.ask.currency) {
        m_ui->todaySentence->setText(tr("The last sheet was signed in another currency."));
        m_today.show({}, {});
        return;
    }
    const SignOff& last = *m_read.last;
    SignedSheet sheet{last.candidate, last.whenUtc, {}};
    for (const LedgerUnit& unit : last.units) {
        if (unit.before != unit.after)
            sheet.prices.push_back({unit.unit, unit.before, unit.after});
    }
    const Tier& tier = m_bench.tierCase()->tier;
    const SignedCheck check = checkSigned(sheet, &tier);
    QString said = tr("The last sheet (%1, %2): %3.")
                       .arg(localTime(instantFromUtcText(last.whenUtc).value_or(0)), shownText(last.candidate), signedStateText(check));
    const Price floor = last.advertisedFloor.value_or(Price{});
    if (floor != tier.advertisedFloor)
        said += u' ' + tr("The advertised floor was %1 and is %2 now.")
                           .arg(floorText(floor, last.currency), floorText(tier.advertisedFloor, last.currency));
    m_ui->todaySentence->setText(said);
    std::vector<std::vector<CellsModel::Cell>> rows;
    for (const SignedDifference& one : check.differences)
        rows.push_back({textCell(one.unit), moneyCell(one.before, last.currency), moneyCell(one.wanted, last.currency),
                        one.asked ? moneyCell(*one.asked, last.currency) : CellsModel::Cell{tr("gone"), {}, false}});
    m_today.show({tr("Unit"), tr("Before"), tr("Signed"), tr("Asked today")}, std::move(rows));
    m_ui->todayTable->resizeColumnsToContents();
}

void HistoryPage::showEntry()
{
    if (!m_entry.entry) {
        m_ui->entrySentence->setText(QString::fromStdString(m_entry.trouble));
        m_changes.show({}, {});
        m_checks.show({}, {});
        return;
    }
    const SignOff& entry = *m_entry.entry;
    QStringList said{tr("Signed %1 by %2.").arg(localTimeInFull(instantFromUtcText(entry.whenUtc).value_or(0)), shownText(entry.who)),
                     tr("Ladder: %1. Model: %2.").arg(shownText(entry.candidate), shownText(entry.modelWords, 120))};
    if (!entry.note.empty())
        said << tr("Note: %1").arg(shownText(entry.note, 300));
    m_ui->entrySentence->setText(said.join(QLatin1Char(' ')));
    m_ui->entrySentence->setToolTip(tr("SHA-256 of the sheet: %1").arg(QString::fromStdString(entry.sheetSha256)));
    std::vector<std::vector<CellsModel::Cell>> rows;
    for (const LedgerUnit& unit : entry.units) {
        if (unit.before == unit.after)
            continue;
        const QString percent = QString::fromStdString(changePercent(unit.before, unit.after));
        rows.push_back({textCell(unit.unit),
                        {statusText(unit.status), QString::fromUtf8(statusWord(unit.status)), false},
                        moneyCell(unit.before, entry.currency),
                        moneyCell(unit.after, entry.currency),
                        changeCell(unit.before, unit.after, entry.currency),
                        {QString(percent).replace(u'-', QChar(0x2212)), percent, true}});
    }
    m_changes.show({tr("Unit"), tr("Status"), tr("From"), tr("To"), tr("Change"), tr("%")}, std::move(rows));
    std::vector<std::vector<CellsModel::Cell>> checks;
    for (const LedgerCheck& check : entry.checks)
        checks.push_back({{checkWords(check.outcome), QString::fromLatin1(checkOutcomeWord(check.outcome)), false},
                          textCell(check.name),
                          textCell(check.why)});
    m_checks.show({tr("Outcome"), tr("Check"), tr("Why")}, std::move(checks));
    m_ui->historyChangesTable->resizeColumnsToContents();
    m_ui->historyChecksTable->resizeColumnsToContents();
}

// Ways out -----------------------------------------------------------------------------------------------------------

void HistoryPage::savePicture(PaperPlot* plot)
{
    if (m_ui->historyStack->currentWidget() != m_ui->historyShown)
        return;
    const QString name = fileNameFrom(
        {QString::fromStdString(m_read.ask.site), QString::fromStdString(m_read.ask.tier), plot->accessibleName()}, QStringLiteral("png"));
    const QString chosen = m_questions.savePath(this, tr("Save the picture"), name, pictureFilter());
    if (chosen.isEmpty())
        return;
    const QString path = withSuffix(chosen, QStringLiteral("png"));
    const auto saved = plot->savePlot(path);
    if (saved.ok())
        emit told(tr("Picture saved: %1").arg(path));
    else
        m_questions.tell(this, tr("The picture was not saved."), QString::fromStdString(saved.trouble()));
}

void HistoryPage::saveTable(const QAbstractItemModel& model, const QString& what)
{
    if (m_ui->historyStack->currentWidget() != m_ui->historyShown)
        return;
    const QString name =
        fileNameFrom({QString::fromStdString(m_read.ask.site), QString::fromStdString(m_read.ask.tier), what}, QStringLiteral("csv"));
    const QString chosen = m_questions.savePath(this, tr("Save the table"), name, tr("Comma-separated table (*.csv)"));
    if (chosen.isEmpty())
        return;
    const QString path = withSuffix(chosen, QStringLiteral("csv"));
    const auto saved = writeWhole(path, tableCsv(model));
    if (saved.ok())
        emit told(tr("Table saved: %1. %2").arg(path, cautionText()));
    else
        m_questions.tell(this, tr("The table was not saved."), QString::fromStdString(saved.trouble()));
}

// Events -------------------------------------------------------------------------------------------------------------

void HistoryPage::showEvent(QShowEvent* event)
{
    QWidget::showEvent(event);
    start(); // Whatever was signed meanwhile, here or in another window.
}

void HistoryPage::changeEvent(QEvent* event)
{
    QWidget::changeEvent(event);
    if (event->type() == QEvent::FontChange)
        dress();
}

} // namespace rungwright
