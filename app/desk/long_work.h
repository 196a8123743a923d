// SPDX-License-Identifier: GPL-3.0-or-later
// Work that takes long, off the window's thread, with its progress shown and a way to give it up.
#pragma once

#include <QFutureWatcher>
#include <QObject>
#include <QPointer>
#include <QString>

#include <atomic>
#include <functional>
#include <memory>
#include <optional>

class QProgressDialog;
class QWidget;

namespace rungwright
{

/// One piece of work at a time. While it runs the window lives on; after a moment a dialog stands before it that can cancel.
class LongWork : public QObject
{
    Q_OBJECT
public:
    /// Called by the work with the share done (0 to 1); false = give up.
    using Progress = std::function<bool(double)>;

    explicit LongWork(QWidget* window);
    /// Gives up what runs, and waits for it.
    ~LongWork() override;

    bool busy() const { return m_busy; }
    void cancel();

    /// `work` runs off the window's thread and must touch nothing of it. `then` gets its result on the window's thread, or nothing when it
    /// was cancelled; a result nobody wants any more is let go off that thread too. Not to be called while busy.
    template <class Result>
    void start(const QString& title, std::function<Result(const Progress&)> work, std::function<void(std::optional<Result>)> then)
    {
        auto held = std::make_shared<std::optional<Result>>();
        run(
            title,
            [held, work = std::move(work)](const Progress& progress, const std::atomic<bool>& cancelled) {
                *held = work(progress);
                if (cancelled)
                    held->reset();
            },
            [held, then = std::move(then)](bool cancelled) { then(cancelled ? std::nullopt : std::exchange(*held, std::nullopt)); });
    }

signals:
    /// The window is free again; comes after `then`, unless that began another piece.
    void idle();

private:
    using Job = std::function<void(const Progress&, const std::atomic<bool>&)>;
    void run(const QString& title, const Job& job, const std::function<void(bool)>& then);
    void finished();

    QWidget* m_window;
    QFutureWatcher<void> m_watcher;
    QPointer<QProgressDialog> m_progress;
    std::shared_ptr<std::atomic<bool>> m_cancel;
    std::function<void(bool)> m_then;
    bool m_busy = false;
};

} // namespace rungwright
