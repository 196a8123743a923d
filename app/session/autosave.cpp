// SPDX-License-Identifier: GPL-3.0-or-later
#include "autosave.h"

#include "scenario_json.h"

#include <QCryptographicHash>
#include <QDir>
#include <QElapsedTimer>
#include <QFileInfo>
#include <QUuid>

#include <algorithm>
#include <utility>

namespace rungwright
{

namespace
{

constexpr int kDelayMs = 2000;
/// A copy takes at most a sixth of the time, and none waits longer than two minutes.
constexpr int kPatience = 5;
constexpr int kLongestDelayMs = 120'000;
const auto kUntitledPrefix = QStringLiteral("unsaved-");
const auto kUntitledSuffix = QStringLiteral(".rungs.json");

/// True when a living process holds the lock.
bool isHeld(const QString& lockPath)
{
    if (!QFileInfo::exists(lockPath))
        return false;
    QLockFile probe(lockPath);
    probe.setStaleLockTime(0);
    return !probe.tryLock(0); // a stale lock of a dead process is taken over, and let go again
}

} // namespace

Autosave::Autosave(Document& document, const QString& stateFolder, QObject* parent) :
    QObject(parent), m_document(document), m_stateFolder(stateFolder), m_delay(kDelayMs)
{
    QDir().mkpath(stateFolder);
    m_writer.setMaxThreadCount(1);
    m_timer.setSingleShot(true);
    connect(&m_timer, &QTimer::timeout, this, &Autosave::write);
    connect(&document, &Document::changed, this, &Autosave::wait);
    connect(&document, &Document::saveStateChanged, this, &Autosave::onSaveState);
}

Autosave::~Autosave() { m_writer.waitForDone(); }

QString Autosave::copyFor(const QString& path) const
{
    if (path.isEmpty())
        return m_stateFolder + QLatin1Char('/') + kUntitledPrefix + QUuid::createUuid().toString(QUuid::WithoutBraces) + kUntitledSuffix;
    const QFileInfo info(path);
    return info.absolutePath() + QStringLiteral("/.") + info.fileName() + QStringLiteral(".unsaved");
}

QString Autosave::lockFor(const QString& path) const
{
    const QByteArray name = QFileInfo(path).absoluteFilePath().toUtf8();
    const QByteArray hash = QCryptographicHash::hash(name, QCryptographicHash::Sha256).toHex().left(32);
    return m_stateFolder + QLatin1Char('/') + QString::fromLatin1(hash) + QStringLiteral(".lock");
}

std::optional<LeftBehind> Autosave::leftBehind(const QString& path) const
{
    if (!path.isEmpty()) {
        const QFileInfo copy(copyFor(path));
        const bool ours = copy.filePath() == m_copyPath; // it is this window's own work
        if (ours || !copy.exists() || openElsewhere(path))
            return std::nullopt;
        return LeftBehind{copy.filePath(), path, copy.lastModified()};
    }
    const std::vector<LeftBehind> all = leftBehindUntitled();
    return all.empty() ? std::nullopt : std::optional(all.front());
}

std::vector<LeftBehind> Autosave::leftBehindUntitled() const
{
    std::vector<LeftBehind> all;
    const QDir folder(m_stateFolder);
    for (const QFileInfo& copy : folder.entryInfoList({kUntitledPrefix + QLatin1Char('*') + kUntitledSuffix}, QDir::Files, QDir::Time)) {
        if (copy.filePath() != m_copyPath && !isHeld(lockFor(copy.filePath())))
            all.push_back({copy.filePath(), {}, copy.lastModified()});
    }
    return all;
}

bool Autosave::openElsewhere(const QString& path) const
{
    if (m_lock && m_lock->isLocked() && QFileInfo(m_guarded) == QFileInfo(path))
        return false;
    return isHeld(lockFor(path));
}

void Autosave::follow()
{
    m_timer.stop();
    m_guarded = m_document.path();
    m_copyPath = copyFor(m_guarded);
    if (!takeLock(m_guarded.isEmpty() ? m_copyPath : m_guarded) && !m_guarded.isEmpty()) {
        // Another window guards this file: the user was told, and each window keeps a copy of its own.
        m_copyPath = copyFor({});
        takeLock(m_copyPath);
    }
    if (m_document.modified() && !m_document.empty())
        wait();
}

bool Autosave::takeLock(const QString& path)
{
    const QString lockPath = lockFor(path);
    if (m_lock && m_lockPath == lockPath && m_lock->isLocked())
        return true;
    // What is still being written stays guarded until it is done.
    inTurn([former = std::exchange(m_lock, nullptr)]() mutable { former.reset(); });
    m_lockPath = lockPath;
    m_lock = std::make_shared<QLockFile>(lockPath);
    m_lock->setStaleLockTime(0);
    return m_lock->tryLock(0);
}

void Autosave::onSaveState()
{
    if (m_copyPath.isEmpty())
        return;
    const bool moved = m_document.path() != m_guarded;
    if (!m_document.modified() || moved)
        discardCopy();
    if (moved)
        follow();
}

void Autosave::flush()
{
    m_timer.stop();
    if (m_document.modified())
        write();
    m_writer.waitForDone();
}

void Autosave::discardCopy()
{
    m_timer.stop();
    if (!m_copyPath.isEmpty())
        inTurn([path = m_copyPath] { QFile::remove(path); });
}

void Autosave::hold(bool on)
{
    m_held = on;
    if (!on && m_document.modified() && !m_document.empty())
        wait();
}

void Autosave::wait()
{
    // Not begun anew by every change: who edits without a pause wants a copy too.
    if (!m_timer.isActive() && !m_held)
        m_timer.start(std::max(m_delay, std::min(kLongestDelayMs, kPatience * m_lastMs)));
}

void Autosave::inTurn(const std::function<void()>& job)
{
    if (m_jobs == 0) {
        job();
        return;
    }
    ++m_jobs;
    m_writer.start([this, job] {
        job();
        --m_jobs;
    });
}

void Autosave::write()
{
    if (m_copyPath.isEmpty() || m_document.empty() || m_held)
        return;
    if (!m_document.modified()) {
        discardCopy(); // an undo came back to what is saved
        return;
    }
    // The writer works on a copy of its own, so that editing goes on meanwhile.
    ++m_jobs;
    m_writer.start([this, scenario = m_document.scenario(), path = m_copyPath]() mutable {
        QElapsedTimer clock;
        clock.start();
        const auto saved = saveScenario(scenario, path);
        const QString message = saved.ok() ? QString() : QString::fromStdString(saved.trouble());
        scenario = {}; // what only this copy holds is let go here, not on the window's thread
        --m_jobs;
        QMetaObject::invokeMethod(
            this, [this, message, took = static_cast<int>(clock.elapsed())] { written(message, took); }, Qt::QueuedConnection);
    });
}

void Autosave::written(const QString& message, int milliseconds)
{
    m_lastMs = milliseconds;
    if (!message.isEmpty() && !m_troubled)
        emit trouble(message);
    m_troubled = !message.isEmpty();
}

} // namespace rungwright
