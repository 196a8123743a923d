// SPDX-License-Identifier: GPL-3.0-or-later
#include "refused_rows_dialog.h"

#include "plot_words.h"
#include "table_text.h"
#include "ui_refused_rows_dialog.h"
#include "wording.h"
#include "words.h"

#include <QEvent>
#include <QFileInfo>
#include <QHeaderView>

namespace rungwright
{

namespace
{

QString counted(qint64 count) { return numberText(static_cast<double>(count), 0); }

/// "1,234 rows refused, the first 1,000 shown; 2,390 rows are fine."
QString countText(const UnitListResult& result)
{
    const auto shown = static_cast<qint64>(result.refused.size());
    QString text = result.refusedCount == 1 ? RefusedRowsDialog::tr("1 row refused")
                                            : RefusedRowsDialog::tr("%1 rows refused").arg(counted(result.refusedCount));
    if (shown < result.refusedCount)
        text += RefusedRowsDialog::tr(", the first %1 shown").arg(counted(shown));
    if (result.rowsFine == 0)
        return text + RefusedRowsDialog::tr("; no row is left to go on with.");
    return text + (result.rowsFine == 1 ? RefusedRowsDialog::tr("; 1 row is fine.")
                                        : RefusedRowsDialog::tr("; %1 rows are fine.").arg(counted(result.rowsFine)));
}

} // namespace

RefusedRowsModel::RefusedRowsModel(std::vector<RefusedRow> rows, QObject* parent) : QAbstractTableModel(parent), m_rows(std::move(rows)) {}

int RefusedRowsModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_rows.size()); }

int RefusedRowsModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : columnCount_; }

QVariant RefusedRowsModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const RefusedRow& row = m_rows[static_cast<std::size_t>(index.row())];
    if (role == Qt::TextAlignmentRole)
        return QVariant((index.column() == lineColumn ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    if (role == kValueRole && index.column() == lineColumn)
        return row.line;
    if (role != Qt::DisplayRole && role != kValueRole)
        return {};
    switch (index.column()) {
    case lineColumn:
        // Without grouping: it is a place to go to in an editor, not an amount.
        return QString::number(row.line);
    case columnColumn:
        if (row.column == 0)
            return tr("whole row");
        return row.columnName.isEmpty() ? QString::number(row.column) : tr("%1 (%2)").arg(row.columnName, QString::number(row.column));
    case wrongColumn:
        return row.wrong;
    case foundColumn:
        return row.found.isEmpty() ? tr("nothing") : row.found;
    default:
        return row.wanted;
    }
}

QVariant RefusedRowsModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal || section < 0 || section >= columnCount_)
        return {};
    if (role == Qt::TextAlignmentRole)
        return QVariant((section == lineColumn ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    if (role != Qt::DisplayRole)
        return {};
    switch (section) {
    case lineColumn:
        return tr("Line");
    case columnColumn:
        return tr("Column");
    case wrongColumn:
        return tr("What is wrong");
    case foundColumn:
        return tr("Found");
    default:
        return tr("Wanted");
    }
}

RefusedRowsDialog::RefusedRowsDialog(const UnitListResult& result, const QString& fileName, QWidget* parent) :
    QDialog(parent),
    m_fileName(shownText(QFileInfo(fileName).fileName())),
    m_model(result.refused),
    m_ui(std::make_unique<Ui::RefusedRowsDialog>())
{
    m_ui->setupUi(this);
    m_ui->titleLabel->setText(tr("Not every row of %1 can be taken").arg(isolated(m_fileName)));
    m_ui->titleLabel->setToolTip(fileName);
    m_ui->countLabel->setText(countText(result));
    m_ui->goOnButton->setEnabled(result.rowsFine > 0);
    m_ui->mapButton->hide();

    QTableView* table = m_ui->rowsTable;
    table->setModel(&m_model);
    makeCopyable(*table);
    QHeaderView* header = table->horizontalHeader();
    header->setHighlightSections(false);
    header->setResizeContentsPrecision(kRefusedRowsKept);
    table->resizeColumnsToContents();
    header->setSectionResizeMode(RefusedRowsModel::wantedColumn, QHeaderView::Stretch);
    header->setMinimumSectionSize(fontMetrics().averageCharWidth() * 6);
    for (const int column : {RefusedRowsModel::columnColumn, RefusedRowsModel::wrongColumn, RefusedRowsModel::foundColumn})
        header->resizeSection(column, std::min(header->sectionSize(column), fontMetrics().averageCharWidth() * 34));
    dress();

    connect(table->selectionModel(), &QItemSelectionModel::currentRowChanged, this,
            [this](const QModelIndex& at) { showDetail(at.isValid() ? at.row() : -1); });
    connect(m_ui->copyButton, &QPushButton::clicked, this, [table] { copyTable(*table, CopyPart::everything); });
    connect(m_ui->goOnButton, &QPushButton::clicked, this, &QDialog::accept);
    connect(m_ui->mapButton, &QPushButton::clicked, this, [this] { QDialog::done(mapColumns); });
    connect(m_ui->giveUpButton, &QPushButton::clicked, this, &QDialog::reject);
    table->setFocus();
    if (m_model.rowCount() > 0)
        table->selectRow(0);
}

RefusedRowsDialog::~RefusedRowsDialog() { m_ui->rowsTable->selectionModel()->disconnect(this); }

void RefusedRowsDialog::offerMapping(const QString& text)
{
    m_ui->mapButton->setText(text);
    m_ui->mapButton->show();
}

void RefusedRowsDialog::showDetail(int row) { m_ui->detailLabel->setText(row < 0 ? QString() : m_model.row(row).text(m_fileName)); }

void RefusedRowsDialog::dress()
{
    QFont title = font();
    title.setPointSizeF(title.pointSizeF() * 1.4);
    title.setWeight(QFont::DemiBold);
    m_ui->titleLabel->setFont(title);
    m_ui->rowsTable->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
}

void RefusedRowsDialog::changeEvent(QEvent* event)
{
    QDialog::changeEvent(event);
    if (event->type() == QEvent::FontChange)
        dress();
}

} // namespace rungwright
