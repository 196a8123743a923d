// SPDX-License-Identifier: GPL-3.0-or-later
// Paper and ink: light or dark, as the system has it or as the user says.
#pragma once

#include <QObject>
#include <QPalette>

class QApplication;
class QSettings;

namespace rungwright
{

enum class Appearance { system, light, dark };

class AppearanceKeeper : public QObject
{
    Q_OBJECT
public:
    AppearanceKeeper(QApplication& application, QSettings& settings);
    Appearance appearance() const { return m_appearance; }
    void set(Appearance appearance);

private:
    void apply();

    QApplication& m_application;
    QSettings& m_settings;
    Appearance m_appearance;
    bool m_systemIsDark;
};

/// The widget palette that goes with the house's colours.
QPalette housePalette(bool dark);

} // namespace rungwright
