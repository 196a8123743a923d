// SPDX-License-Identifier: GPL-3.0-or-later
#include "autosave.h"

#include "scenario_json.h"

#include <QCryptographicHash>
#include <QDir>
#include <QFileInfo>
#include <QUuid>

namespace rungwright
{

namespace
{

constexpr int kDelayMs = 2000;
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
    QObject(parent), m_document(document), m_stateFolder(stateFolder)
{
    QDir().mkpath(stateFolder);
    m_writer.setMaxThreadCount(1);
    m_timer.setSingleShot(true);
    m_timer.setInterval(kDelayMs);
    connect(&m_timer, &QTimer::timeout, this, &Autosave::write);
    connect(&document, &Document::changed, this, [this] { m_timer.start(); });
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
    const QDir folder(m_stateFolder);
    for (const QFileInfo& copy : folder.entryInfoList({kUntitledPrefix + QLatin1Char('*') + kUntitledSuffix}, QDir::Files, QDir::Time)) {
        if (copy.filePath() != m_copyPath && !isHeld(lockFor(copy.filePath())))
            return LeftBehind{copy.filePath(), {}, copy.lastModified()};
    }
    return std::nullopt;
}

bool Autosave::openElsewhere(const QString& path) const
{
    if (m_lock && m_lock->isLocked() && QFileInfo(m_guarded) == QFileInfo(path))
        return false;
    return isHeld(lockFor(path));
}

void Autosave::follow()
{
    m_writer.waitForDone();
    m_timer.stop();
    m_guarded = m_document.path();
    m_copyPath = copyFor(m_guarded);
    m_lock.reset();
    m_lock = std::make_unique<QLockFile>(lockFor(m_guarded.isEmpty() ? m_copyPath : m_guarded));
    m_lock->setStaleLockTime(0);
    if (!m_lock->tryLock(0) && !m_guarded.isEmpty()) {
        // Another window guards this file: the user was told, and each window keeps a copy of its own.
        m_copyPath = copyFor({});
        m_lock = std::make_unique<QLockFile>(lockFor(m_copyPath));
        m_lock->setStaleLockTime(0);
        m_lock->tryLock(0);
    }
    if (m_document.modified() && !m_document.empty())
        m_timer.start();
}

void Autosave::onSaveState()
{
    if (m_document.modified() || m_copyPath.isEmpty())
        return;
    discardCopy();
    if (m_document.path() != m_guarded)
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
    m_writer.waitForDone();
    if (!m_copyPath.isEmpty())
        QFile::remove(m_copyPath);
}

void Autosave::write()
{
    if (m_copyPath.isEmpty() || m_document.empty())
        return;
    if (!m_document.modified()) {
        discardCopy(); // an undo came back to what is saved
        return;
    }
    // The writer works on a copy of its own, so that editing goes on meanwhile.
    m_writer.start([this, scenario = m_document.scenario(), path = m_copyPath] {
        const auto saved = saveScenario(scenario, path);
        const QString message = saved.ok() ? QString() : QString::fromStdString(saved.trouble());
        QMetaObject::invokeMethod(
            this,
            [this, message] {
                if (!message.isEmpty() && !m_troubled)
                    emit trouble(message);
                m_troubled = !message.isEmpty();
            },
            Qt::QueuedConnection);
    });
}

} // namespace rungwright
