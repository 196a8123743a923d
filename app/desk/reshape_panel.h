// SPDX-License-Identifier: GPL-3.0-or-later
// Reshaping by solver and by shape, in a dock: each tries its ladder on the bench, and one key keeps it or gives it up.
#pragma once

#include "workbench.h"

#include <QWidget>

#include <memory>

namespace Ui
{
class ReshapePanel;
}

namespace rungwright
{

class LeastChangeForm;
class ShapeForm;

/// Enter keeps what is tried as a candidate (one undo step), Esc gives it up.
class ReshapePanel : public QWidget
{
    Q_OBJECT
public:
    /// The bench outlives the panel.
    explicit ReshapePanel(Workbench& bench, QWidget* parent = nullptr);
    ~ReshapePanel() override;

    LeastChangeForm& leastChange();
    ShapeForm& shape();
    /// To the front, with the keyboard on what is set first.
    void showLeastChange();
    void showShape();

protected:
    void keyPressEvent(QKeyEvent* event) override;

private:
    void showKeep();
    bool somethingToKeep() const;

    Workbench& m_bench;
    std::unique_ptr<Ui::ReshapePanel> m_ui;
};

} // namespace rungwright
