// SPDX-License-Identifier: GPL-3.0-or-later
#include "rules_dialog.h"

#include "rules_text.h"
#include "ui_rules_dialog.h"
#include "wording.h"

#include <QEvent>
#include <QPushButton>
#include <QStringList>

#include <algorithm>

namespace rungwright
{

namespace
{

QString trouble(const std::string& words) { return QString::fromStdString(words); }

} // namespace

RulesDialog::RulesDialog(const PriceRules& rules, const Currency& currency, QWidget* parent) :
    QDialog(parent),
    m_currency(currency),
    m_rules(rules),
    m_typical{100 * currency.minorPerMajor()},
    m_ui(std::make_unique<Ui::RulesDialog>())
{
    m_ui->setupUi(this);
    m_fields = {
        {m_ui->stepEdit, m_ui->stepHint, tr("From one allowed price to the next.")},
        {m_ui->endingsEdit, m_ui->endingsHint,
         tr("Added to each step, such as %1.")
             .arg(endingsText({Price{currency.minorPerMajor() / 2}, Price{currency.minorPerMajor() * 95 / 100}}, currency))},
        {m_ui->leastEdit, m_ui->leastHint, tr("No price is moved below it.")},
        {m_ui->greatestEdit, m_ui->greatestHint, tr("No price is moved above it.")},
        {m_ui->changePercentEdit, m_ui->changePercentHint, tr("Of a unit's price today, up or down.")},
        {m_ui->changeMoneyEdit, m_ui->changeMoneyHint, tr("From a unit's price today, up or down.")},
        {m_ui->ceilingEdit, m_ui->ceilingHint, tr("No price is raised above it.")},
    };
    const QString code = QString::fromStdString(currency.code);
    for (QLabel* unit : {m_ui->stepUnit, m_ui->leastUnit, m_ui->greatestUnit, m_ui->changeMoneyUnit, m_ui->ceilingUnit})
        unit->setText(currency.code == "XXX" ? QString() : code);
    m_ui->changePercentUnit->setText(QStringLiteral("%"));
    fill(rules);
    dress();
    for (const Field& field : m_fields) {
        connect(field.edit, &QLineEdit::textChanged, this, &RulesDialog::read);
        connect(field.edit, &QLineEdit::editingFinished, this, [this, field] { tidy(field); });
    }
    connect(m_ui->buttonBox, &QDialogButtonBox::accepted, this, &QDialog::accept);
    connect(m_ui->buttonBox, &QDialogButtonBox::rejected, this, &QDialog::reject);
    read();
    m_ui->stepEdit->setFocus();
}

RulesDialog::~RulesDialog()
{
    // A field that loses the focus while the dialog goes has nothing left to write to.
    for (const Field& field : m_fields)
        field.edit->disconnect(this);
}

void RulesDialog::setTypicalPrice(Price price)
{
    m_typical = price;
    showPreview();
}

void RulesDialog::fill(const PriceRules& rules)
{
    const auto money = [this](std::optional<Price> price) { return price ? moneyText(*price, m_currency) : QString(); };
    const PricePoints& points = rules.points;
    // A step of the smallest amount is no rule; endings, though, have to stand on something.
    if (points.step > Price{1} || !points.endings.empty())
        m_ui->stepEdit->setText(money(points.step));
    m_ui->endingsEdit->setText(endingsText(points.endings, m_currency));
    m_ui->leastEdit->setText(money(points.least));
    m_ui->greatestEdit->setText(money(points.greatest));
    if (rules.greatestChangePercent)
        m_ui->changePercentEdit->setText(percentFieldText(*rules.greatestChangePercent));
    m_ui->changeMoneyEdit->setText(money(rules.greatestChange));
    m_ui->ceilingEdit->setText(money(rules.ceiling));
}

void RulesDialog::read()
{
    enum { stepField, endingsField, leastField, greatestField, percentField, moneyField, ceilingField };
    std::vector<QString> troubles(m_fields.size());
    const auto take = [&](std::size_t field, const auto& outcome, auto& into) {
        if (outcome.ok())
            into = outcome.value();
        else
            troubles[field] = trouble(outcome.trouble());
    };
    const auto text = [&](std::size_t field) { return m_fields[field].edit->text(); };

    PriceRules rules;
    std::optional<Price> step;
    take(stepField, readAmount(text(stepField), m_currency), step);
    rules.points.step = step.value_or(Price{1});
    // What is wrong with the step is not wrong with the endings too.
    if (troubles[stepField].isEmpty())
        take(endingsField, readEndings(text(endingsField), step, m_currency), rules.points.endings);
    take(leastField, readAmount(text(leastField), m_currency), rules.points.least);
    take(greatestField, readAmount(text(greatestField), m_currency), rules.points.greatest);
    take(percentField, readPercent(text(percentField)), rules.greatestChangePercent);
    take(moneyField, readAmount(text(moneyField), m_currency), rules.greatestChange);
    take(ceilingField, readAmount(text(ceilingField), m_currency), rules.ceiling);

    const auto none = [&] { return std::ranges::all_of(troubles, [](const QString& t) { return t.isEmpty(); }); };
    const PricePoints& points = rules.points;
    if (points.least && points.greatest && *points.greatest < *points.least)
        troubles[greatestField] = tr("Lies below the least price.");
    if (points.least && rules.ceiling && *rules.ceiling < *points.least)
        troubles[ceilingField] = tr("Lies below the least price.");
    if (none() && !points.nearest(m_typical))
        troubles[points.greatest ? greatestField : leastField] = tr("No price point lies within these limits.");

    m_right = none();
    if (m_right)
        m_rules = rules;
    for (std::size_t i = 0; i < m_fields.size(); ++i)
        showTrouble(m_fields[i], troubles[i]);
    m_ui->buttonBox->button(QDialogButtonBox::Ok)->setEnabled(m_right);
    showPreview();
}

/// Writes what was understood back into the field, so that a misread amount is seen before it counts.
void RulesDialog::tidy(const Field& field)
{
    if (field.edit == m_ui->endingsEdit) {
        const auto step = readAmount(m_ui->stepEdit->text(), m_currency);
        const auto endings = readEndings(field.edit->text(), step.ok() ? step.value() : std::nullopt, m_currency);
        if (endings.ok())
            field.edit->setText(endingsText(endings.value(), m_currency));
    } else if (field.edit == m_ui->changePercentEdit) {
        const auto percent = readPercent(field.edit->text());
        if (percent.ok())
            field.edit->setText(percent.value() ? percentFieldText(*percent.value()) : QString());
    } else {
        const auto amount = readAmount(field.edit->text(), m_currency);
        if (amount.ok())
            field.edit->setText(amount.value() ? moneyText(*amount.value(), m_currency) : QString());
    }
}

void RulesDialog::showTrouble(const Field& field, const QString& trouble)
{
    const bool wrong = !trouble.isEmpty();
    field.hint->setText(wrong ? QStringLiteral("⚠ ") + trouble : field.help);
    QFont font = this->font();
    font.setWeight(wrong ? QFont::DemiBold : QFont::Normal);
    field.hint->setFont(font);
    field.edit->setAccessibleDescription(wrong ? tr("Wrong: %1").arg(trouble) : field.help);
    field.edit->setProperty("wrong", wrong);
}

QString RulesDialog::nearbyPrices() const
{
    const PricePoints& points = m_rules.points;
    const auto around = points.nearest(m_typical);
    if (!around)
        return {};
    std::vector<Price> prices{*around};
    for (const int direction : {-1, +1}) {
        Price last = *around;
        for (int i = 0; i < 3; ++i) {
            const Price next = points.stepped(last, direction);
            if (next == last)
                break;
            prices.push_back(last = next);
        }
    }
    std::ranges::sort(prices);
    QStringList words;
    for (const Price price : prices)
        words << moneyText(price, m_currency);
    return words.join(QStringLiteral("   "));
}

void RulesDialog::showPreview()
{
    if (!m_right) {
        m_ui->previewLabel->setText(tr("The preview returns when every field can be read."));
        return;
    }
    const QString typical = moneyText(m_typical, m_currency);
    const QString nearby = tr("Allowed prices around %1:   %2").arg(typical, nearbyPrices());
    Unit unit;
    unit.asking = m_typical;
    const Room room = roomOf(unit, m_rules);
    const bool limited =
        m_rules.greatestChange || m_rules.greatestChangePercent || m_rules.ceiling || m_rules.points.least || m_rules.points.greatest;
    const QString range = limited ? tr("A unit asked %1 today may be asked from %2 to %3.")
                                        .arg(typical, moneyText(room.lo, m_currency), moneyText(room.hi, m_currency))
                                  : tr("A unit's price may move as far as you like.");
    m_ui->previewLabel->setText(nearby + u'\n' + range);
}

void RulesDialog::dress()
{
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    for (QLabel* heading : {m_ui->pointsHeading, m_ui->limitsHeading})
        heading->setFont(strong);
    // Two lines each at most: the fields must not jump when what is wrong takes more words than the help.
    for (const Field& field : m_fields)
        field.hint->setMinimumHeight(field.edit->sizeHint().height());
}

void RulesDialog::changeEvent(QEvent* event)
{
    QDialog::changeEvent(event);
    if (event->type() == QEvent::FontChange) {
        dress();
        read();
    }
}

} // namespace rungwright
