// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk.h"

#include "appearance.h"
#include "main_window.h"
#include "questions.h"

#include <QApplication>
#include <QSettings>
#include <QStandardPaths>
#include <QTimer>

namespace rungwright
{

int runDesk(QApplication& application, const QString& file)
{
    QSettings settings;
    AppearanceKeeper appearance(application, settings);
    Questions questions;
    // Unsaved work without a file, and the locks of open ones, live where the platform keeps a program's own data.
    const QString state = QStandardPaths::writableLocation(QStandardPaths::AppLocalDataLocation);
    MainWindow window(questions, settings, state, &appearance);
    window.show();
    QTimer::singleShot(0, &window, [&window, file] {
        if (!window.files().offerLeftBehind() && !file.isEmpty())
            window.openFile(file);
    });
    return application.exec();
}

} // namespace rungwright
