// SPDX-License-Identifier: GPL-3.0-or-later
// Opening, importing, refreshing: what the desk asks and says on the way, with nothing lost. Saving is SaveFlow's.
#pragma once

#include "autosave.h"
#include "document.h"
#include "list_reading.h"
#include "long_work.h"
#include "recent_files.h"
#include "refresh.h"
#include "save_flow.h"

#include <QDialog>
#include <QObject>
#include <QPointer>

#include <memory>

class QWidget;

namespace rungwright
{

class Questions;

class FileFlow : public QObject
{
    Q_OBJECT
public:
    FileFlow(Document& document, Questions& questions, QSettings& settings, const QString& stateFolder, QWidget* window);
    ~FileFlow() override;

    /// Opens a scenario or a unit list, whichever `path` is. With a scenario on the desk it is asked what a list is for. Reading goes on
    /// off the GUI thread; done() follows.
    void open(const QString& path) { begin(path, Purpose::unknown); }
    void askOpen();
    void askImport();
    /// A new list of the same operator, to be brought into the scenario on the desk.
    void askRefresh();
    /// A sample from the program's own resources.
    void openSample(const QString& resource);
    /// Offers unsaved works of earlier runs that never had a file, one after the other. True when one was taken.
    bool offerLeftBehind();

    SaveFlow& saving() { return m_saving; }
    bool save() { return m_saving.save(); }
    bool saveAs() { return m_saving.saveAs(); }
    /// Asks what to do with unsaved changes; false = stay.
    bool mayLeave() { return m_saving.mayLeave(); }
    /// Gives up what is being read; nothing changes.
    void cancelLoading();
    /// The window closes in good order.
    void leave();

    RecentFiles& recent() { return m_recent; }
    /// Something is being read.
    bool busy() const { return m_work.busy(); }

signals:
    /// A scenario is on the desk.
    void opened();
    /// The first rows of a long list that is being read, to be brought in as a new scenario; `name` is the file's. Comes again and again.
    void readingRows(const QString& name, const rungwright::ListSoFar& list);
    /// No more of these: the list is on the desk, or nothing comes of it for now.
    void readingOver();
    void recentChanged();
    /// A sentence for the status bar.
    void told(const QString& sentence);
    /// An attempt to open ended, one way or the other, or waits for the user in a dialog.
    void done();

private:
    enum class Purpose { unknown, fresh, refresh };

    /// What is being brought in, from the first look to the desk.
    struct Intake {
        Purpose purpose = Purpose::unknown;
        FirstLook look;
        ListRequest request;
    };

    void begin(const QString& path, Purpose purpose);
    void lookedAt(const QString& path, Purpose purpose, FirstLook look);
    void giveUp();
    // Scenarios.
    void openScenario(const QString& path, const QByteArray& bytes);
    void loadScenarioFrom(const QString& source, const QByteArray& bytes, const QString& path, bool recovered);
    void takeScenario(Scenario scenario, const QString& path, bool saved);
    // Lists.
    void bringIn(Intake intake);
    void showForm(Intake intake);
    void showProposed(Intake intake);
    void read(Intake intake);
    TellSoFar tellerFor(const Intake& intake);
    void listRead(Intake intake, ReadList list);
    void showRefused(Intake intake, const ReadList& list);
    /// False when the user gave up, or the list is being read once more.
    bool settleCurrency(Intake& intake, ReadList& list);
    void takeList(const Intake& intake, ReadList list);
    void planRefreshFrom(const Intake& intake, const ReadList& list);
    void showRefresh(const QString& path, RefreshPlan plan, const QStringList& alsoSaid);
    bool changedSinceAsked();
    void show(QDialog* dialog);

    Document& m_document;
    Questions& m_questions;
    QSettings& m_settings;
    QString m_stateFolder;
    RecentFiles m_recent;
    QWidget* m_window;
    Autosave m_autosave;
    SaveFlow m_saving;
    LongWork m_work;
    QPointer<QDialog> m_dialog;   ///< The question on the way that is open now.
    int m_reading = 0;            ///< Which list is being read: what an earlier one tells late is dropped.
    std::uint64_t m_askedFor = 0; ///< The document's revision for which the user was asked about unsaved changes.
};

} // namespace rungwright
