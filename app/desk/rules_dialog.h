// SPDX-License-Identifier: GPL-3.0-or-later
// The house's price rules: price points and how far a price may move.
#pragma once

#include "ladder/currency.h"
#include "reshape/rules.h"

#include <QDialog>

#include <memory>

class QLabel;
class QLineEdit;

namespace Ui
{
class RulesDialog;
}

namespace rungwright
{

/// An empty field is a rule that is not made. What is wrong is said beside its field, and OK waits until nothing is.
class RulesDialog : public QDialog
{
    Q_OBJECT
public:
    RulesDialog(const PriceRules& rules, const Currency& currency, QWidget* parent = nullptr);
    ~RulesDialog() override;

    /// What the fields say; while a field is wrong, the last rules that were right.
    PriceRules rules() const { return m_rules; }
    /// The price around which the preview shows what the rules allow, in place of one made up.
    void setTypicalPrice(Price price);

protected:
    void changeEvent(QEvent* event) override;

private:
    struct Field {
        QLineEdit* edit;
        QLabel* hint;
        QString help;
    };

    void fill(const PriceRules& rules);
    void read();
    void tidy(const Field& field);
    void showTrouble(const Field& field, const QString& trouble);
    void showPreview();
    void dress();
    QString nearbyPrices() const;

    Currency m_currency;
    PriceRules m_rules;
    Price m_typical;
    bool m_right = true; ///< Nothing is wrong in any field.
    std::unique_ptr<Ui::RulesDialog> m_ui;
    std::vector<Field> m_fields;
};

} // namespace rungwright
