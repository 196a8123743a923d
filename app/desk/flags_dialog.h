// SPDX-License-Identifier: GPL-3.0-or-later
// From where on the worklist flags a tier: the scenario's thresholds.
#pragma once

#include "worklist.h"

#include <QDialog>

#include <memory>

namespace Ui
{
class FlagsDialog;
}

namespace rungwright
{

class FlagsDialog : public QDialog
{
    Q_OBJECT
public:
    /// `list` outlives the dialog; it is read to say what the thresholds would flag.
    explicit FlagsDialog(const Worklist& list, QWidget* parent = nullptr);
    ~FlagsDialog() override;

    FlagThresholds thresholds() const;

private:
    void show(const FlagThresholds& thresholds);
    void preview();

    const Worklist& m_list;
    std::unique_ptr<Ui::FlagsDialog> m_ui;
};

} // namespace rungwright
