// SPDX-License-Identifier: GPL-3.0-or-later
#include "sheet_dialog.h"

#include "caution.h"
#include "file_names.h"
#include "gap/measure.h"
#include "ladder_change.h"
#include "plot_words.h"
#include "questions.h"
#include "sheet_remarks.h"
#include "signoff_case.h"
#include "table_text.h"
#include "ui_sheet_dialog.h"
#include "wording.h"
#include "words.h"

#include <QAccessible>
#include <QDateTime>
#include <QEvent>
#include <QHeaderView>

namespace rungwright
{

namespace
{

QString nameOf(const TierCase& tierCase, int candidate)
{
    return candidate < 0 ? QString() : QString::fromStdString(tierCase.candidates[static_cast<std::size_t>(candidate)].name);
}

/// A name as a title can bear it.
QString shortName(const QString& name) { return isolated(shownText(name)); }

const FigureRow& figure(const char* key)
{
    const auto rows = figureRows();
    const auto found = std::ranges::find_if(rows, [key](const FigureRow& row) { return qstrcmp(row.key, key) == 0; });
    Q_ASSERT(found != rows.end());
    return *found;
}

} // namespace

SheetDialog::SheetDialog(const Document& document, int tier, int candidate, Questions& questions, QWidget* parent) :
    QDialog(parent),
    m_questions(questions),
    m_currency(document.scenario().currency),
    m_rules(rulesFor(document.scenario(), document.tier(tier)->tier)),
    m_rows(sheetRows(document.scenario(), *document.tier(tier), candidate)),
    m_signed(signedSheet(*document.tier(tier), candidate)),
    m_model(m_rows, m_currency),
    m_filter(m_model),
    m_ui(std::make_unique<Ui::SheetDialog>())
{
    m_ui->setupUi(this);
    const TierCase& tierCase = *document.tier(tier);
    showTitle(tierCase, candidate);
    showSummary(tierCase, pricesOf(tierCase, candidate));
    m_ui->cautionLabel->setText(cautionText());
    m_ui->resultLabel->hide();

    QTableView* table = m_ui->rowsTable;
    table->setModel(&m_filter);
    QHeaderView* header = table->horizontalHeader();
    header->setHighlightSections(false);
    header->setSortIndicatorClearable(true);
    header->setSortIndicator(-1, Qt::AscendingOrder);
    table->setSortingEnabled(true);
    header->setSectionResizeMode(SheetModel::unitColumn, QHeaderView::Stretch);
    makeCopyable(*table);
    dress();

    connect(m_ui->changedOnlyBox, &QCheckBox::toggled, &m_filter, &SheetFilter::setChangedOnly);
    connect(m_ui->copyButton, &QPushButton::clicked, this, [this, table] {
        const int rows = copyTable(*table, CopyPart::everything);
        emit told(rows == 1 ? tr("1 row copied.") : tr("%1 rows copied.").arg(numberText(rows, 0)));
    });
    connect(m_ui->saveButton, &QPushButton::clicked, this, &SheetDialog::save);
    connect(m_ui->closeButton, &QPushButton::clicked, this, &QDialog::reject);
    m_ui->saveButton->setFocus();
}

SheetDialog::~SheetDialog() = default;

void SheetDialog::showTitle(const TierCase& tierCase, int candidate)
{
    const QString site = QString::fromStdString(tierCase.tier.site);
    const QString tier = QString::fromStdString(tierCase.tier.name);
    const QString name = nameOf(tierCase, candidate);
    m_ui->titleLabel->setText(name.isEmpty() ? tr("Price sheet of the current ladder") : tr("Price sheet of “%1”").arg(shortName(name)));
    m_ui->tierLabel->setText(tr("%1 · %2 · advertised from %3 %4")
                                 .arg(shortName(site), shortName(tier), floorText(tierCase.tier.advertisedFloor, m_currency),
                                      QString::fromStdString(m_currency.code)));
    m_suggestion = fileNameFrom({site, tier, name.isEmpty() ? tr("current") : name}, QStringLiteral("csv"));
}

void SheetDialog::showSummary(const TierCase& tierCase, const std::vector<Price>& prices)
{
    const Tier& tier = tierCase.tier;
    const Measurement today = measured(tier, askingPrices(tier.units), tierCase.model, MeasureParts::figuresOnly);
    const Measurement sheet = measured(tier, prices, tierCase.model, MeasureParts::figuresOnly);
    // A figure alone says nothing to those who hear it without its row and column.
    const auto say = [](QLabel* label, const QString& row, const QString& column, const QString& text) {
        label->setText(text);
        label->setAccessibleName(tr("%1, %2: %3").arg(row, column, text));
    };
    const auto fill = [&](const char* key, const QLabel* name, QLabel* was, QLabel* is, QLabel* change) {
        const FigureRow& row = figure(key);
        say(was, name->text(), m_ui->todayHeading->text(), figureText(row, row.value(today), m_currency));
        say(is, name->text(), m_ui->sheetHeading->text(), figureText(row, row.value(sheet), m_currency));
        const QString by = figureChangeText(row, row.value(today), row.value(sheet), m_currency);
        say(change, name->text(), m_ui->changeHeading->text(), by.isEmpty() ? tr("no change") : by);
    };
    fill("asking_total", m_ui->totalLabel, m_ui->totalToday, m_ui->totalSheet, m_ui->totalChange);
    fill("gap", m_ui->gapLabel, m_ui->gapToday, m_ui->gapSheet, m_ui->gapChange);
    fill("gap_share", m_ui->shareLabel, m_ui->shareToday, m_ui->shareSheet, m_ui->shareChange);
    const LadderChange change = ladderChange(tier.units, prices);
    say(m_ui->unitsChanged, m_ui->unitsLabel->text(), m_ui->changeHeading->text(),

        tr("%1 of %2").arg(numberText(static_cast<double>(change.unitsChanged), 0), numberText(static_cast<double>(tier.units.size()), 0)));

    QStringList remarks = sheetRemarks(tier, prices, sheet, m_rules, m_currency);
    for (QString& remark : remarks)
        remark.prepend(QStringLiteral("⚠ "));
    m_ui->remarksLabel->setText(remarks.join(u'\n'));
    m_ui->remarksLabel->setVisible(!remarks.isEmpty());
    m_ui->changedOnlyBox->setEnabled(change.unitsChanged > 0);
}

void SheetDialog::dress()
{
    QFont title = font();
    title.setPointSizeF(title.pointSizeF() * 1.4);
    title.setWeight(QFont::DemiBold);
    m_ui->titleLabel->setFont(title);
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    for (QLabel* label : {m_ui->unitsChanged, m_ui->totalSheet, m_ui->gapSheet, m_ui->shareSheet, m_ui->resultLabel})
        label->setFont(strong);

    QTableView* table = m_ui->rowsTable;
    table->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
    const int money = fontMetrics().horizontalAdvance(QStringLiteral("+88,888,888.88")) + 16;
    for (int column = SheetModel::statusColumn; column <= SheetModel::percentColumn; ++column)
        table->horizontalHeader()->resizeSection(column, money);
}

void SheetDialog::changeEvent(QEvent* event)
{
    QDialog::changeEvent(event);
    if (event->type() == QEvent::FontChange)
        dress();
}

void SheetDialog::save()
{
    const QString path = m_questions.savePath(this, tr("Save the price sheet"), m_suggestion, tr("Price sheet (*.csv)"));
    if (path.isEmpty())
        return;
    const QString target = withSuffix(path, QStringLiteral("csv"));
    const Outcome<bool> written = saveSheet(m_rows, m_currency, target);
    if (!written.ok()) {
        showResult(tr("Not saved: %1").arg(QString::fromStdString(written.trouble())), false);
        return;
    }
    const auto rows = static_cast<double>(m_rows.size());
    const QString agree = m_rows.size() == 1 ? tr("1 row agrees") : tr("%1 rows agree").arg(numberText(rows, 0));
    showResult(tr("Written and read back: %1. %2").arg(agree, target), true);
    emit saved(target);
    if (m_signed.whenUtc.empty()) {
        m_signed.whenUtc = QDateTime::currentDateTimeUtc().toString(Qt::ISODate).toStdString();
        emit leftTheTool();
    }
}

void SheetDialog::showResult(const QString& sentence, bool good)
{
    m_ui->resultLabel->setText((good ? QStringLiteral("✓ ") : QStringLiteral("⚠ ")) + sentence);
    m_ui->resultLabel->show();
    // The sheet is out: what is left to do is to close.
    (good ? m_ui->closeButton : m_ui->saveButton)->setDefault(true);
    (good ? m_ui->closeButton : m_ui->saveButton)->setFocus();
    QAccessibleEvent alert(m_ui->resultLabel, QAccessible::Alert);
    QAccessible::updateAccessibility(&alert);
    emit told(sentence);
}

} // namespace rungwright
