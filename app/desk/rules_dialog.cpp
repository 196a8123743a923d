// SPDX-License-Identifier: GPL-3.0-or-later
#include "rules_dialog.h"

#include "rules_text.h"
#include "rules_words.h"
#include "ui_rules_dialog.h"
#include "wording.h"
#include "words.h"

#include <QCheckBox>
#include <QComboBox>
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
        {m_ui->lowestEdit, m_ui->lowestHint, tr("No price is lowered below it.")},
        {m_ui->totalPercentEdit, m_ui->totalPercentHint, tr("Of today's total, up or down.")},
        {m_ui->totalMoneyEdit, m_ui->totalMoneyHint, tr("From today's total, up or down.")},
        {m_ui->shareEdit, m_ui->shareHint, tr("Of the units on offer, at or below the advertised floor.")},
    };
    const QString code = QString::fromStdString(currency.code);
    for (QLabel* unit : {m_ui->stepUnit, m_ui->leastUnit, m_ui->greatestUnit, m_ui->changeMoneyUnit, m_ui->ceilingUnit, m_ui->lowestUnit,
                         m_ui->totalMoneyUnit})
        unit->setText(currency.code == "XXX" ? QString() : code);
    for (QLabel* unit : {m_ui->changePercentUnit, m_ui->totalPercentUnit, m_ui->shareUnit})
        unit->setText(QStringLiteral("%"));
    for (QWidget* choice : std::initializer_list<QWidget*>{m_ui->scopeLabel, m_ui->scopeBox, m_ui->ownBox, m_ui->inForceLabel})
        choice->hide();
    fill(rules);
    dress();
    for (const Field& field : m_fields) {
        connect(field.edit, &QLineEdit::textChanged, this, &RulesDialog::read);
        connect(field.edit, &QLineEdit::editingFinished, this, [this, field] { tidy(field); });
    }
    connect(m_ui->orderBox, &QComboBox::currentIndexChanged, this, &RulesDialog::read);
    connect(m_ui->buttonBox, &QDialogButtonBox::accepted, this, &QDialog::accept);
    connect(m_ui->buttonBox, &QDialogButtonBox::rejected, this, &QDialog::reject);
    read();
    m_ui->stepEdit->setFocus();
}

RulesDialog::RulesDialog(const Scenario& scenario, const Tier& tier, QWidget* parent) :
    RulesDialog(scenario.rules, scenario.currency, parent)
{
    const RuleScope force = ruleScopeFor(scenario, tier);
    int begin = 0;
    for (const RuleScope& scope : {RuleScope{}, RuleScope{tier.site, {}}, RuleScope{tier.site, tier.name}}) {
        const PriceRules* rules = rulesOf(scenario, scope);
        const std::optional<PriceRules> now = rules ? std::optional(*rules) : std::nullopt;
        if (scope == force)
            begin = static_cast<int>(m_drafts.size());
        m_drafts.push_back({scope, now, now});
        m_ui->scopeBox->addItem(shownText(scopeWords(scope)));
    }
    for (QWidget* choice : std::initializer_list<QWidget*>{m_ui->scopeLabel, m_ui->scopeBox, m_ui->ownBox, m_ui->inForceLabel})
        choice->show();
    m_ui->scopeBox->setCurrentIndex(begin);
    connect(m_ui->scopeBox, &QComboBox::currentIndexChanged, this, &RulesDialog::showScope);
    connect(m_ui->ownBox, &QCheckBox::clicked, this, &RulesDialog::setOwn);
    auto prices = askingPrices(tier.units);
    if (!prices.empty()) {
        const auto middle = prices.begin() + static_cast<std::ptrdiff_t>(prices.size() / 2);
        std::ranges::nth_element(prices, middle);
        m_typical = *middle;
    }
    showScope(begin);
}

RulesDialog::~RulesDialog()
{
    // A field that loses the focus while the dialog goes has nothing left to write to.
    for (const Field& field : m_fields)
        field.edit->disconnect(this);
}

std::vector<RulesDialog::Change> RulesDialog::changes() const
{
    std::vector<Change> changes;
    for (const Draft& draft : m_drafts)
        if (draft.now != draft.before)
            changes.push_back({draft.scope, draft.now});
    return changes;
}

/// The nearest draft from `at` on outwards that has rules.
int RulesDialog::inForceAt(int at) const
{
    while (!m_drafts[static_cast<std::size_t>(at)].now)
        --at;
    return at;
}

void RulesDialog::showScope(int at)
{
    m_at = -1; // What is filled in now is not typed for the scope before.
    const auto index = static_cast<std::size_t>(at);
    const bool own = m_drafts[index].now.has_value();
    m_ui->ownBox->setChecked(own);
    m_ui->ownBox->setVisible(at > 0); // The scenario always has some.
    fill(*m_drafts[static_cast<std::size_t>(inForceAt(at))].now);
    for (const Field& field : m_fields)
        field.edit->setEnabled(own);
    m_ui->orderBox->setEnabled(own);
    m_at = at;
    read();
    showInForce();
}

void RulesDialog::setOwn(bool own)
{
    Draft& draft = m_drafts[static_cast<std::size_t>(m_at)];
    if (own)
        draft.now = m_drafts[static_cast<std::size_t>(inForceAt(m_at))].now;
    else
        draft.now.reset();
    showScope(m_at);
}

void RulesDialog::showInForce()
{
    const Draft& tier = m_drafts.back();
    const int force = inForceAt(static_cast<int>(m_drafts.size()) - 1);
    const QString name = shownText(QString::fromStdString(tier.scope.tier));
    m_ui->inForceLabel->setText(force == 2 ? tr("In force for %1: rules of its own.").arg(name)
                                : force == 1
                                    ? tr("In force for %1: the rules of its site, %2.").arg(name, shownText(scopeWords(m_drafts[1].scope)))
                                    : tr("In force for %1: the rules of the whole scenario.").arg(name));
}

void RulesDialog::fill(const PriceRules& rules)
{
    m_filling = true;
    const auto money = [this](std::optional<Price> price) { return price ? moneyText(*price, m_currency) : QString(); };
    const PricePoints& points = rules.points;
    // A step of the smallest amount is no rule; endings, though, have to stand on something.
    m_ui->stepEdit->setText(points.step > Price{1} || !points.endings.empty() ? money(points.step) : QString());
    m_ui->endingsEdit->setText(endingsText(points.endings, m_currency));
    m_ui->leastEdit->setText(money(points.least));
    m_ui->greatestEdit->setText(money(points.greatest));
    const auto percent = [](std::optional<double> value) { return value ? percentFieldText(*value) : QString(); };
    m_ui->changePercentEdit->setText(percent(rules.greatestChangePercent));
    m_ui->changeMoneyEdit->setText(money(rules.greatestChange));
    m_ui->ceilingEdit->setText(money(rules.ceiling));
    m_ui->lowestEdit->setText(money(rules.least));
    m_ui->totalPercentEdit->setText(percent(rules.greatestTierChangePercent));
    m_ui->totalMoneyEdit->setText(money(rules.greatestTierChange));
    m_share = rules.leastShareAtFloor;
    // To twelve digits: 7 % is 7, and not 7.000000000000001.
    m_shareText = m_share ? QLocale().toString(100 * *m_share, 'g', 12) : QString();
    m_ui->shareEdit->setText(m_shareText);
    m_ui->orderBox->setCurrentIndex(rules.order == OrderKept::grade ? 1 : 0);
    m_filling = false;
}

void RulesDialog::read()
{
    if (m_filling)
        return;
    enum {
        stepField,
        endingsField,
        leastField,
        greatestField,
        percentField,
        moneyField,
        ceilingField,
        lowestField,
        totalPercentField,
        totalMoneyField,
        shareField
    };
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
    take(lowestField, readAmount(text(lowestField), m_currency), rules.least);
    take(totalPercentField, readPercent(text(totalPercentField)), rules.greatestTierChangePercent);
    take(totalMoneyField, readAmount(text(totalMoneyField), m_currency), rules.greatestTierChange);
    std::optional<double> share;
    take(shareField, readPercent(text(shareField)), share);
    if (share && *share > 100)
        troubles[shareField] = tr("More than all of them.");
    else if (share)
        rules.leastShareAtFloor = text(shareField) == m_shareText ? m_share : *share / 100;
    rules.order = m_ui->orderBox->currentIndex() == 1 ? OrderKept::grade : OrderKept::present;

    const auto none = [&] { return std::ranges::all_of(troubles, [](const QString& t) { return t.isEmpty(); }); };
    const PricePoints& points = rules.points;
    if (points.least && points.greatest && *points.greatest < *points.least)
        troubles[greatestField] = tr("Lies below the least price.");
    if (points.least && rules.ceiling && *rules.ceiling < *points.least)
        troubles[ceilingField] = tr("Lies below the least price.");
    if (rules.least && rules.ceiling && *rules.ceiling < *rules.least)
        troubles[lowestField] = tr("Lies above the ceiling.");
    if (none() && !points.nearest(m_typical))
        troubles[points.greatest ? greatestField : leastField] = tr("No price point lies within these limits.");

    m_right = none();
    if (m_right)
        m_rules = rules;
    if (m_right && m_at >= 0 && m_drafts[static_cast<std::size_t>(m_at)].now)
        m_drafts[static_cast<std::size_t>(m_at)].now = rules;
    m_ui->scopeBox->setEnabled(m_right); // What cannot be read is not left behind.
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
    } else if (field.edit == m_ui->shareEdit && field.edit->text() == m_shareText) {
        return;
    } else if (field.edit == m_ui->changePercentEdit || field.edit == m_ui->totalPercentEdit || field.edit == m_ui->shareEdit) {
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
    const bool limited = m_rules.greatestChange || m_rules.greatestChangePercent || m_rules.ceiling || m_rules.least ||
                         m_rules.points.least || m_rules.points.greatest;
    const QString range = limited ? tr("A unit asked %1 today may be asked from %2 to %3.")
                                        .arg(typical, moneyText(room.lo, m_currency), moneyText(room.hi, m_currency))
                                  : tr("A unit's price may move as far as you like.");
    m_ui->previewLabel->setText(nearby + u'\n' + range);
}

void RulesDialog::dress()
{
    QFont strong = font();
    strong.setWeight(QFont::DemiBold);
    for (QLabel* heading : {m_ui->pointsHeading, m_ui->limitsHeading, m_ui->totalHeading, m_ui->ladderHeading})
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
