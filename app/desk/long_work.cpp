// SPDX-License-Identifier: GPL-3.0-or-later
#include "long_work.h"

#include <QProgressDialog>
#include <QtConcurrent>

namespace rungwright
{

namespace
{

constexpr int kParts = 1000;
/// Short work shows no dialog: it would only flash.
constexpr int kShownAfterMs = 400;

} // namespace

LongWork::LongWork(QWidget* window) : QObject(window), m_window(window)
{
    connect(&m_watcher, &QFutureWatcherBase::finished, this, &LongWork::finished);
}

LongWork::~LongWork()
{
    cancel();
    m_watcher.disconnect(this);
    m_watcher.waitForFinished();
}

void LongWork::cancel()
{
    if (m_cancel)
        m_cancel->store(true);
}

void LongWork::run(const QString& title, const Job& job, const std::function<void(bool)>& then)
{
    Q_ASSERT(!m_busy);
    m_busy = true;
    m_then = then;
    m_cancel = std::make_shared<std::atomic<bool>>(false);
    m_progress = new QProgressDialog(title, tr("Cancel"), 0, kParts, m_window);
    m_progress->setObjectName(QStringLiteral("longWork"));
    m_progress->setWindowModality(Qt::WindowModal);
    m_progress->setMinimumDuration(kShownAfterMs);
    m_progress->setAutoReset(false);
    m_progress->setAutoClose(false);
    m_progress->setValue(0);
    connect(m_progress, &QProgressDialog::canceled, this, &LongWork::cancel);
    connect(&m_watcher, &QFutureWatcherBase::progressValueChanged, m_progress, &QProgressDialog::setValue);
    m_watcher.setFuture(QtConcurrent::run([job, cancel = m_cancel](QPromise<void>& promise) {
        promise.setProgressRange(0, kParts);
        job(
            [&promise, &cancel](double share) {
                promise.setProgressValue(static_cast<int>(share * kParts));
                return !cancel->load();
            },
            *cancel);
    }));
}

void LongWork::finished()
{
    if (m_progress) {
        m_progress->disconnect(this);
        m_progress->close();
        m_progress->deleteLater();
    }
    m_busy = false;
    const auto then = std::exchange(m_then, nullptr);
    then(m_cancel->load());
    if (!m_busy)
        emit idle();
}

} // namespace rungwright
