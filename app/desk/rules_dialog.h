// SPDX-License-Identifier: GPL-3.0-or-later
// The house's price rules, of the whole scenario, a site or a tier: price points, how far a price may move, what a tier keeps as a whole.
#pragma once

#include "ladder/currency.h"
#include "scenario.h"

#include <QDialog>

#include <memory>
#include <optional>
#include <vector>

class QLabel;
class QLineEdit;

namespace Ui
{
class RulesDialog;
}

namespace rungwright
{

/// An empty field is a rule that is not made. What is wrong is said beside its field, and OK waits until nothing is. A site or a tier
/// without rules of its own shows those that hold for it, not to be written in.
class RulesDialog : public QDialog
{
    Q_OBJECT
public:
    RulesDialog(const PriceRules& rules, const Currency& currency, QWidget* parent = nullptr);
    /// For a choice among the scenario, the tier's site and the tier; begins with the rules in force for the tier, and shows what they
    /// allow around its middle price.
    RulesDialog(const Scenario& scenario, const Tier& tier, QWidget* parent = nullptr);
    ~RulesDialog() override;

    /// What the fields say; while a field is wrong, the last rules that were right.
    PriceRules rules() const { return m_rules; }
    /// What would change: a scope and its rules, or nothing where its own rules go.
    struct Change {
        RuleScope scope;
        std::optional<PriceRules> rules;
    };
    std::vector<Change> changes() const;

protected:
    void changeEvent(QEvent* event) override;

private:
    struct Field {
        QLineEdit* edit;
        QLabel* hint;
        QString help;
    };

    struct Draft {
        RuleScope scope;
        std::optional<PriceRules> before;
        std::optional<PriceRules> now;
    };

    void showScope(int at);
    void setOwn(bool own);
    void showInForce();
    int inForceAt(int at) const;
    void fill(const PriceRules& rules);
    void read();
    void tidy(const Field& field);
    void showTrouble(const Field& field, const QString& trouble);
    void showPreview();
    void dress();
    QString nearbyPrices() const;

    Currency m_currency;
    PriceRules m_rules;
    Price m_typical;     ///< Around it the preview shows what the rules allow; made up where there is no tier.
    bool m_right = true; ///< Nothing is wrong in any field.
    std::unique_ptr<Ui::RulesDialog> m_ui;
    std::vector<Field> m_fields;
    std::vector<Draft> m_drafts; ///< Widest first; empty when there is no choice of scopes.
    int m_at = -1;               ///< The draft in the fields.
    bool m_filling = false;
    QString m_shareText;           ///< What the share at the floor was written as ...
    std::optional<double> m_share; ///< ... so that it stays the same when it is left alone.
};

} // namespace rungwright
