// SPDX-License-Identifier: GPL-3.0-or-later
#include "figures_panel.h"

#include "look.h"
#include "table_text.h"
#include "ui_figures_panel.h"
#include "wording.h"

#include <QHeaderView>
#include <QPainter>
#include <QStyledItemDelegate>

namespace rungwright
{

namespace
{

/// Parts of a figure stand indented and in fainter ink below it.
class FigureDelegate : public QStyledItemDelegate
{
public:
    using QStyledItemDelegate::QStyledItemDelegate;

protected:
    void initStyleOption(QStyleOptionViewItem* option, const QModelIndex& index) const override
    {
        QStyledItemDelegate::initStyleOption(option, index);
        const int indent = index.siblingAtColumn(0).data(Qt::UserRole).toInt();
        const Look& look = Look::of(option->widget);
        const QColor ink = indent > 0 ? look.faintInk : look.ink;
        option->palette.setColor(QPalette::Text, ink);
        option->palette.setColor(QPalette::HighlightedText, ink);
        if (index.column() == FiguresModel::nameColumn)
            option->text.prepend(QString(indent, QChar(0x2003)));
    }
};

} // namespace

FiguresPanel::FiguresPanel(Workbench& bench, QWidget* parent) : QWidget(parent), m_model(bench), m_ui(std::make_unique<Ui::FiguresPanel>())
{
    m_ui->setupUi(this);
    QTableView* table = m_ui->figuresTable;
    table->setModel(&m_model);
    table->setItemDelegate(new FigureDelegate(table));
    table->verticalHeader()->setDefaultSectionSize(fontMetrics().height() + 8);
    QHeaderView* header = table->horizontalHeader();
    header->setMinimumSectionSize(fontMetrics().averageCharWidth() * 4);
    header->setSectionResizeMode(FiguresModel::nameColumn, QHeaderView::Stretch);
    int room = 0;
    for (const FigureRow& row : figureRows())
        room = qMax(room, fontMetrics().horizontalAdvance(tr(row.label)) + 14);
    for (const int column : {FiguresModel::currentColumn, FiguresModel::workedColumn, FiguresModel::changeColumn}) {
        header->setSectionResizeMode(column, QHeaderView::Interactive);
        const QString heading = m_model.headerData(column, Qt::Horizontal, Qt::DisplayRole).toString();
        const int figure = fontMetrics().horizontalAdvance(QStringLiteral("8,888.88")) + 12;
        header->resizeSection(column, qMax(figure, fontMetrics().horizontalAdvance(heading) + 10));
        room += header->sectionSize(column);
    }
    setMinimumWidth(room + 20); // no name is cut, and the scroll bar has its place
    // Room for the longest explanation, so that the table does not jump when another figure is chosen.
    m_ui->figureExplanation->setMinimumHeight(8 * fontMetrics().height());
    connect(table->selectionModel(), &QItemSelectionModel::currentRowChanged, this, &FiguresPanel::explain);
    makeCopyable(*table);
}

FiguresPanel::~FiguresPanel() = default;

void FiguresPanel::explain()
{
    const QModelIndex at = m_ui->figuresTable->currentIndex();
    if (at.isValid())
        m_ui->figureExplanation->setText(m_model.explanation(at.row()));
}

} // namespace rungwright
