// SPDX-License-Identifier: GPL-3.0-or-later
// A ladder made from a shape: floor, top and lean; two weights; even steps; or a few price steps.
#pragma once

#include "reshape/shape.h"
#include "workbench.h"

#include <QWidget>

#include <memory>
#include <optional>
#include <string>
#include <tuple>
#include <vector>

namespace Ui
{
class ShapeForm;
}

namespace rungwright
{

/// Begins from the shape of today's ladder; each touch of a control shows the shaped ladder as a trial on the bench.
class ShapeForm : public QWidget
{
    Q_OBJECT
public:
    explicit ShapeForm(QWidget* parent = nullptr);
    ~ShapeForm() override;

    /// The bench outlives the form.
    void attach(Workbench& bench);
    void tryNow();
    void focusFirst();

private:
    enum Kind { oneLean, twoWeights, evenSteps, priceSteps };

    void connectFields();
    void onReset();
    /// The order is the rules', until the user says otherwise for this tier.
    void takeOrderOfRules();
    /// Floor, top and lean of today's ladder.
    void beginFromToday();
    void takeWeightsOfToday();
    void showLean(double lean);
    void showChoices();
    void showNothing();
    Outcome<LadderShape> shape() const;
    Outcome<std::vector<PriceStep>> readSteps() const;
    QString shapeName(const LadderShape& shape) const;
    void say(const LadderShape& shape, std::span<const Price> prices);
    Kind kind() const;
    Among among() const;
    const Tier& tier() const { return m_bench->tierCase()->tier; }

    Workbench* m_bench = nullptr;
    std::string m_fittedSite; ///< By name: after a refresh, or with another scenario, the same index is another tier.
    std::string m_fittedTier;
    std::vector<Price> m_fittedPrices;
    std::optional<std::tuple<std::string, std::string, OrderKept>> m_orderOf; ///< Site, tier, and what its rules say of the order.
    bool m_showing = false; ///< The form is being filled: what changes is not the user's doing.
    bool m_trying = false;  ///< The bench follows the form, not the other way round.
    std::unique_ptr<Ui::ShapeForm> m_ui;
};

} // namespace rungwright
