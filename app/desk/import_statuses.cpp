// SPDX-License-Identifier: GPL-3.0-or-later
#include "import_statuses.h"

#include "mapping_numbers.h"
#include "wording.h"

#include <QComboBox>
#include <QGridLayout>
#include <QLabel>
#include <QVBoxLayout>

#include <algorithm>
#include <array>

namespace rungwright
{

namespace
{

constexpr int kUnsaid = -1;
constexpr std::array kStatuses{Status::vacant, Status::occupied, Status::reserved, Status::closed};

QString statusWords(Status status)
{
    switch (status) {
    case Status::vacant:
        return ImportStatuses::tr("vacant: on offer");
    case Status::occupied:
        return ImportStatuses::tr("occupied: let");
    case Status::reserved:
        return ImportStatuses::tr("reserved");
    case Status::closed:
        return ImportStatuses::tr("closed: not to be let");
    }
    return {};
}

QString rowsText(qint64 count)
{
    return count == 1 ? ImportStatuses::tr("1 row") : ImportStatuses::tr("%1 rows").arg(numberText(static_cast<double>(count), 0));
}

const StatusWord* knownWord(const ImportMapping& mapping, const QString& word)
{
    const QString folded = foldedText(word);
    const auto same = std::find_if(mapping.statuses.begin(), mapping.statuses.end(),
                                   [&folded](const StatusWord& known) { return foldedText(known.word) == folded; });
    return same == mapping.statuses.end() ? nullptr : &*same;
}

} // namespace

ImportStatuses::ImportStatuses(QWidget* parent) : QWidget(parent), m_head(new QLabel), m_grid(new QGridLayout)
{
    auto* layout = new QVBoxLayout(this);
    layout->setContentsMargins(0, 8, 8, 0);
    layout->setSpacing(8);
    m_head->setObjectName(QStringLiteral("statusesHead"));
    m_head->setTextFormat(Qt::PlainText);
    m_head->setWordWrap(true);
    m_grid->setHorizontalSpacing(16);
    m_grid->setVerticalSpacing(4);
    m_grid->setColumnStretch(0, 1);
    layout->addWidget(m_head);
    layout->addLayout(m_grid);
    layout->addStretch(1);
}

void ImportStatuses::clear()
{
    m_rows.clear();
    while (QLayoutItem* item = m_grid->takeAt(0)) {
        // Not at once: what led here may be one of them.
        if (QWidget* widget = item->widget()) {
            widget->hide();
            widget->deleteLater();
        }
        delete item;
    }
}

void ImportStatuses::show(const std::vector<DistinctValue>& words, const ImportMapping& mapping, bool wholeFile)
{
    clear();
    m_head->setText(words.empty() ? tr("The status comes from no column: there are no words to say anything about.")
                    : wholeFile   ? tr("What the list's words stand for.")
                                  : tr("What the list's words stand for. Counted in its first rows."));
    for (const DistinctValue& value : words)
        add(value, mapping);
}

void ImportStatuses::showMore(const std::vector<DistinctValue>& words, const ImportMapping& mapping)
{
    m_head->setText(tr("What the list's words stand for."));
    for (const DistinctValue& value : words) {
        const auto there = std::find_if(m_rows.begin(), m_rows.end(), [&value](const Row& row) { return row.word == value.text; });
        if (there == m_rows.end())
            add(value, mapping);
        else
            there->count->setText(rowsText(value.count));
    }
}

void ImportStatuses::add(const DistinctValue& value, const ImportMapping& mapping)
{
    const int line = static_cast<int>(m_rows.size());
    const QString shown = value.text.isEmpty() ? tr("(an empty cell)") : value.text;
    auto* word = new QLabel(shown);
    word->setTextFormat(Qt::PlainText);
    auto* count = new QLabel(rowsText(value.count));
    count->setTextFormat(Qt::PlainText);
    count->setForegroundRole(QPalette::PlaceholderText);
    count->setAlignment(Qt::AlignRight | Qt::AlignVCenter);
    auto* status = new QComboBox;
    status->setObjectName(QStringLiteral("statusOf%1").arg(line));
    status->setAccessibleName(tr("%1 stands for").arg(shown));
    word->setBuddy(status);
    status->addItem(tr("not said: refused"), kUnsaid);
    for (const Status one : kStatuses)
        status->addItem(statusWords(one), static_cast<int>(one));
    const StatusWord* known = knownWord(mapping, value.text);
    if (known != nullptr)
        status->setCurrentIndex(status->findData(static_cast<int>(known->status)));
    m_grid->addWidget(word, line, 0);
    m_grid->addWidget(count, line, 1);
    m_grid->addWidget(status, line, 2);
    m_rows.push_back({value.text, count, status});
    connect(status, &QComboBox::currentIndexChanged, this, &ImportStatuses::changed);
}

void ImportStatuses::writeTo(ImportMapping& mapping) const
{
    for (const Row& row : m_rows) {
        const QString folded = foldedText(row.word);
        std::erase_if(mapping.statuses, [&folded](const StatusWord& known) { return foldedText(known.word) == folded; });
        const int status = row.status->currentData().toInt();
        if (status != kUnsaid)
            mapping.statuses.push_back({row.word, static_cast<Status>(status)});
    }
}

int ImportStatuses::unsaid() const
{
    return static_cast<int>(
        std::count_if(m_rows.begin(), m_rows.end(), [](const Row& row) { return row.status->currentData().toInt() == kUnsaid; }));
}

} // namespace rungwright
