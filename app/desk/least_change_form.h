// SPDX-License-Identifier: GPL-3.0-or-later
// Least change: the smallest set of changes that reaches a target, solved again while its slider moves.
#pragma once

#include "reshape/least_change.h"
#include "workbench.h"

#include <QWidget>

#include <memory>
#include <optional>
#include <string>
#include <tuple>
#include <vector>

class QLabel;

namespace Ui
{
class LeastChangeForm;
}

namespace rungwright
{

/// Each touch of a control solves and shows the ladder as a trial on the bench; where there is none, the bench shows what it showed before
/// and the form says what is in the way.
class LeastChangeForm : public QWidget
{
    Q_OBJECT
public:
    explicit LeastChangeForm(QWidget* parent = nullptr);
    ~LeastChangeForm() override;

    /// The bench outlives the form.
    void attach(Workbench& bench);
    void tryNow();
    /// What was last solved, under what the form said then.
    const LeastChangeAnswer& answer() const { return m_answer; }
    void focusTarget();

private:
    enum TotalChoice { totalHeld, totalChanged, totalFree };

    ChangeWish wish() const;
    ChangeTarget target() const;
    TargetKind kind() const;
    void onReset();
    /// The order is the rules', until the user says otherwise for this tier.
    void takeOrderOfRules();
    /// Range and place of the target's slider, from today's figures.
    void fitTarget(bool keepValue);
    void setTarget(double shown);
    void showChoices();
    void showAnswer();
    /// A figure and, for who hears it, its name.
    static void setFigure(const QLabel& name, QLabel& value, const QString& text);
    void showNothing();
    void useNearest();
    const Tier& tier() const { return m_bench->tierCase()->tier; }

    /// What the slider's range was taken from.
    struct Fitted {
        std::string site; ///< By name: after a refresh, or with another scenario, the same index is another tier.
        std::string tier;
        TargetKind kind = TargetKind::none;
        ModelSettings model;
        double today = 0;
        bool operator==(const Fitted&) const = default;
    };

    Workbench* m_bench = nullptr;
    LeastChange m_solver;
    LeastChangeAnswer m_answer; ///< A copy, prices and all: the next solution overwrites the solver's own.
    ChangeWish m_solved;
    std::vector<double> m_weights;
    std::optional<Fitted> m_fitted;
    double m_step = 1;                                                        ///< Of the slider, in the spin box's units.
    std::optional<std::tuple<std::string, std::string, OrderKept>> m_orderOf; ///< Site, tier, and what its rules say of the order.
    bool m_showing = false; ///< The form is being filled: what changes is not the user's doing.
    bool m_trying = false;  ///< The bench follows the form, not the other way round.
    std::unique_ptr<Ui::LeastChangeForm> m_ui;
};

} // namespace rungwright
