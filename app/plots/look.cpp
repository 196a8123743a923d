// SPDX-License-Identifier: GPL-3.0-or-later
#include "look.h"

#include <QFile>
#include <QJsonArray>
#include <QJsonDocument>
#include <QJsonObject>
#include <QPalette>
#include <QWidget>

// A static library's resources are only linked in when something asks for them; the macro wants to stand outside of any namespace.
static void takeInPalette() { Q_INIT_RESOURCE(palette); }

namespace rungwright
{

namespace
{

QColor colourOf(const QJsonValue& value)
{
    const QColor colour(value.toString());
    Q_ASSERT_X(colour.isValid(), "palette.json", "a colour is missing or misspelt");
    return colour;
}

Look lookNamed(const QString& name, bool dark)
{
    takeInPalette();
    QFile file(QStringLiteral(":/rungwright/palette.json"));
    const bool opened = file.open(QIODevice::ReadOnly);
    Q_ASSERT(opened);
    Q_UNUSED(opened)
    const QJsonObject all = QJsonDocument::fromJson(file.readAll()).object().value(name).toObject();
    const auto named = [&all](const char* key) { return colourOf(all.value(QLatin1String(key))); };
    Look look;
    look.dark = dark;
    look.paper = named("paper");
    look.ink = named("ink");
    look.faintInk = named("faintInk");
    look.grid = named("grid");
    look.onOffer = named("onOffer");
    look.taken = named("taken");
    look.floor = named("floor");
    look.gapLine = named("gapLine");
    look.gapFill = named("gapFill");
    look.gapHatch = named("gapHatch");
    look.selection = named("selection");
    look.selectionFill = named("selectionFill");
    look.trace = named("trace");
    look.focus = named("focus");
    const QJsonArray series = all.value(QLatin1String("series")).toArray();
    Q_ASSERT(static_cast<std::size_t>(series.size()) == look.series.size());
    for (std::size_t i = 0; i < look.series.size(); ++i)
        look.series[i] = colourOf(series.at(static_cast<qsizetype>(i)));
    return look;
}

} // namespace

const Look& Look::light()
{
    static const Look look = lookNamed(QStringLiteral("light"), false);
    return look;
}

const Look& Look::night()
{
    static const Look look = lookNamed(QStringLiteral("dark"), true);
    return look;
}

const Look& Look::of(const QWidget* widget)
{
    const QPalette palette = widget ? widget->palette() : QPalette();
    return palette.color(QPalette::Window).lightnessF() < 0.5 ? night() : light();
}

} // namespace rungwright
