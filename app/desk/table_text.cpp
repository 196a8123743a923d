// SPDX-License-Identifier: GPL-3.0-or-later
#include "table_text.h"

#include "sheet_cells.h"

#include <QAction>
#include <QClipboard>
#include <QCoreApplication>
#include <QGuiApplication>
#include <QHeaderView>
#include <QItemSelectionModel>
#include <QStringList>
#include <QTableView>

#include <algorithm>
#include <vector>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("TableText", text); }

/// Logical sections in the order shown.
std::vector<int> shownSections(const QHeaderView& header)
{
    std::vector<int> sections;
    for (int visual = 0; visual < header.count(); ++visual) {
        const int logical = header.logicalIndex(visual);
        if (!header.isSectionHidden(logical))
            sections.push_back(logical);
    }
    return sections;
}

QString guardedText(const QString& text) { return QString::fromStdString(guarded(text.toStdString())); }

/// A sign and a figure, with a percent sign perhaps: a spreadsheet makes a number of it and nothing worse.
bool looksLikeNumber(const QString& text)
{
    const auto harmless = [](QChar c) { return c.isDigit() || c.isSpace() || QStringLiteral(".,'’%").contains(c); };
    return (text.startsWith(u'+') || text.startsWith(u'-')) && std::all_of(text.cbegin() + 1, text.cend(), harmless);
}

QString quotedIfNeeded(QString text)
{
    const auto special = [](QChar c) { return c == u'\t' || c == u'\n' || c == u'\r' || c == u'"'; };
    if (std::none_of(text.cbegin(), text.cend(), special))
        return text;
    return u'"' + text.replace(u'"', QStringLiteral("\"\"")) + u'"';
}

QString cellText(const QModelIndex& index)
{
    const QVariant copied = index.data(kCopyRole);
    QString text = (copied.isValid() ? copied : index.data(Qt::DisplayRole)).toString();
    const QVariant value = index.data(kValueRole);
    const bool isNumber = value.isValid() ? value.typeId() != QMetaType::QString : looksLikeNumber(text);
    return quotedIfNeeded(isNumber ? std::move(text) : guardedText(text));
}

QString headingText(const QAbstractItemModel& model, int section, Qt::Orientation orientation)
{
    QVariant heading = model.headerData(section, orientation, kCopyRole);
    if (!heading.isValid())
        heading = model.headerData(section, orientation, Qt::DisplayRole);
    return quotedIfNeeded(guardedText(heading.toString().simplified()));
}

/// What is to be copied, in the order shown.
struct Cells {
    std::vector<int> rows;
    std::vector<int> columns;
    bool whole = false;
};

Cells cellsOf(const QTableView& view, CopyPart part)
{
    Cells cells{shownSections(*view.verticalHeader()), shownSections(*view.horizontalHeader()), part == CopyPart::everything};
    if (cells.whole)
        return cells;
    const QItemSelectionModel& selection = *view.selectionModel();
    std::vector<bool> row(static_cast<std::size_t>(view.verticalHeader()->count()));
    std::vector<bool> column(static_cast<std::size_t>(view.horizontalHeader()->count()));
    for (const QModelIndex& index : selection.selectedIndexes()) {
        row[static_cast<std::size_t>(index.row())] = true;
        column[static_cast<std::size_t>(index.column())] = true;
    }
    std::erase_if(cells.rows, [&](int i) { return !row[static_cast<std::size_t>(i)]; });
    std::erase_if(cells.columns, [&](int i) { return !column[static_cast<std::size_t>(i)]; });
    return cells;
}

} // namespace

QString copiedText(const QTableView& view, CopyPart part)
{
    if (!view.model() || !view.selectionModel())
        return {};
    const Cells cells = cellsOf(view, part);
    if (cells.columns.empty() || (cells.rows.empty() && !cells.whole))
        return {};
    const QAbstractItemModel& model = *view.model();
    // A row header that names its rows is copied as a first column; one that only counts them is switched off in our tables.
    const bool rowNames = !view.verticalHeader()->isHidden();
    const bool oneCell = cells.rows.size() == 1 && cells.columns.size() == 1 && !cells.whole;

    QStringList lines;
    if (!oneCell) {
        QStringList line;
        if (rowNames)
            line << QString();
        for (const int column : cells.columns)
            line << headingText(model, column, Qt::Horizontal);
        lines << line.join(u'\t');
    }
    for (const int row : cells.rows) {
        QStringList line;
        if (rowNames && !oneCell)
            line << headingText(model, row, Qt::Vertical);
        for (const int column : cells.columns) {
            const QModelIndex index = model.index(row, column);
            line << (cells.whole || view.selectionModel()->isSelected(index) ? cellText(index) : QString());
        }
        lines << line.join(u'\t');
    }
    return lines.join(u'\n');
}

int copyTable(const QTableView& view, CopyPart part)
{
    const QString text = copiedText(view, part);
    if (text.isEmpty())
        return 0;
    QGuiApplication::clipboard()->setText(text);
    return static_cast<int>(cellsOf(view, part).rows.size());
}

void makeCopyable(QTableView& view)
{
    auto* copy = new QAction(tr("&Copy"), &view);
    copy->setObjectName(QStringLiteral("copyAction"));
    copy->setShortcut(QKeySequence::Copy);
    copy->setShortcutContext(Qt::WidgetShortcut);
    QObject::connect(copy, &QAction::triggered, &view, [&view] { copyTable(view, CopyPart::selection); });

    auto* all = new QAction(tr("Copy &all"), &view);
    all->setObjectName(QStringLiteral("copyAllAction"));
    QObject::connect(all, &QAction::triggered, &view, [&view] { copyTable(view, CopyPart::everything); });

    view.addActions({copy, all});
    view.setContextMenuPolicy(Qt::ActionsContextMenu);
}

} // namespace rungwright
