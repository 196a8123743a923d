// SPDX-License-Identifier: GPL-3.0-or-later
// The menu in which the ladders to compare are ticked.
#pragma once

#include "ladder_pick.h"

#include <QMenu>
#include <QStringList>

namespace rungwright
{

/// Ticking an entry, by mouse, Space or Enter, leaves the menu open: several are ticked without opening it again for each. Esc and a click
/// elsewhere close it.
class PickMenu : public QMenu
{
    Q_OBJECT
public:
    explicit PickMenu(QWidget* parent = nullptr) : QMenu(parent) {}

    /// The current ladder and the candidates of these names, ticked as picked; what the limits forbid cannot be ticked.
    void setLadders(const QStringList& names, const LadderPick& picked);

signals:
    void ticked(int candidate, bool on);

protected:
    void mouseReleaseEvent(QMouseEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;

private:
    static bool tick(QAction* action);
};

/// A name for menus and buttons: its own "&" is no mnemonic, and a long one is cut in the middle.
QString buttonName(const QString& name);

} // namespace rungwright
