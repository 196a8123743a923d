// SPDX-License-Identifier: GPL-3.0-or-later
#include "save_flow.h"

#include "questions.h"
#include "scenario_json.h"

#include <QEventLoop>
#include <QFileInfo>
#include <QProgressDialog>
#include <QtConcurrent>
#include <QTimer>

namespace rungwright
{

namespace
{

const auto kScenarioSuffix = QStringLiteral(".rungs.json");
/// Short waits show no dialog: it would only flash.
constexpr int kShownAfterMs = 400;

} // namespace

SaveFlow::SaveFlow(Document& document, Questions& questions, Autosave& autosave, QWidget* window) :
    QObject(window), m_document(document), m_questions(questions), m_autosave(autosave), m_window(window)
{
    connect(&m_watcher, &QFutureWatcherBase::finished, this, &SaveFlow::written);
}

SaveFlow::~SaveFlow()
{
    m_watcher.disconnect(this);
    m_watcher.waitForFinished();
}

QString SaveFlow::suggestedName() const
{
    if (!m_document.path().isEmpty())
        return m_document.path();
    QString name = m_document.displayName();
    name.replace(QLatin1Char('/'), QLatin1Char('-'));
    return name + kScenarioSuffix;
}

bool SaveFlow::save()
{
    if (m_document.empty())
        return false;
    if (m_document.path().isEmpty() && !m_writing)
        return saveAs();
    write(m_document.path().isEmpty() ? m_path : m_document.path());
    return true;
}

bool SaveFlow::saveAs()
{
    if (m_document.empty())
        return false;
    QString path = m_questions.savePath(m_window, tr("Save the scenario"), suggestedName(), tr("Scenarios (*.rungs.json);;All files (*)"));
    if (path.isEmpty())
        return false;
    if (!path.endsWith(QStringLiteral(".json"), Qt::CaseInsensitive)) {
        path += kScenarioSuffix;
        // The file dialog has asked about the name without the suffix, not about this one.
        if (QFileInfo::exists(path) && m_questions.choose(m_window, tr("“%1” exists. Overwrite it?").arg(QFileInfo(path).fileName()), {},
                                                          {tr("Overwrite"), tr("Cancel")}) != 0)
            return false;
    }
    if (m_autosave.openElsewhere(path) &&
        m_questions.choose(m_window, tr("“%1” is open in another window.").arg(QFileInfo(path).fileName()),
                           tr("What stands in the file now is what that window works on. If both windows save, the later one overwrites "
                              "the earlier one."),
                           {tr("Save there all the same"), tr("Cancel")}) != 0)
        return false;
    write(path);
    return true;
}

void SaveFlow::write(const QString& path)
{
    if (m_writing) {
        m_next = path;
        emit told(tr("Saving once more after this."));
        return;
    }
    m_path = path;
    m_revision = m_document.revision();
    m_writing = true;
    m_autosave.hold(true);
    emit writingChanged(true);
    m_watcher.setFuture(QtConcurrent::run([scenario = m_document.scenario(), path]() mutable {
        const auto saved = saveScenario(scenario, path);
        scenario = {}; // what only this copy still holds is let go here
        return saved.ok() ? QString() : QString::fromStdString(saved.trouble());
    }));
}

void SaveFlow::written()
{
    const QString trouble = m_watcher.result();
    m_wentWell = trouble.isEmpty();
    m_writing = false;
    if (m_wentWell) {
        const bool elsewhere = m_document.path() != m_path;
        m_document.writtenTo(m_path, m_revision);
        emit savedAs(m_path);
        emit told(m_document.modified() ? tr("Saved, without what was changed meanwhile.")
                  : elsewhere           ? tr("Saved as %1.").arg(QFileInfo(m_path).fileName())
                                        : tr("Saved."));
    }
    const QString next = std::exchange(m_next, QString());
    if (m_wentWell && !next.isEmpty()) {
        write(next);
        return;
    }
    m_autosave.hold(false);
    emit writingChanged(false);
    if (!m_wentWell)
        m_questions.tell(m_window, tr("The scenario could not be saved."), trouble);
}

bool SaveFlow::finishWriting()
{
    if (!m_writing)
        return m_wentWell;
    QProgressDialog dialog(tr("Saving %1 …").arg(QFileInfo(m_path).fileName()), {}, 0, 0, m_window);
    dialog.setWindowModality(Qt::WindowModal);
    dialog.setMinimumDuration(kShownAfterMs);
    QTimer::singleShot(kShownAfterMs, &dialog, &QWidget::show);
    // Input stays away: what waits here must find the scenario as it was written.
    while (m_writing)
        QCoreApplication::processEvents(QEventLoop::ExcludeUserInputEvents | QEventLoop::WaitForMoreEvents);
    return m_wentWell;
}

bool SaveFlow::mayLeave()
{
    finishWriting();
    if (m_document.empty() || !m_document.modified())
        return true;
    const int answer = m_questions.choose(m_window, tr("“%1” has unsaved changes.").arg(m_document.displayName()),
                                          tr("Save them before going on?"), {tr("Save"), tr("Go on without saving"), tr("Cancel")});
    return answer == 1 || (answer == 0 && save() && finishWriting());
}

} // namespace rungwright
