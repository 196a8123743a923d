// SPDX-License-Identifier: GPL-3.0-or-later
#include "file_flow.h"

#include "questions.h"
#include "scenario_json.h"

#include <QFile>
#include <QFileInfo>
#include <QLocale>

namespace rungwright
{

FileFlow::FileFlow(Document& document, Questions& questions, QSettings& settings, const QString& stateFolder, QWidget* window) :
    QObject(window),
    m_document(document),
    m_questions(questions),
    m_settings(settings),
    m_stateFolder(stateFolder),
    m_recent(settings),
    m_window(window),
    m_autosave(document, stateFolder, this),
    m_saving(document, questions, m_autosave, window),
    m_work(window)
{
    connect(&m_autosave, &Autosave::trouble, this, &FileFlow::told);
    connect(&m_saving, &SaveFlow::told, this, &FileFlow::told);
    connect(&m_saving, &SaveFlow::savedAs, this, [this](const QString& path) {
        m_recent.add(path);
        emit recentChanged();
    });
    connect(&m_work, &LongWork::idle, this, &FileFlow::done);
}

FileFlow::~FileFlow() = default;

void FileFlow::cancelLoading()
{
    m_work.cancel();
    if (m_dialog)
        m_dialog->reject();
}

void FileFlow::leave()
{
    cancelLoading();
    m_autosave.discardCopy();
}

void FileFlow::giveUp() { emit told(tr("Given up; nothing changed.")); }

bool FileFlow::changedSinceAsked()
{
    // The window lives on while a file is read: what was edited meanwhile has not been asked about.
    if (m_document.revision() == m_askedFor)
        return false;
    if (!mayLeave())
        return true;
    m_askedFor = m_document.revision();
    return false;
}

void FileFlow::show(QDialog* dialog)
{
    dialog->setAttribute(Qt::WA_DeleteOnClose);
    m_dialog = dialog;
    dialog->open();
}

// Opening ------------------------------------------------------------------------------------------------------------

void FileFlow::askOpen()
{
    const QString path = m_questions.openPath(m_window, tr("Open a scenario"), tr("Scenarios (*.rungs.json);;All files (*)"));
    if (!path.isEmpty())
        begin(path, Purpose::unknown);
}

void FileFlow::askImport()
{
    const QString path = m_questions.openPath(m_window, tr("Import a unit list"), tr("Unit lists (*.csv *.tsv *.txt);;All files (*)"));
    if (!path.isEmpty())
        begin(path, Purpose::fresh);
}

void FileFlow::askRefresh()
{
    if (m_document.empty())
        return;
    const QString path = m_questions.openPath(m_window, tr("Refresh from a new list"), tr("Unit lists (*.csv *.tsv *.txt);;All files (*)"));
    if (!path.isEmpty())
        begin(path, Purpose::refresh);
}

void FileFlow::begin(const QString& path, Purpose purpose)
{
    if (m_work.busy() || m_dialog)
        return;
    m_work.start<FirstLook>(
        tr("Reading %1 …").arg(QFileInfo(path).fileName()), [path](const LongWork::Progress&) { return lookAt(path); },
        [this, path, purpose](std::optional<FirstLook> look) {
            if (look)
                lookedAt(path, purpose, std::move(*look));
            else
                giveUp();
        });
}

void FileFlow::lookedAt(const QString& path, Purpose purpose, FirstLook look)
{
    const QString name = QFileInfo(path).fileName();
    if (!look.trouble.isEmpty()) {
        m_questions.tell(m_window, tr("“%1” could not be opened.").arg(name), look.trouble);
        return;
    }
    if (look.isScenario && purpose == Purpose::refresh) {
        m_questions.tell(m_window, tr("“%1” is a scenario.").arg(name), tr("A scenario is refreshed from a unit list."));
        return;
    }
    if (look.isScenario) {
        openScenario(path, look.sample.whole ? look.sample.bytes : QByteArray());
        return;
    }
    if (purpose == Purpose::unknown && !m_document.empty()) {
        const int answer = m_questions.choose(m_window, tr("What is “%1” for?").arg(name),
                                              tr("It is a unit list, and “%1” is on the desk.").arg(m_document.displayName()),
                                              {tr("Refresh this scenario"), tr("Open as a new one"), tr("Cancel")});
        if (answer == 2) {
            giveUp();
            return;
        }
        purpose = answer == 0 ? Purpose::refresh : Purpose::fresh;
    }
    Intake intake;
    intake.purpose = purpose == Purpose::unknown ? Purpose::fresh : purpose;
    intake.request.path = path;
    if (look.sample.whole)
        intake.request.bytes = look.sample.bytes;
    intake.look = std::move(look);
    bringIn(std::move(intake));
}

void FileFlow::openScenario(const QString& path, const QByteArray& bytes)
{
    if (!mayLeave())
        return;
    m_askedFor = m_document.revision();
    const QString name = QFileInfo(path).fileName();
    if (m_autosave.openElsewhere(path)) {
        const int answer = m_questions.choose(m_window, tr("“%1” is open in another window.").arg(name),
                                              tr("If both windows save, the later one overwrites the earlier one."),
                                              {tr("Open it all the same"), tr("Cancel")});
        if (answer != 0)
            return;
    } else if (const auto left = m_autosave.leftBehind(path)) {
        const QString when = QLocale().toString(left->when, QLocale::ShortFormat);
        const int answer = m_questions.choose(m_window, tr("There is unsaved work on “%1” from %2.").arg(name, when),
                                              tr("The program ended before it was saved. Recovering brings it back as unsaved changes; the "
                                                 "file itself stays as it is until you save."),
                                              {tr("Recover the unsaved work"), tr("Open the file as saved"), tr("Cancel")});
        if (answer == 2)
            return;
        if (answer == 0) {
            loadScenarioFrom(left->copyPath, {}, path, true);
            return;
        }
    }
    loadScenarioFrom(path, bytes, path, false);
}

bool FileFlow::offerLeftBehind()
{
    // The newest first; after one that is thrown away or left for later the next is offered.
    for (const LeftBehind& left : m_autosave.leftBehindUntitled()) {
        const QString when = QLocale().toString(left.when, QLocale::ShortFormat);
        const int answer = m_questions.choose(m_window, tr("There is unsaved work from %1.").arg(when),
                                              tr("The program ended before it was saved to a file."),
                                              {tr("Recover the unsaved work"), tr("Throw it away"), tr("Decide later")});
        if (answer == 1)
            QFile::remove(left.copyPath);
        if (answer != 0)
            continue;
        m_askedFor = m_document.revision();
        loadScenarioFrom(left.copyPath, {}, {}, true);
        return true;
    }
    return false;
}

void FileFlow::openSample(const QString& resource)
{
    if (m_work.busy() || m_dialog || !mayLeave())
        return;
    auto scenario = loadScenario(resource);
    if (!scenario.ok()) {
        m_questions.tell(m_window, tr("The sample cannot be opened."), QString::fromStdString(scenario.trouble()));
        return;
    }
    takeScenario(std::move(scenario).value(), {}, true);
}

void FileFlow::loadScenarioFrom(const QString& source, const QByteArray& bytes, const QString& path, bool recovered)
{
    const QString name = QFileInfo(path.isEmpty() ? source : path).fileName();
    m_work.start<ReadScenario>(
        tr("Reading %1 …").arg(name), [source, bytes](const LongWork::Progress&) { return readScenario(source, bytes); },
        [this, source, path, name, recovered](std::optional<ReadScenario> read) {
            if (!read || changedSinceAsked()) {
                giveUp();
            } else if (!read->trouble.isEmpty()) {
                m_questions.tell(m_window, tr("“%1” could not be opened.").arg(name), read->trouble);
            } else {
                takeScenario(std::move(read->scenario), path, !recovered);
                if (recovered && path.isEmpty())
                    QFile::remove(source); // from here on this window's own copy guards it
                if (recovered)
                    emit told(tr("Unsaved work recovered. Save it to keep it."));
            }
        });
}

void FileFlow::takeScenario(Scenario scenario, const QString& path, bool saved)
{
    m_saving.finishWriting(); // it writes the scenario that was on the desk
    m_autosave.discardCopy(); // of what was on the desk before: the user has said it may go
    m_document.begin(std::move(scenario), path, saved);
    m_autosave.follow();
    if (!path.isEmpty()) {
        m_recent.add(path);
        emit recentChanged();
    }
    emit opened();
}

} // namespace rungwright
