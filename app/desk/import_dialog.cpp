// SPDX-License-Identifier: GPL-3.0-or-later
#include "import_dialog.h"

#include "import_columns.h"
#include "import_said.h"
#include "import_skips.h"
#include "import_statuses.h"
#include "import_words.h"
#include "mapping_numbers.h"
#include "plot_words.h"
#include "questions.h"
#include "table_text.h"
#include "trade_words.h"
#include "ui_import_dialog.h"
#include "words.h"

#include <QElapsedTimer>
#include <QFileInfo>
#include <QKeyEvent>
#include <QScopedValueRollback>
#include <QSettings>
#include <QtConcurrent>

#include <algorithm>

namespace rungwright
{

namespace
{

const auto kGeometry = QStringLiteral("import/geometry");
const auto kSplit = QStringLiteral("import/split");
constexpr int kSoonMs = 80;
/// A sample holds fewer rows than this; all of them are shown.
constexpr int kRowsShown = 2000;
constexpr int kStatusWords = 40;
constexpr int kTopLines = 12;

QString text(std::string_view utf8) { return QString::fromUtf8(utf8.data(), qsizetype(utf8.size())); }

} // namespace

ImportDialog::ImportDialog(ImportStart start, const MappingShelf& shelf, Questions& questions, QSettings& settings, QWidget* parent) :
    QDialog(parent),
    m_start(std::move(start)),
    m_shelf(shelf),
    m_questions(questions),
    m_settings(settings),
    m_ui(std::make_unique<Ui::ImportDialog>())
{
    m_ui->setupUi(this);
    m_columns = new ImportColumns(questions);
    m_statuses = new ImportStatuses;
    m_skips = new ImportSkips;
    m_ui->columnsArea->setWidget(m_columns);
    m_ui->wordsArea->setWidget(m_statuses);
    m_ui->skipArea->setWidget(m_skips);
    const QString name = isolated(shownText(QFileInfo(m_start.path).fileName()));
    m_ui->titleLabel->setText(tr("How %1 is to be read").arg(name));
    m_ui->titleLabel->setToolTip(m_start.path);
    QTableView* table = m_ui->previewTable;
    table->setModel(&m_preview);
    table->setItemDelegate(new ImportPreviewDelegate(table));
    makeCopyable(*table);
    table->installEventFilter(this);
    m_ui->topLines->installEventFilter(this);
    fillChoices();
    connectFields();
    dress();
    m_soon.setSingleShot(true);
    m_soon.setInterval(kSoonMs);
    connect(&m_soon, &QTimer::timeout, this, &ImportDialog::showPreview);
    connect(&m_counting, &QFutureWatcherBase::finished, this, [this] {
        if (m_mapping.from(Column::status).kind != ColumnSource::Kind::column)
            return;
        m_words = m_counting.result();
        learnTradeWords();
        m_statuses->showMore(m_words, m_mapping);
        showWhatIsMissing();
    });

    const auto fitting = m_shelf.matchingSample(m_start.sample.bytes, m_start.sample.whole);
    fillProfiles(m_start.mapping || fitting.empty() ? QString() : fitting.front().profile.name);
    if (m_start.mapping)
        use(*m_start.mapping, {}, {});
    else
        onProfile();
    m_columns->setFloorsPath(m_start.floors);
    if (!restoreGeometry(m_settings.value(kGeometry).toByteArray()))
        resize(1200, 680);
    if (!m_ui->splitter->restoreState(m_settings.value(kSplit).toByteArray()))
        m_ui->splitter->setSizes({480, 720});
    m_ui->splitter->setStretchFactor(1, 1);
    m_ui->importButton->setFocus();
}

ImportDialog::~ImportDialog()
{
    m_counting.disconnect(this);
    // A field that loses the focus while the dialog goes has nothing left to write to.
    for (QObject* part : std::initializer_list<QObject*>{m_columns, m_statuses, m_skips, m_ui->topLines, m_ui->marksEdit, m_ui->yesEdit,
                                                         m_ui->noEdit, m_ui->headerRowSpin})
        part->disconnect(this);
}

QString ImportDialog::floorsPath() const { return m_columns->floorsPath(); }

void ImportDialog::done(int result)
{
    m_settings.setValue(kGeometry, saveGeometry());
    m_settings.setValue(kSplit, m_ui->splitter->saveState());
    QDialog::done(result);
}

bool ImportDialog::eventFilter(QObject* watched, QEvent* event)
{
    if (event->type() == QEvent::KeyPress) {
        const int key = static_cast<QKeyEvent*>(event)->key(); // NOLINT(cppcoreguidelines-pro-type-static-cast-downcast): told by its type
        if (key == Qt::Key_Return || key == Qt::Key_Enter) {
            // In these Enter means the row it is on, never the import.
            if (watched == m_ui->topLines && m_ui->topLines->currentRow() >= 0)
                m_ui->headerRowSpin->setValue(m_ui->topLines->currentRow() + 1);
            return true;
        }
    }
    return QDialog::eventFilter(watched, event);
}

void ImportDialog::changeEvent(QEvent* event)
{
    QDialog::changeEvent(event);
    if (event->type() == QEvent::FontChange)
        dress();
}

void ImportDialog::dress()
{
    QFont title = font();
    title.setPointSizeF(title.pointSizeF() * 1.4);
    title.setWeight(QFont::DemiBold);
    m_ui->titleLabel->setFont(title);
    for (QLabel* hint : {m_ui->marksHint, m_ui->yesNoHint})
        hint->setForegroundRole(QPalette::PlaceholderText);
    m_ui->previewTable->verticalHeader()->setDefaultSectionSize(2 * fontMetrics().height() + 8);
    m_ui->previewTable->verticalHeader()->setSectionResizeMode(QHeaderView::Fixed);
}

void ImportDialog::fillChoices()
{
    const QScopedValueRollback filling(m_filling, true);
    for (const TextEncoding encoding : kTextEncodings)
        m_ui->encodingCombo->addItem(text(encodingWord(encoding)), static_cast<int>(encoding));
    const std::pair<char, QString> delimiters[] = {
        {',', tr("commas  ,")}, {';', tr("semicolons  ;")}, {'\t', tr("tabs")}, {'|', tr("bars  |")}};
    for (const auto& [sign, name] : delimiters)
        m_ui->delimiterCombo->addItem(name, static_cast<int>(sign));
    m_ui->headerLinesCombo->addItem(tr("one line"), 1);
    m_ui->headerLinesCombo->addItem(tr("two lines, read together"), 2);
    m_ui->decimalCombo->addItem(tr("a point: 69.00"), static_cast<int>(DecimalMark::point));
    m_ui->decimalCombo->addItem(tr("a comma: 69,00"), static_cast<int>(DecimalMark::comma));
    const std::pair<Grouping, QString> groupings[] = {{Grouping::none, tr("nothing: 1234")},
                                                      {Grouping::comma, tr("a comma: 1,234")},
                                                      {Grouping::point, tr("a point: 1.234")},
                                                      {Grouping::space, tr("a space: 1 234")},
                                                      {Grouping::apostrophe, tr("an apostrophe: 1’234")}};
    for (const auto& [grouping, name] : groupings)
        m_ui->groupingCombo->addItem(name, static_cast<int>(grouping));
}

void ImportDialog::connectFields()
{
    for (QComboBox* combo : {m_ui->encodingCombo, m_ui->delimiterCombo, m_ui->headerLinesCombo})
        connect(combo, &QComboBox::currentIndexChanged, this, &ImportDialog::onLayout);
    m_ui->headerRowSpin->setKeyboardTracking(false);
    connect(m_ui->headerRowSpin, &QSpinBox::valueChanged, this, &ImportDialog::onLayout);
    connect(m_ui->topLines, &QListWidget::itemDoubleClicked, this,
            [this](const QListWidgetItem* item) { m_ui->headerRowSpin->setValue(m_ui->topLines->row(item) + 1); });
    for (QComboBox* combo : {m_ui->decimalCombo, m_ui->groupingCombo})
        connect(combo, &QComboBox::currentIndexChanged, this, &ImportDialog::onFields);
    for (QLineEdit* edit : {m_ui->marksEdit, m_ui->yesEdit, m_ui->noEdit})
        connect(edit, &QLineEdit::textChanged, this, &ImportDialog::onFields);
    connect(m_ui->percentCheck, &QCheckBox::toggled, this, &ImportDialog::onFields);
    connect(m_columns, &ImportColumns::changed, this, &ImportDialog::onColumns);
    connect(m_statuses, &ImportStatuses::changed, this, &ImportDialog::onFields);
    connect(m_skips, &ImportSkips::changed, this, &ImportDialog::onFields);
    connect(m_ui->profileCombo, &QComboBox::activated, this, &ImportDialog::onProfile);
    connect(m_ui->saveProfileButton, &QPushButton::clicked, this, &ImportDialog::saveProfile);
    connect(m_ui->removeProfileButton, &QPushButton::clicked, this, &ImportDialog::removeProfile);
    connect(m_ui->importButton, &QPushButton::clicked, this, &QDialog::accept);
    connect(m_ui->cancelButton, &QPushButton::clicked, this, &QDialog::reject);
}

// Saved mappings -----------------------------------------------------------------------------------------------------

void ImportDialog::fillProfiles(const QString& chosen)
{
    const QScopedValueRollback filling(m_filling, true);
    m_profiles = m_shelf.matchingSample(m_start.sample.bytes, m_start.sample.whole);
    const std::size_t fitting = m_profiles.size();
    for (MappingShelf::Entry& entry : m_shelf.list()) {
        const auto same = [&entry](const MappingShelf::Entry& known) { return known.path == entry.path; };
        if (std::none_of(m_profiles.begin(), m_profiles.end(), same))
            m_profiles.push_back(std::move(entry));
    }
    QComboBox* combo = m_ui->profileCombo;
    combo->clear();
    combo->addItem(tr("as proposed"), -1);
    for (std::size_t i = 0; i < m_profiles.size(); ++i) {
        if (i == fitting)
            combo->insertSeparator(combo->count());
        combo->addItem(m_profiles[i].profile.name, static_cast<int>(i));
        if (!chosen.isEmpty() && m_profiles[i].profile.name == chosen)
            combo->setCurrentIndex(combo->count() - 1);
    }
    const bool any = !m_profiles.empty();
    for (QWidget* part : std::initializer_list<QWidget*>{m_ui->profileLabel, combo, m_ui->removeProfileButton})
        part->setVisible(any);
    m_ui->removeProfileButton->setEnabled(combo->currentData().toInt() >= 0);
}

void ImportDialog::onProfile()
{
    const int at = m_ui->profileCombo->currentData().toInt();
    m_ui->removeProfileButton->setEnabled(at >= 0);
    if (at < 0) {
        useProposal(m_start.proposal);
        return;
    }
    const MappingProfile& profile = m_profiles[static_cast<std::size_t>(at)].profile;
    m_ambiguous = false;
    use(profile.mapping, {}, {tr("Read with your mapping “%1”.").arg(profile.name)});
}

void ImportDialog::saveProfile()
{
    const int at = m_ui->profileCombo->currentData().toInt();
    const QString suggested = at >= 0 ? m_profiles[static_cast<std::size_t>(at)].profile.name : QFileInfo(m_start.path).completeBaseName();
    const QString name =
        m_questions.text(this, tr("Save the mapping"), tr("Its name (one that is taken is replaced):"), suggested).simplified();
    if (name.isEmpty())
        return;
    const auto saved = m_shelf.save({name, m_mapping});
    if (saved.ok())
        fillProfiles(name);
    else
        m_questions.tell(this, tr("The mapping could not be saved."), QString::fromStdString(saved.trouble()));
}

void ImportDialog::removeProfile()
{
    const int at = m_ui->profileCombo->currentData().toInt();
    if (at < 0)
        return;
    const MappingShelf::Entry entry = m_profiles[static_cast<std::size_t>(at)];
    if (m_questions.choose(this, tr("Remove the saved mapping “%1”?").arg(entry.profile.name),
                           tr("What it says stays in this form; only the saved copy goes."), {tr("Remove"), tr("Keep")}) != 0)
        return;
    const auto removed = m_shelf.remove(entry.path);
    if (!removed.ok())
        m_questions.tell(this, tr("The mapping could not be removed."), QString::fromStdString(removed.trouble()));
    fillProfiles({});
}

// The mapping, to the fields and back --------------------------------------------------------------------------------

void ImportDialog::useProposal(const MappingProposal& proposal)
{
    m_ambiguous = proposal.numbersAmbiguous;
    use(proposal.mapping, proposal.columns, proposal.notes);
}

void ImportDialog::use(const ImportMapping& mapping, const Notes& notes, const QStringList& remarks)
{
    {
        const QScopedValueRollback filling(m_filling, true);
        m_mapping = mapping;
        m_ui->encodingCombo->setCurrentIndex(m_ui->encodingCombo->findData(static_cast<int>(mapping.encoding)));
        m_ui->delimiterCombo->setCurrentIndex(m_ui->delimiterCombo->findData(static_cast<int>(mapping.delimiter)));
        m_ui->headerRowSpin->setValue(mapping.headerRow);
        m_ui->headerLinesCombo->setCurrentIndex(m_ui->headerLinesCombo->findData(mapping.headerLines));
        m_ui->decimalCombo->setCurrentIndex(m_ui->decimalCombo->findData(static_cast<int>(mapping.numbers.decimal)));
        m_ui->groupingCombo->setCurrentIndex(m_ui->groupingCombo->findData(static_cast<int>(mapping.numbers.grouping)));
        m_ui->marksEdit->setText(marksText(mapping.numbers.marks));
        m_ui->percentCheck->setChecked(mapping.numbers.chanceInPercent);
        m_ui->yesEdit->setText(mapping.yesWords.join(QStringLiteral(", ")));
        m_ui->noEdit->setText(mapping.noWords.join(QStringLiteral(", ")));
        const MappingPreview preview = previewMapping(m_start.sample, mapping, 1);
        m_columns->setTheirs(preview.headers, preview.rows.empty() ? QStringList() : preview.rows.front().raw);
        m_columns->setMapping(mapping, notes);
        m_skips->show(preview.headers, mapping.skip);
        QStringList shown;
        for (const QString& remark : remarks)
            shown << onScreen(remark) + (remark.endsWith(QLatin1Char('.')) ? QString() : QStringLiteral("."));
        m_ui->notesLabel->setText(shown.join(QLatin1Char('\n')));
        m_ui->notesLabel->setVisible(!remarks.isEmpty());
    }
    showStatuses();
    showPreview();
}

void ImportDialog::onLayout()
{
    if (m_filling)
        return;
    ImportMapping layout = m_mapping;
    layout.encoding = static_cast<TextEncoding>(m_ui->encodingCombo->currentData().toInt());
    layout.delimiter = static_cast<char>(m_ui->delimiterCombo->currentData().toInt());
    layout.headerRow = m_ui->headerRowSpin->value();
    layout.headerLines = m_ui->headerLinesCombo->currentData().toInt();
    {
        // What the form holds from here on is nobody's saved mapping.
        const QScopedValueRollback filling(m_filling, true);
        m_ui->profileCombo->setCurrentIndex(0);
        m_ui->removeProfileButton->setEnabled(false);
    }
    useProposal(keepWhatWasSaid(m_mapping, proposeColumns(m_start.sample, layout)));
}

void ImportDialog::onColumns()
{
    if (m_filling)
        return;
    const ColumnSource before = m_mapping.from(Column::status);
    m_columns->writeTo(m_mapping);
    if (m_mapping.from(Column::status) != before) {
        showStatuses();
        learnTradeWords();
        m_statuses->show(m_words, m_mapping, m_start.sample.whole);
    }
    m_soon.start();
    showWhatIsMissing();
}

void ImportDialog::onFields()
{
    if (m_filling)
        return;
    m_mapping.numbers.decimal = static_cast<DecimalMark>(m_ui->decimalCombo->currentData().toInt());
    m_mapping.numbers.grouping = static_cast<Grouping>(m_ui->groupingCombo->currentData().toInt());
    m_mapping.numbers.marks = marksFromText(m_ui->marksEdit->text());
    m_mapping.numbers.chanceInPercent = m_ui->percentCheck->isChecked();
    m_mapping.yesWords = wordsFromText(m_ui->yesEdit->text());
    m_mapping.noWords = wordsFromText(m_ui->noEdit->text());
    m_mapping.skip = m_skips->rules();
    m_statuses->writeTo(m_mapping);
    m_soon.start();
    showWhatIsMissing();
}

void ImportDialog::showStatuses()
{
    const ColumnSource& source = m_mapping.from(Column::status);
    m_words.clear();
    if (source.kind == ColumnSource::Kind::column)
        m_words = distinctValues(m_start.sample, m_mapping, source.column, kStatusWords);
    m_statuses->show(m_words, m_mapping, m_start.sample.whole);
    countWholeFile();
}

void ImportDialog::countWholeFile()
{
    const ColumnSource& source = m_mapping.from(Column::status);
    if (m_start.sample.whole || source.kind != ColumnSource::Kind::column)
        return;
    // An earlier count that still runs is no longer watched.
    m_counting.setFuture(QtConcurrent::run([path = m_start.path, mapping = m_mapping, column = source.column] {
        return distinctValuesOf(path, mapping, column, kStatusWords);
    }));
}

void ImportDialog::learnTradeWords()
{
    for (const DistinctValue& value : m_words) {
        const auto known = [&value](const StatusWord& word) { return foldedText(word.word) == foldedText(value.text); };
        const auto status = statusOfTradeWord(value.text);
        if (status && std::none_of(m_mapping.statuses.begin(), m_mapping.statuses.end(), known))
            m_mapping.statuses.push_back({value.text, *status});
    }
}

// What comes of it ---------------------------------------------------------------------------------------------------

void ImportDialog::showFile()
{
    const MappingPreview& preview = m_preview.preview();
    QListWidget* lines = m_ui->topLines;
    const int current = lines->currentRow();
    lines->clear();
    const auto add = [lines, this](const QStringList& cells) {
        const int row = lines->count() + 1;
        if (row > std::max(kTopLines, m_mapping.headerRow + m_mapping.headerLines))
            return;
        const bool header = row >= m_mapping.headerRow && row < m_mapping.headerRow + m_mapping.headerLines;
        const QString line = cells.join(QStringLiteral("  │  ")).simplified();
        lines->addItem(header ? tr("%1  header:  %2").arg(row).arg(line) : tr("%1  %2").arg(row).arg(line));
    };
    for (const QStringList& cells : preview.above)
        add(cells);
    for (std::size_t i = 0; i < std::min<std::size_t>(preview.rows.size(), kTopLines); ++i)
        add(preview.rows[i].raw);
    lines->setCurrentRow(std::clamp(current, 0, std::max(0, lines->count() - 1)));
}

void ImportDialog::showPreview()
{
    QElapsedTimer clock;
    clock.start();
    m_soon.stop();
    m_preview.show(previewMapping(m_start.sample, m_mapping, kRowsShown), m_mapping);
    m_mapping.headers = m_preview.preview().headers;
    m_columns->showTroubles(m_preview.preview());
    showFile();
    QHeaderView* header = m_ui->previewTable->horizontalHeader();
    header->setResizeContentsPrecision(60);
    m_ui->previewTable->resizeColumnsToContents();
    showWhatIsMissing();
    m_slowest = std::max(m_slowest, static_cast<double>(clock.nsecsElapsed()) / 1e6);
}

QString ImportDialog::whyNot() const
{
    const QString trouble = mappingTrouble(m_mapping);
    if (!trouble.isEmpty())
        return onScreen(trouble) + QLatin1Char('.');
    const MappingPreview& preview = m_preview.preview();
    if (!preview.trouble.isEmpty() || !preview.missingColumns.isEmpty())
        return tr("See above.");
    if (m_mapping.floorsFromFile && floorsPath().isEmpty())
        return tr("Name the file of floors.");
    if (m_mapping.floorsFromFile && !QFileInfo(floorsPath()).isFile())
        return tr("There is no file of floors of that name.");
    return {};
}

void ImportDialog::showWhatIsMissing()
{
    m_ui->statusLabel->setText(understoodText(m_preview.preview(), m_start.sample.whole));
    const QString reason = whyNot();
    m_ui->reasonLabel->setText(reason);
    m_ui->importButton->setEnabled(reason.isEmpty());
    m_ui->importButton->setToolTip(reason);
    m_ui->saveProfileButton->setEnabled(mappingTrouble(m_mapping).isEmpty());
    const int unsaid = m_statuses->unsaid();
    m_ui->tabs->setTabText(m_ui->tabs->indexOf(m_ui->wordsTab), unsaid == 0 ? tr("Sta&tuses") : tr("Sta&tuses (%1 to say)").arg(unsaid));
    m_ui->tabs->setTabText(m_ui->tabs->indexOf(m_ui->numbersTab), m_ambiguous ? tr("&Numbers (look)") : tr("&Numbers"));
}

} // namespace rungwright
