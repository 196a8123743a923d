// SPDX-License-Identifier: GPL-3.0-or-later
#include "refresh_dialog.h"

#include "caution.h"
#include "file_names.h"
#include "plot_words.h"
#include "questions.h"
#include "table_text.h"
#include "ui_refresh_dialog.h"
#include "whole_file.h"
#include "wording.h"
#include "words.h"

#include <QAccessible>
#include <QAction>
#include <QClipboard>
#include <QEvent>
#include <QFileInfo>
#include <QGuiApplication>
#include <QHeaderView>

namespace rungwright
{

namespace
{

/// More than that is nothing for a clipboard, and for nobody to wait for.
constexpr int kMostCopied = 20'000;

} // namespace

RefreshDialog::RefreshDialog(const RefreshPlan& plan, const Currency& currency, const QString& listName, QWidget* parent,
                             Questions* questions, const QStringList& warnings) :
    QDialog(parent),
    m_ownQuestions(questions ? nullptr : std::make_unique<Questions>()),
    m_questions(questions ? questions : m_ownQuestions.get()),
    m_plan(plan),
    m_currency(currency),
    m_listName(QFileInfo(listName).fileName()),
    m_table(plan, currency),
    m_topics(refreshTopics(plan, currency)),
    m_ui(std::make_unique<Ui::RefreshDialog>()),
    m_work(this)
{
    m_ui->setupUi(this);
    m_ui->titleLabel->setText(tr("Refresh from %1").arg(isolated(shownText(m_listName))));
    m_ui->titleLabel->setToolTip(listName);
    m_ui->warningsLabel->setText(QStringLiteral("⚠ ") + warnings.join(QStringLiteral("\n⚠ ")));
    m_ui->warningsLabel->setVisible(!warnings.isEmpty());
    showSummary(plan);
    m_ui->cautionLabel->setText(cautionText());
    m_ui->resultLabel->hide();

    QTableView* table = m_ui->linesTable;
    table->setModel(&m_table);
    table->horizontalHeader()->setHighlightSections(false);
    table->horizontalHeader()->setResizeContentsPrecision(200); // of a hundred thousand lines the first tell how wide they are
    makeCopyable(*table);
    for (const auto& [name, part] : {std::pair("copyAction", CopyPart::selection), std::pair("copyAllAction", CopyPart::everything)}) {
        auto* action = table->findChild<QAction*>(QLatin1String(name));
        action->disconnect(table);
        connect(action, &QAction::triggered, this, [this, part = part] { copy(part); });
    }
    dress();
    fillTopics();

    connect(m_ui->topicsList, &QListWidget::currentRowChanged, this, &RefreshDialog::showTopic);
    connect(m_ui->copyButton, &QPushButton::clicked, this, [this] { copy(CopyPart::everything); });
    connect(m_ui->saveButton, &QPushButton::clicked, this, &RefreshDialog::save);
    connect(m_ui->refreshButton, &QPushButton::clicked, this, &QDialog::accept);
    connect(m_ui->leaveButton, &QPushButton::clicked, this, &QDialog::reject);

    const bool anything = !m_topics.empty();
    for (QWidget* widget :
         std::initializer_list<QWidget*>{m_ui->topicsList, table, m_ui->copyButton, m_ui->saveButton, m_ui->keptLabel, m_ui->cautionLabel})
        widget->setVisible(anything);
    // With nothing to take there is nothing to refresh; marks of the week before are reason enough.
    const bool useful = !plan.changesNothing() || plan.seenCleared > 0;
    m_ui->refreshButton->setEnabled(useful);
    (useful ? m_ui->refreshButton : m_ui->leaveButton)->setDefault(true);
    if (anything) {
        m_ui->topicsList->setCurrentRow(1); // the first is a heading
        m_ui->topicsList->setFocus();
    } else {
        adjustSize();
        m_ui->leaveButton->setFocus();
    }
}

RefreshDialog::~RefreshDialog() = default;

void RefreshDialog::showSummary(const RefreshPlan& plan)
{
    const auto show = [](QLabel* label, const QString& sentence) {
        label->setText(sentence);
        label->setVisible(!sentence.isEmpty());
    };
    show(m_ui->sentenceLabel, refreshSentence(plan));
    show(m_ui->candidatesLabel, candidatesSentence(plan));
    show(m_ui->signedLabel, signedSentence(plan.signedTiers));
}

void RefreshDialog::fillTopics()
{
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    const int line = fontMetrics().height() + 6;
    for (const RefreshTopic& topic : m_topics) {
        const bool laterHeading = topic.what == RefreshTopic::What::heading && m_ui->topicsList->count() > 0;
        auto* item = new QListWidgetItem(topic.text, m_ui->topicsList);
        item->setSizeHint({fontMetrics().horizontalAdvance(topic.text), laterHeading ? line + 12 : line});
        item->setTextAlignment(Qt::AlignLeft | (laterHeading ? Qt::AlignBottom : Qt::AlignVCenter));
        if (topic.what == RefreshTopic::What::heading) {
            item->setFlags(Qt::NoItemFlags);
            item->setFont(strong);
            item->setForeground(palette().color(QPalette::PlaceholderText));
        } else {
            item->setFlags(Qt::ItemIsEnabled | Qt::ItemIsSelectable);
        }
    }
    // As wide as its longest line: what is counted there is not cut, and headings are bold.
    int width = 0;
    for (const RefreshTopic& topic : m_topics)
        width = qMax(width, QFontMetrics(strong).horizontalAdvance(topic.text));
    m_ui->topicsList->setFixedWidth(qMin(width + 40, 400));
}

void RefreshDialog::showTopic(int row)
{
    if (row < 0)
        return;
    const RefreshTopic& topic = m_topics[static_cast<std::size_t>(row)];
    if (topic.what == RefreshTopic::What::heading)
        return;
    m_table.show(topic);
    m_ui->linesTable->setAccessibleName(topic.text);
    m_ui->linesTable->scrollToTop();
    fitColumns();
    const auto counted = [](std::int64_t count) { return numberText(static_cast<double>(count), 0); };
    m_ui->keptLabel->setText(
        topic.kept < topic.count
            ? tr("%1 of %2 lines shown: the first %3 of each kind. All are counted, and all are taken.")
                  .arg(counted(topic.kept), counted(topic.count), counted(static_cast<std::int64_t>(kRefreshLinesKept)))
            : QString());
    m_ui->keptLabel->setVisible(topic.kept < topic.count);
}

void RefreshDialog::fitColumns()
{
    QTableView* table = m_ui->linesTable;
    QHeaderView* header = table->horizontalHeader();
    header->setStretchLastSection(false);
    table->resizeColumnsToContents();
    const int most = fontMetrics().averageCharWidth() * 30;
    int room = table->viewport()->width();
    for (int column = 0; column < m_table.columnCount(); ++column) {
        header->resizeSection(column, qMin(header->sectionSize(column), most));
        room -= header->sectionSize(column);
    }
    // What is over goes evenly to all columns, so that figures stay near the names they belong to. Where nothing is, a little air must do.
    const int more = qMax(room / qMax(m_table.columnCount(), 1), 4);
    for (int column = 0; column < m_table.columnCount(); ++column)
        header->resizeSection(column, header->sectionSize(column) + more);
}

void RefreshDialog::dress()
{
    QFont title = font();
    title.setPointSizeF(title.pointSizeF() * 1.4);
    title.setWeight(QFont::DemiBold);
    m_ui->titleLabel->setFont(title);
    m_ui->linesTable->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
}

void RefreshDialog::changeEvent(QEvent* event)
{
    QDialog::changeEvent(event);
    if (event->type() == QEvent::FontChange)
        dress();
}

void RefreshDialog::showEvent(QShowEvent* event)
{
    QDialog::showEvent(event);
    fitColumns(); // only now is it known how wide the table is
}

void RefreshDialog::copy(CopyPart part)
{
    const QTableView& table = *m_ui->linesTable;
    const auto rows = part == CopyPart::everything ? m_table.rowCount() : static_cast<int>(table.selectionModel()->selectedRows().size());
    if (rows > kMostCopied) {
        showResult(tr("⚠ Not copied: %1 rows are too many at once. Save the table as CSV, or select no more than %2 rows.")
                       .arg(numberText(rows, 0), numberText(kMostCopied, 0)));
        return;
    }
    const QString text = copiedText(table, part);
    if (text.isEmpty())
        return;
    // Below the rows, where it hinders no pasting.
    QString caution = cautionText();
    caution.replace(QLatin1Char('"'), QStringLiteral("\"\""));
    QGuiApplication::clipboard()->setText(text + QStringLiteral("\n\n\"%1\"").arg(caution));
    showResult(rows == 1 ? tr("1 row copied.") : tr("%1 rows copied.").arg(numberText(rows, 0)));
}

void RefreshDialog::save()
{
    const int row = m_ui->topicsList->currentRow();
    const QString topic = row < 0 ? QString() : m_topics[static_cast<std::size_t>(row)].text;
    const QString suggestion = fileNameFrom({QFileInfo(m_listName).completeBaseName(), tr("refresh"), topic}, QStringLiteral("csv"));
    const QString path = m_questions->savePath(this, tr("Save the table"), suggestion, tr("Comma-separated table (*.csv)"));
    if (path.isEmpty() || m_work.busy())
        return;
    const QString target = withSuffix(path, QStringLiteral("csv"));
    const RefreshTopic shown = row < 0 ? RefreshTopic() : m_topics[static_cast<std::size_t>(row)];
    m_work.start<Outcome<bool>>(
        tr("Saving %1 …").arg(QFileInfo(target).fileName()),
        [lines = RefreshLines(m_plan, m_currency, shown), target](const LongWork::Progress& progress) -> Outcome<bool> {
            const std::optional<QByteArray> csv = lines.csv(progress);
            if (!csv)
                return Trouble{};
            return writeWhole(target, *csv);
        },
        [this, target](std::optional<Outcome<bool>> written) {
            if (!written)
                showResult(tr("⚠ Saving was given up: look whether %1 is there before you use it.").arg(target));
            else if (written->ok())
                showResult(tr("✓ Table saved: %1").arg(target));
            else
                showResult(tr("⚠ Not saved: %1").arg(QString::fromStdString(written->trouble())));
        });
}

void RefreshDialog::showResult(const QString& sentence)
{
    m_ui->resultLabel->setText(sentence);
    m_ui->resultLabel->show();
    QAccessibleEvent alert(m_ui->resultLabel, QAccessible::Alert);
    QAccessible::updateAccessibility(&alert);
}

} // namespace rungwright
