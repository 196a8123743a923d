// SPDX-License-Identifier: GPL-3.0-or-later
#include "program.h"

#include "caution.h"

#include <QFile>
#include <QProcess>

namespace rungwright
{

namespace
{

Ran finished(QProcess& process)
{
    // Under the sanitizers and beside other tests a command takes seconds, not milliseconds.
    if (!process.waitForStarted() || !process.waitForFinished(120'000) || process.exitStatus() != QProcess::NormalExit) {
        process.kill();
        process.waitForFinished();
        return {-1, process.readAllStandardOutput(), process.readAllStandardError()};
    }
    return {process.exitCode(), process.readAllStandardOutput(), process.readAllStandardError()};
}

QProcessEnvironment withoutDisplay()
{
    QProcessEnvironment environment = QProcessEnvironment::systemEnvironment();
    for (const char* name : {"DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM", "LC_ALL", "LC_CTYPE", "LANG"})
        environment.remove(QString::fromLatin1(name));
    return environment;
}

} // namespace

Ran run(const QStringList& arguments, const QString& standardOutput)
{
    QProcess process;
    process.setProcessEnvironment(withoutDisplay());
    if (!standardOutput.isEmpty())
        process.setStandardOutputFile(standardOutput);
    process.start(QStringLiteral(RUNGWRIGHT_PROGRAM), arguments);
    return finished(process);
}

Ran runInShell(const QString& script, const QStringList& arguments)
{
    QProcess process;
    process.setProcessEnvironment(withoutDisplay());
    process.start(QStringLiteral("bash"), QStringList{QStringLiteral("-c"), script, QStringLiteral(RUNGWRIGHT_PROGRAM)} + arguments);
    return finished(process);
}

QByteArray caution() { return cautionText().toUtf8() + '\n'; }

QString sample(const char* name) { return QStringLiteral(RUNGWRIGHT_SAMPLES "/") + QString::fromLatin1(name); }

QString written(const QString& path, const QByteArray& bytes)
{
    QFile file(path);
    if (!file.open(QIODevice::WriteOnly) || file.write(bytes) != bytes.size())
        qFatal("cannot write %s", qPrintable(path));
    return path;
}

QByteArray contents(const QString& path)
{
    QFile file(path);
    return file.open(QIODevice::ReadOnly) ? file.readAll() : QByteArray();
}

} // namespace rungwright
