// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk.h"
#include "headless.h"

#include <QApplication>
#include <QIcon>

int main(int argc, char** argv)
{
    using namespace rungwright;
    constexpr int kWrongUsage = 2;

    prepareProcess();
    QCoreApplication::setOrganizationName(QStringLiteral("rungwright"));
    QCoreApplication::setApplicationName(QStringLiteral("rungwright"));
    QCoreApplication::setApplicationVersion(QStringLiteral(RUNGWRIGHT_VERSION));

    const QStringList arguments = argumentTexts(argc, argv);
    if (asksForCommand(arguments))
        return runCommand(arguments, argv);

    if (displayIsMissing(arguments))
        return kWrongUsage;
    QApplication application(argc, argv);
    QGuiApplication::setApplicationDisplayName(QStringLiteral("Rungwright"));
    QGuiApplication::setDesktopFileName(QStringLiteral("rungwright"));
    QGuiApplication::setWindowIcon(QIcon(QStringLiteral(":/rungwright/icon.svg")));
    const std::optional<QString> file = deskFile(QCoreApplication::arguments());
    return file ? runDesk(application, *file) : kWrongUsage;
}
