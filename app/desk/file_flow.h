// SPDX-License-Identifier: GPL-3.0-or-later
// Opening, importing, saving: what the desk asks and says on the way, with nothing lost.
#pragma once

#include "autosave.h"
#include "document.h"
#include "recent_files.h"
#include "unit_list.h"

#include <QFutureWatcher>
#include <QObject>
#include <QPointer>

#include <atomic>
#include <memory>

class QProgressDialog;
class QWidget;

namespace rungwright
{

class Questions;

/// What a file turned out to hold.
struct LoadedFile {
    bool isScenario = false;
    Scenario scenario;   ///< isScenario and no trouble.
    UnitListResult list; ///< Otherwise.
    QString trouble;     ///< Not empty: nothing could be taken.
};

class FileFlow : public QObject
{
    Q_OBJECT
public:
    FileFlow(Document& document, Questions& questions, QSettings& settings, const QString& stateFolder, QWidget* window);
    ~FileFlow() override;

    /// Opens a scenario or a unit list, whichever `path` is. Reading goes on off the GUI thread; done() follows.
    void open(const QString& path);
    void askOpen();
    void askImport();
    /// A sample from the program's own resources.
    void openSample(const QString& resource);
    /// Offers unsaved work of an earlier run that never had a file. True when it was taken.
    bool offerLeftBehind();

    /// False when the user gave up or the file could not be written.
    bool save();
    bool saveAs();
    /// Asks what to do with unsaved changes; false = stay.
    bool mayLeave();
    /// Gives up what is being read; nothing changes.
    void cancelLoading();
    /// The window closes in good order.
    void leave();

    RecentFiles& recent() { return m_recent; }
    bool busy() const { return m_loading; }

signals:
    /// A scenario is on the desk.
    void opened();
    void recentChanged();
    /// A sentence for the status bar.
    void told(const QString& sentence);
    /// An attempt to open ended, one way or the other.
    void done();

private:
    /// Asks what must be asked before a file is opened, and starts reading; false when the user gave up.
    bool begin(const QString& path);
    void load(const QString& path, const UnitListOptions& options);
    void loaded(const QString& path, const UnitListOptions& options, LoadedFile file);
    void takeScenario(Scenario scenario, const QString& path, bool saved);
    void takeList(const QString& path, const UnitListOptions& options, UnitListResult list);
    QString suggestedName() const;

    Document& m_document;
    Questions& m_questions;
    RecentFiles m_recent;
    QWidget* m_window;
    Autosave m_autosave;
    QFutureWatcher<LoadedFile> m_watcher;
    QPointer<QProgressDialog> m_progress;
    std::shared_ptr<std::atomic<bool>> m_cancel;
    bool m_loading = false;
    int m_undoIndexBefore = 0; ///< Of the undo stack, when reading began.
    QString m_recoverFor;      ///< Set while unsaved work is being recovered: the path it belongs to.
    bool m_recovering = false;
};

} // namespace rungwright
