// SPDX-License-Identifier: GPL-3.0-or-later
#include "import_columns.h"

#include "elided_label.h"
#include "import_words.h"
#include "look.h"
#include "questions.h"
#include "wording.h"
#include "words.h"

#include <QComboBox>
#include <QGridLayout>
#include <QHBoxLayout>
#include <QLineEdit>
#include <QPushButton>
#include <QScopedValueRollback>
#include <QStandardItemModel>

namespace rungwright
{

namespace
{

constexpr int kLongestExample = 18; ///< Characters.
constexpr auto kFloor = static_cast<std::size_t>(Column::advertisedFloor);

QString nameOf(std::size_t column) { return QString::fromUtf8(kColumnNames[column].data(), qsizetype(kColumnNames[column].size())); }

QString exampleText(const QString& example)
{
    const QString text = example.simplified();
    return text.size() > kLongestExample ? text.left(kLongestExample - 1) + QStringLiteral("…") : text;
}

/// The header stands in the field beside it already.
QString whyText(const ColumnNote& note, const QString& header)
{
    QString why = note.note;
    if (!header.isEmpty()) {
        why.replace(ImportColumns::tr("the header '%1'").arg(shownText(header)), ImportColumns::tr("its header"));
        why.replace(ImportColumns::tr("the values under '%1'").arg(shownText(header)), ImportColumns::tr("its values"));
    }
    return note.confidence == Confidence::guess ? ImportColumns::tr("a guess: %1").arg(why) : why;
}

QString constantHint(std::size_t column)
{
    switch (static_cast<Column>(column)) {
    case Column::status:
        return ImportColumns::tr("vacant, occupied, reserved or closed");
    case Column::askingPrice:
    case Column::advertisedFloor:
        return ImportColumns::tr("for example 69.00");
    case Column::currency:
        return ImportColumns::tr("for example EUR");
    case Column::vacancyChance:
        return ImportColumns::tr("0 to 1, for example 0.25");
    case Column::locked:
        return ImportColumns::tr("yes or no");
    default:
        return ImportColumns::tr("the value for every row");
    }
}

} // namespace

ImportColumns::ImportColumns(Questions& questions, QWidget* parent) : QWidget(parent), m_questions(questions) { build(); }

void ImportColumns::build()
{
    auto* grid = new QGridLayout(this);
    grid->setContentsMargins(0, 0, 8, 0);
    grid->setHorizontalSpacing(8);
    grid->setVerticalSpacing(4);
    grid->setColumnStretch(1, 3);
    grid->setColumnStretch(2, 2);
    int line = 0;
    for (std::size_t i = 0; i < m_rows.size(); ++i) {
        if (i == kColumnsNeeded) {
            auto* heading = new QLabel(tr("Not needed, used where the list has it"));
            heading->setTextFormat(Qt::PlainText);
            heading->setContentsMargins(0, 8, 0, 0);
            grid->addWidget(heading, line++, 0, 1, 3);
        }
        Row& row = m_rows[i];
        const QString title = columnTitle(static_cast<Column>(i));
        row.title = new QLabel(title);
        row.source = new QComboBox;
        row.source->setObjectName(nameOf(i) + QStringLiteral("Source"));
        row.source->setAccessibleName(tr("%1 comes from").arg(title));
        row.source->setSizeAdjustPolicy(QComboBox::AdjustToMinimumContentsLengthWithIcon);
        row.source->setMinimumContentsLength(16);
        row.title->setBuddy(row.source);
        row.note = new ElidedLabel;
        row.note->setObjectName(nameOf(i) + QStringLiteral("Note"));
        row.note->setTextFormat(Qt::PlainText);
        row.note->setAccessibleDescription(tr("%1: why").arg(title));
        row.note->setSizePolicy(QSizePolicy::Ignored, QSizePolicy::Preferred);
        row.constant = new QLineEdit;
        row.constant->setObjectName(nameOf(i) + QStringLiteral("Constant"));
        row.constant->setAccessibleName(tr("%1 for every row").arg(title));
        row.constant->setPlaceholderText(constantHint(i));
        grid->addWidget(row.title, line, 0);
        grid->addWidget(row.source, line, 1);
        grid->addWidget(row.note, line++, 2);
        grid->addWidget(row.constant, line++, 1);
        if (i == kFloor) {
            m_floorsPath = new QLineEdit;
            m_floorsPath->setObjectName(QStringLiteral("floorsPath"));
            m_floorsPath->setAccessibleName(tr("File of floors"));
            m_floorsPath->setPlaceholderText(tr("columns site, tier, advertised_floor"));
            m_browse = new QPushButton(tr("Bro&wse…"));
            m_browse->setObjectName(QStringLiteral("floorsBrowse"));
            m_browse->setAutoDefault(false);
            grid->addWidget(m_floorsPath, line, 1);
            grid->addWidget(m_browse, line++, 2, Qt::AlignLeft);
            connect(m_floorsPath, &QLineEdit::textChanged, this, &ImportColumns::changed);
            connect(m_browse, &QPushButton::clicked, this, &ImportColumns::browse);
        }
        connect(row.source, &QComboBox::currentIndexChanged, this, [this, i] { onChosen(i); });
        connect(row.constant, &QLineEdit::textChanged, this, [this] {
            if (!m_filling)
                emit changed();
        });
        fillSources(i);
        showRow(i);
    }
    grid->setRowStretch(line, 1);
}

void ImportColumns::fillSources(std::size_t at)
{
    const QScopedValueRollback filling(m_filling, true);
    QComboBox* combo = m_rows[at].source;
    combo->clear();
    if (at == kFloor) {
        combo->addItem(tr("choose …"), absent);
        combo->addItem(tr("one value for all rows"), constant);
        combo->addItem(tr("a second file"), floorsFile);
        combo->addItem(tr("none is known"), noFloors);
    } else {
        combo->addItem(at < kColumnsNeeded ? tr("choose …") : tr("not there"), absent);
        if (at != static_cast<std::size_t>(Column::unit)) // the units would all have one name
            combo->addItem(tr("one value for all rows"), constant);
    }
    if (!m_headers.isEmpty())
        combo->insertSeparator(combo->count());
    for (qsizetype place = 0; place < m_headers.size(); ++place) {
        const QString example = exampleText(m_examples.value(place));
        const QString header = headerText(m_headers, place).simplified();
        combo->addItem(example.isEmpty() ? header : tr("%1  ·  %2").arg(header, example), static_cast<int>(place));
    }
}

void ImportColumns::setTheirs(const QStringList& headers, const QStringList& examples)
{
    if (headers == m_headers && examples == m_examples)
        return;
    m_headers = headers;
    m_examples = examples;
    for (std::size_t i = 0; i < m_rows.size(); ++i)
        fillSources(i);
}

void ImportColumns::setMapping(const ImportMapping& mapping, const std::array<ColumnNote, kColumnNames.size()>& notes)
{
    const QScopedValueRollback filling(m_filling, true);
    for (std::size_t i = 0; i < m_rows.size(); ++i) {
        const ColumnSource& source = mapping.sources[i];
        int choice = absent;
        if (source.kind == ColumnSource::Kind::constant)
            choice = constant;
        else if (source.kind == ColumnSource::Kind::column)
            choice = static_cast<int>(placeOf(m_headers, source.column)); // -1 where the list does not have it: to be chosen
        else if (i == kFloor && mapping.floorsFromFile)
            choice = floorsFile;
        else if (i == kFloor && mapping.floorsMayBeMissing)
            choice = noFloors;
        m_rows[i].constant->setText(source.kind == ColumnSource::Kind::constant ? source.constant : QString());
        m_rows[i].why = whyText(notes[i], source.column.header);
        choose(i, choice);
        showRow(i);
    }
}

void ImportColumns::choose(std::size_t row, int choice)
{
    QComboBox* combo = m_rows[row].source;
    combo->setCurrentIndex(std::max(0, combo->findData(choice)));
}

int ImportColumns::choiceOf(std::size_t row) const
{
    const QVariant chosen = m_rows[row].source->currentData();
    return chosen.isValid() ? chosen.toInt() : static_cast<int>(absent);
}

void ImportColumns::writeTo(ImportMapping& mapping) const
{
    const bool columnWas = mapping.from(Column::advertisedFloor).kind == ColumnSource::Kind::column;
    for (std::size_t i = 0; i < m_rows.size(); ++i) {
        const int choice = choiceOf(i);
        if (choice >= 0)
            mapping.sources[i] = {ColumnSource::Kind::column, columnAt(m_headers, choice), {}};
        else if (choice == constant)
            mapping.sources[i] = ColumnSource::always(m_rows[i].constant->text().trimmed());
        else
            mapping.sources[i] = {};
    }
    const int floors = choiceOf(kFloor);
    mapping.floorsFromFile = floors == floorsFile;
    // A column with floors for some tiers only, as a saved mapping may say, stays as it was said.
    mapping.floorsMayBeMissing = floors == noFloors || (mapping.floorsMayBeMissing && floors >= 0 && columnWas);
}

QString ImportColumns::floorsPath() const { return choiceOf(kFloor) == floorsFile ? m_floorsPath->text().trimmed() : QString(); }

void ImportColumns::setFloorsPath(const QString& path) { m_floorsPath->setText(path); }

void ImportColumns::onChosen(std::size_t row)
{
    if (m_filling)
        return;
    m_rows[row].why = choiceOf(row) >= 0 ? tr("chosen by you") : QString();
    showRow(row);
    emit changed();
    if (choiceOf(row) == constant)
        m_rows[row].constant->setFocus();
}

void ImportColumns::showRow(std::size_t at)
{
    Row& row = m_rows[at];
    const int choice = choiceOf(at);
    row.constant->setVisible(choice == constant);
    if (at == kFloor) {
        m_floorsPath->setVisible(choice == floorsFile);
        m_browse->setVisible(choice == floorsFile);
    }
    QString note = row.why;
    if (choice == absent && at < kColumnsNeeded)
        note = tr("✕ needed");
    else if (choice == absent && at == static_cast<std::size_t>(Column::currency))
        note = tr("none is said");
    row.note->setText(note);
    row.note->setToolTip(row.why);
    row.note->setForegroundRole(QPalette::PlaceholderText);
}

void ImportColumns::showTroubles(const MappingPreview& preview)
{
    for (std::size_t i = 0; i < m_rows.size(); ++i) {
        showRow(i);
        if (preview.troubles[i] == 0)
            continue;
        QLabel* note = m_rows[i].note;
        const QString count = numberText(static_cast<double>(preview.troubles[i]), 0);
        note->setText(preview.troubles[i] == 1 ? tr("✕ 1 cell not understood") : tr("✕ %1 cells not understood").arg(count));
        note->setForegroundRole(QPalette::WindowText);
    }
}

void ImportColumns::browse()
{
    const QString path = m_questions.openPath(window(), tr("The file of floors"), tr("Lists (*.csv *.tsv *.txt);;All files (*)"));
    if (!path.isEmpty())
        m_floorsPath->setText(path);
}

} // namespace rungwright
