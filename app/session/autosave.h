// SPDX-License-Identifier: GPL-3.0-or-later
// A copy of unsaved work beside the file, and its recovery after a crash.
#pragma once

#include "document.h"

#include <QDateTime>
#include <QLockFile>
#include <QObject>
#include <QThreadPool>
#include <QTimer>

#include <atomic>
#include <functional>
#include <memory>
#include <optional>
#include <vector>

namespace rungwright
{

/// Unsaved work that an earlier run left behind.
struct LeftBehind {
    QString copyPath;
    QString forPath; ///< The scenario it belongs to; empty for one that never had a file.
    QDateTime when;
};

/// Writes the copy a little after each change, off the GUI thread, whole or not at all, and removes it when the scenario is saved or
/// closed in good order. The copy of "a.rungs.json" is ".a.rungs.json.unsaved" beside it; that of a scenario without a file lies
/// in `stateFolder`. A lock in `stateFolder` tells other windows of the same user which files are open.
class Autosave : public QObject
{
    Q_OBJECT
public:
    Autosave(Document& document, const QString& stateFolder, QObject* parent = nullptr);
    ~Autosave() override;

    /// From a change to its copy. A copy that took long lets the next one wait longer, so that writing is a small part of the time.
    void setDelay(int milliseconds) { m_delay = milliseconds; }
    /// While the scenario itself is being written, no copy is begun.
    void hold(bool on);

    /// Unsaved work on `path` (empty: on a scenario without a file) that no living window is guarding.
    std::optional<LeftBehind> leftBehind(const QString& path) const;
    /// All unsaved work on scenarios without a file that no living window is guarding, the newest first.
    std::vector<LeftBehind> leftBehindUntitled() const;
    /// True when another living window has `path` open.
    bool openElsewhere(const QString& path) const;
    const QString& copyPath() const { return m_copyPath; }

    /// Guards the document's path from now on; call after Document::begin().
    void follow();
    /// Writes now, if there is something unsaved, and waits until it is written.
    void flush();
    /// Saved, closed in good order, or given up: the copy goes, after what is being written.
    void discardCopy();

signals:
    /// The copy could not be written; said once until it works again.
    void trouble(const QString& message);

private:
    QString copyFor(const QString& path) const;
    QString lockFor(const QString& path) const;
    bool takeLock(const QString& path);
    void onSaveState();
    void wait();
    void write();
    void written(const QString& trouble, int milliseconds);
    /// Runs after what is being written, off the GUI thread; at once when nothing is.
    void inTurn(const std::function<void()>& job);

    Document& m_document;
    QString m_stateFolder;
    QString m_guarded;
    QString m_copyPath;
    QTimer m_timer;
    QThreadPool m_writer;        ///< One thread: copies are written in order.
    std::atomic<int> m_jobs = 0; ///< Of the writer's, not done yet.
    std::shared_ptr<QLockFile> m_lock;
    QString m_lockPath;
    int m_delay;
    int m_lastMs = 0; ///< How long the last copy took.
    bool m_held = false;
    bool m_troubled = false;
};

} // namespace rungwright
