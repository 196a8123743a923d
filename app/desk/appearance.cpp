// SPDX-License-Identifier: GPL-3.0-or-later
#include "appearance.h"

#include "look.h"

#include <QApplication>
#include <QFontDatabase>
#include <QSettings>
#include <QStyleFactory>

namespace rungwright
{

namespace
{

const auto kKey = QStringLiteral("appearance");

/// Without a desktop's own font setting Qt falls back to a wide default; a text face with tabular figures reads better.
void chooseFont(QApplication& application)
{
    QFont font = application.font();
    const QStringList unset{QStringLiteral("Sans Serif"), QStringLiteral("Sans"), QStringLiteral("DejaVu Sans"), QString()};
    if (!unset.contains(font.family()) || !QFontDatabase::families().contains(QStringLiteral("Noto Sans")))
        return;
    font.setFamily(QStringLiteral("Noto Sans"));
    font.setPointSizeF(9.5);
    application.setFont(font);
}

} // namespace

QPalette housePalette(bool dark)
{
    const Look& look = dark ? Look::night() : Look::light();
    // The style draws outlines darker than the window: on a window as dark as the paper they would not be seen.
    const QColor window = dark ? look.paper.lighter(145) : look.paper.darker(104);
    const QColor button = dark ? look.paper.lighter(190) : look.paper.darker(106);
    QPalette palette(button, window);
    palette.setColor(QPalette::WindowText, look.ink);
    palette.setColor(QPalette::Text, look.ink);
    palette.setColor(QPalette::ButtonText, look.ink);
    palette.setColor(QPalette::Base, look.paper);
    palette.setColor(QPalette::AlternateBase, window);
    palette.setColor(QPalette::PlaceholderText, look.faintInk);
    palette.setColor(QPalette::Highlight, look.selectionFill);
    palette.setColor(QPalette::HighlightedText, look.ink);
    palette.setColor(QPalette::ToolTipBase, look.paper);
    palette.setColor(QPalette::ToolTipText, look.ink);
    palette.setColor(QPalette::Link, look.onOffer);
    palette.setColor(QPalette::LinkVisited, look.floor);
    for (const auto role : {QPalette::WindowText, QPalette::Text, QPalette::ButtonText, QPalette::HighlightedText})
        palette.setColor(QPalette::Disabled, role, look.taken);
    return palette;
}

AppearanceKeeper::AppearanceKeeper(QApplication& application, QSettings& settings) :
    m_application(application),
    m_settings(settings),
    m_appearance(static_cast<Appearance>(qBound(0, settings.value(kKey, 0).toInt(), 2))),
    m_systemIsDark(application.palette().color(QPalette::Window).lightness() < 128)
{
    application.setStyle(QStyleFactory::create(QStringLiteral("Fusion")));
    chooseFont(application);
    apply();
}

void AppearanceKeeper::set(Appearance appearance)
{
    m_appearance = appearance;
    m_settings.setValue(kKey, static_cast<int>(appearance));
    apply();
}

void AppearanceKeeper::apply()
{
    const bool dark = m_appearance == Appearance::dark || (m_appearance == Appearance::system && m_systemIsDark);
    m_application.setPalette(housePalette(dark));
}

} // namespace rungwright
