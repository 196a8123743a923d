// SPDX-License-Identifier: GPL-3.0-or-later
#include "file_flow.h"

#include "file_kind.h"
#include "questions.h"
#include "refused_rows_dialog.h"
#include "scenario_json.h"

#include <QFile>
#include <QFileInfo>
#include <QLocale>
#include <QProgressDialog>
#include <QtConcurrent>

namespace rungwright
{

namespace
{

constexpr int kProgressParts = 1000;

const auto kScenarioSuffix = QStringLiteral(".rungs.json");

QString scenarioFilter() { return FileFlow::tr("Scenarios (*.rungs.json);;All files (*)"); }

QString listFilter() { return FileFlow::tr("Unit lists (*.csv *.tsv *.txt);;All files (*)"); }

/// Runs off the GUI thread.
void readFile(QPromise<LoadedFile>& promise, const QString& path, const UnitListOptions& options,
              const std::shared_ptr<std::atomic<bool>>& cancel)
{
    LoadedFile file;
    QFile source(path);
    if (!source.open(QIODevice::ReadOnly)) {
        file.trouble = FileFlow::tr("%1 cannot be read: %2.").arg(path, source.errorString());
        promise.addResult(std::move(file));
        return;
    }
    const QByteArray bytes = source.readAll();
    if (source.error() != QFileDevice::NoError) {
        file.trouble = FileFlow::tr("%1 cannot be read to its end: %2.").arg(path, source.errorString());
    } else if (looksLikeScenario(bytes, path)) {
        file.isScenario = true;
        auto scenario = scenarioFromJson(bytes, path);
        if (scenario.ok())
            file.scenario = std::move(scenario).value();
        else
            file.trouble = QString::fromStdString(scenario.trouble());
    } else {
        file.list = readUnitList(bytes, path, options, [&](double share) {
            promise.setProgressValue(static_cast<int>(share * kProgressParts));
            return !cancel->load();
        });
        file.trouble = file.list.fileTrouble;
    }
    promise.addResult(std::move(file));
}

} // namespace

FileFlow::FileFlow(Document& document, Questions& questions, QSettings& settings, const QString& stateFolder, QWidget* window) :
    QObject(window),
    m_document(document),
    m_questions(questions),
    m_recent(settings),
    m_window(window),
    m_autosave(document, stateFolder, this)
{
    connect(&m_autosave, &Autosave::trouble, this, &FileFlow::told);
}

FileFlow::~FileFlow()
{
    cancelLoading();
    // Only while it runs: a future whose result was taken never says that it is finished.
    if (m_loading)
        m_watcher.waitForFinished();
}

void FileFlow::cancelLoading()
{
    if (m_cancel)
        m_cancel->store(true);
}

// Opening ------------------------------------------------------------------------------------------------------------

void FileFlow::askOpen()
{
    const QString path = m_questions.openPath(m_window, tr("Open a scenario"), scenarioFilter());
    if (!path.isEmpty())
        open(path);
}

void FileFlow::askImport()
{
    const QString path = m_questions.openPath(m_window, tr("Import a unit list"), listFilter());
    if (!path.isEmpty())
        open(path);
}

void FileFlow::open(const QString& path)
{
    if (m_loading)
        return;
    if (!mayLeave() || !begin(path))
        emit done();
}

bool FileFlow::begin(const QString& path)
{
    m_recovering = false;
    if (m_autosave.openElsewhere(path)) {
        const int answer = m_questions.choose(m_window, tr("“%1” is open in another window.").arg(QFileInfo(path).fileName()),
                                              tr("If both windows save, the later one overwrites the earlier one."),
                                              {tr("Open it all the same"), tr("Cancel")});
        if (answer != 0)
            return false;
    } else if (const auto left = m_autosave.leftBehind(path)) {
        const QString when = QLocale().toString(left->when, QLocale::ShortFormat);
        const int answer = m_questions.choose(m_window, tr("There is unsaved work on “%1” from %2.").arg(QFileInfo(path).fileName(), when),
                                              tr("The program ended before it was saved. Recovering brings it back as unsaved changes; the "
                                                 "file itself stays as it is until you save."),
                                              {tr("Recover the unsaved work"), tr("Open the file as saved"), tr("Cancel")});
        if (answer == 2)
            return false;
        if (answer == 0) {
            m_recovering = true;
            m_recoverFor = path;
            load(left->copyPath, {});
            return true;
        }
    }
    load(path, {});
    return true;
}

bool FileFlow::offerLeftBehind()
{
    const auto left = m_autosave.leftBehind({});
    if (!left)
        return false;
    const QString when = QLocale().toString(left->when, QLocale::ShortFormat);
    const int answer =
        m_questions.choose(m_window, tr("There is unsaved work from %1.").arg(when), tr("The program ended before it was saved to a file."),
                           {tr("Recover the unsaved work"), tr("Throw it away"), tr("Decide later")});
    if (answer == 1)
        QFile::remove(left->copyPath);
    if (answer != 0)
        return false;
    m_recovering = true;
    m_recoverFor.clear();
    load(left->copyPath, {});
    return true;
}

void FileFlow::openSample(const QString& resource)
{
    if (m_loading || !mayLeave())
        return;
    auto scenario = loadScenario(resource);
    if (!scenario.ok()) {
        m_questions.tell(m_window, tr("The sample cannot be opened."), QString::fromStdString(scenario.trouble()));
        return;
    }
    takeScenario(std::move(scenario).value(), {}, true);
}

void FileFlow::load(const QString& path, const UnitListOptions& options)
{
    m_loading = true;
    m_undoIndexBefore = m_document.undoStack().index();
    m_cancel = std::make_shared<std::atomic<bool>>(false);
    m_progress = new QProgressDialog(tr("Reading %1 …").arg(QFileInfo(path).fileName()), tr("Cancel"), 0, kProgressParts, m_window);
    m_progress->setWindowModality(Qt::WindowModal);
    m_progress->setMinimumDuration(400);
    m_progress->setAutoReset(false);
    m_progress->setValue(0);
    connect(m_progress, &QProgressDialog::canceled, this, &FileFlow::cancelLoading);
    connect(&m_watcher, &QFutureWatcherBase::progressValueChanged, m_progress, &QProgressDialog::setValue);

    disconnect(&m_watcher, &QFutureWatcherBase::finished, this, nullptr);
    connect(&m_watcher, &QFutureWatcherBase::finished, this, [this, path, options] {
        if (m_progress) {
            m_progress->disconnect(this);
            m_progress->close();
            m_progress->deleteLater();
        }
        m_loading = false;
        QFuture<LoadedFile> future = m_watcher.future();
        if (future.resultCount() > 0 && !m_cancel->load())
            loaded(path, options, future.takeResult());
        else
            emit told(tr("Opening was cancelled; nothing changed."));
        emit done();
    });
    m_watcher.setFuture(QtConcurrent::run(readFile, path, options, m_cancel));
}

void FileFlow::loaded(const QString& path, const UnitListOptions& options, LoadedFile file)
{
    // The window stays alive while a file is read: what was edited meanwhile has not been asked about.
    if (m_document.undoStack().index() != m_undoIndexBefore && !mayLeave())
        return;
    if (!file.trouble.isEmpty()) {
        m_questions.tell(m_window, tr("“%1” could not be opened.").arg(QFileInfo(path).fileName()), file.trouble);
        return;
    }
    if (file.isScenario) {
        if (m_recovering) {
            takeScenario(std::move(file.scenario), m_recoverFor, false);
            if (m_recoverFor.isEmpty())
                QFile::remove(path); // from here on this window's own copy guards it
            emit told(tr("Unsaved work recovered. Save it to keep it."));
        } else {
            takeScenario(std::move(file.scenario), path, true);
        }
        return;
    }
    takeList(path, options, std::move(file.list));
}

void FileFlow::takeList(const QString& path, const UnitListOptions& options, UnitListResult list)
{
    if (!list.clean() && !options.withoutBadRows) {
        auto* dialog = new RefusedRowsDialog(list, path, m_window);
        dialog->setAttribute(Qt::WA_DeleteOnClose);
        connect(dialog, &QDialog::accepted, this, [this, path, options] {
            UnitListOptions without = options;
            without.withoutBadRows = true;
            load(path, without);
        });
        dialog->open();
        return;
    }
    if (list.tiers.empty()) {
        m_questions.tell(m_window, tr("“%1” holds no tier that can be taken.").arg(QFileInfo(path).fileName()), {});
        return;
    }
    if (list.currency.code == "XXX" && options.currencyCode.isEmpty()) {
        const QString code = m_questions.text(m_window, tr("Currency"),
                                              tr("The list names no currency. Its ISO 4217 code, for example EUR (empty for none):"),
                                              QLocale().currencySymbol(QLocale::CurrencyIsoCode));
        if (code.isNull()) {
            emit told(tr("Import given up; nothing changed."));
            return;
        }
        const QString wanted = code.trimmed().toUpper();
        if (!wanted.isEmpty() && wanted != QStringLiteral("XXX")) {
            UnitListOptions again = options;
            again.currencyCode = wanted;
            load(path, again); // the decimals allowed depend on it
            return;
        }
    }
    Scenario scenario;
    scenario.currency = list.currency;
    scenario.title = QFileInfo(path).completeBaseName().toStdString();
    scenario.tiers = std::move(list.tiers);
    const auto tiers = static_cast<qsizetype>(scenario.tiers.size());
    takeScenario(std::move(scenario), {}, false);
    QString said = tr("%1 units in %2 tiers imported.").arg(list.rowsTaken).arg(tiers);
    if (list.refusedCount > 0)
        said += QLatin1Char(' ') + tr("%1 rows were left out.").arg(list.refusedCount);
    if (!list.unknownColumns.isEmpty())
        said += QLatin1Char(' ') + tr("Columns not used: %1.").arg(list.unknownColumns.join(QStringLiteral(", ")));
    emit told(said);
}

void FileFlow::takeScenario(Scenario scenario, const QString& path, bool saved)
{
    m_autosave.discardCopy(); // of what was on the desk before: the user has said it may go
    m_document.begin(std::move(scenario), path, saved);
    m_autosave.follow();
    if (!path.isEmpty()) {
        m_recent.add(path);
        emit recentChanged();
    }
    emit opened();
}

// Saving and leaving -------------------------------------------------------------------------------------------------

QString FileFlow::suggestedName() const
{
    if (!m_document.path().isEmpty())
        return m_document.path();
    QString name = m_document.displayName();
    name.replace(QLatin1Char('/'), QLatin1Char('-'));
    return name + kScenarioSuffix;
}

bool FileFlow::save()
{
    if (m_document.path().isEmpty())
        return saveAs();
    const auto saved = m_document.saveTo(m_document.path());
    if (!saved.ok()) {
        m_questions.tell(m_window, tr("The scenario could not be saved."), QString::fromStdString(saved.trouble()));
        return false;
    }
    emit told(tr("Saved."));
    return true;
}

bool FileFlow::saveAs()
{
    if (m_document.empty())
        return false;
    QString path = m_questions.savePath(m_window, tr("Save the scenario"), suggestedName(), scenarioFilter());
    if (path.isEmpty())
        return false;
    if (!path.endsWith(QStringLiteral(".json"), Qt::CaseInsensitive)) {
        path += kScenarioSuffix;
        // The file dialog has asked about the name without the suffix, not about this one.
        if (QFileInfo::exists(path) && m_questions.choose(m_window, tr("“%1” exists. Overwrite it?").arg(QFileInfo(path).fileName()), {},
                                                          {tr("Overwrite"), tr("Cancel")}) != 0)
            return false;
    }
    const auto saved = m_document.saveTo(path);
    if (!saved.ok()) {
        m_questions.tell(m_window, tr("The scenario could not be saved."), QString::fromStdString(saved.trouble()));
        return false;
    }
    m_recent.add(path);
    emit recentChanged();
    emit told(tr("Saved as %1.").arg(QFileInfo(path).fileName()));
    return true;
}

bool FileFlow::mayLeave()
{
    if (m_document.empty() || !m_document.modified())
        return true;
    const int answer = m_questions.choose(m_window, tr("“%1” has unsaved changes.").arg(m_document.displayName()),
                                          tr("Save them before going on?"), {tr("Save"), tr("Go on without saving"), tr("Cancel")});
    return answer == 1 || (answer == 0 && save());
}

void FileFlow::leave()
{
    cancelLoading();
    m_autosave.discardCopy();
}

} // namespace rungwright
