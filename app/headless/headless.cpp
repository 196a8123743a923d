// SPDX-License-Identifier: GPL-3.0-or-later
#include "headless.h"

#include "commands.h"
#include "options.h"
#include "streams.h"

#include <QApplication>
#include <QHashFunctions>

#include <array>
#include <clocale>
#include <cstring>
#include <langinfo.h>

namespace rungwright
{

namespace
{

/// Texts and file names are UTF-8 here. Qt changes another locale to a UTF-8 one by itself, but with a warning on standard error that
/// would come with every command run from cron, where no locale is set.
void preferUtf8()
{
    std::setlocale(LC_ALL, "");
    if (std::strcmp(nl_langinfo(CODESET), "UTF-8") == 0)
        return;
    if (const QByteArray all = qgetenv("LC_ALL"); !all.isEmpty()) {
        qputenv("LANG", all);
        qunsetenv("LC_ALL");
    }
    qputenv("LC_CTYPE", "C.UTF-8");
}

/// Of Qt only what is grave: that there is no runtime folder, say, is nothing to the person who asked for a price sheet, and what
/// concerns them comes back from the functions called.
void graveMessagesOnly(QtMsgType type, const QMessageLogContext&, const QString& message)
{
    if (type == QtCriticalMsg || type == QtFatalMsg)
        say(QStringLiteral("rungwright: ") + message);
}

/// A picture must not depend on the screen at hand or on how the user scales and styles other programs, nor on the order in which hash
/// tables happen to be walked (a PDF lists its fonts in that order).
void forgetTheScreen()
{
    QHashSeed::setDeterministicGlobalSeed();
    qputenv("QT_QPA_PLATFORM", "offscreen");
    for (const char* name :
         {"QT_SCALE_FACTOR", "QT_SCREEN_SCALE_FACTORS", "QT_FONT_DPI", "QT_USE_PHYSICAL_DPI", "QT_STYLE_OVERRIDE", "QT_QPA_PLATFORMTHEME"})
        qunsetenv(name);
}

int answer(const QString& text)
{
    const auto written = writeToStandardOutput(text.toUtf8());
    return int(written ? ExitStatus::done : refuse(ExitStatus::cannotWrite, written.trouble()));
}

bool isOneOf(const QString& argument, std::initializer_list<const char*> words)
{
    for (const char* word : words) {
        if (argument == QLatin1String(word))
            return true;
    }
    return false;
}

} // namespace

void prepareProcess()
{
    guardStandardStreams();
    preferUtf8();
}

QStringList argumentTexts(int argc, char** argv)
{
    QStringList texts;
    for (int i = 0; i < argc; ++i)
        texts += QString::fromLocal8Bit(argv[i]);
    return texts;
}

bool asksForCommand(const QStringList& arguments)
{
    return arguments.size() > 1 && (findCommand(arguments[1]) || isOneOf(arguments[1], {"-h", "--help", "-v", "--version"}));
}

int runCommand(const QStringList& arguments, char** argv)
{
    if (isOneOf(arguments[1], {"-h", "--help"}))
        return answer(helpText());
    if (isOneOf(arguments[1], {"-v", "--version"}))
        return answer(QStringLiteral("rungwright %1\n").arg(QCoreApplication::applicationVersion()));

    const Command& command = *findCommand(arguments[1]);
    qInstallMessageHandler(graveMessagesOnly);
    // The application sees its own name only: all options are the command's, none is Qt's.
    std::array<char*, 2> own{argv[0], nullptr};
    int ownCount = 1;
    std::optional<QCoreApplication> plain;
    std::optional<QApplication> drawing;
    if (command.draws) {
        forgetTheScreen();
        drawing.emplace(ownCount, own.data());
    } else {
        plain.emplace(ownCount, own.data());
    }

    const Outcome<Request> request = readRequest(command, arguments);
    if (!request)
        return int(refuse(ExitStatus::wrongUsage, request.trouble()));
    if (request.value().help)
        return answer(helpText(command));
    return int(command.run(request.value()));
}

std::optional<QString> deskFile(const QStringList& arguments)
{
    QStringList files;
    bool optionsEnded = false;
    for (const QString& argument : arguments.mid(1)) {
        if (!optionsEnded && argument == QLatin1String("--")) {
            optionsEnded = true;
        } else if (!optionsEnded && argument.startsWith(QLatin1Char('-')) && argument.size() > 1) {
            say(QStringLiteral("rungwright: unknown option '%1'\n'rungwright --help' lists what there is.").arg(argument));
            return std::nullopt;
        } else {
            files += argument;
        }
    }
    if (files.size() > 1) {
        say(QStringLiteral("rungwright: wanted one FILE, found %1. A command (measure, scan, sheet, picture) stands before FILE.")
                .arg(files.size()));
        return std::nullopt;
    }
    return files.value(0);
}

bool displayIsMissing(const QStringList& arguments)
{
    if (arguments.contains(QStringLiteral("-platform")) || arguments.contains(QStringLiteral("--platform")))
        return false;
    for (const char* name : {"DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM"}) {
        if (!qEnvironmentVariableIsEmpty(name))
            return false;
    }
    // What is wrong with the line itself is told first.
    if (deskFile(arguments))
        say(QStringLiteral("rungwright: there is no display to open the desk on. These work without one: measure, scan, sheet, picture.\n"
                           "'rungwright --help' says more."));
    return true;
}

} // namespace rungwright
