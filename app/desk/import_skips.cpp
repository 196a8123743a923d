// SPDX-License-Identifier: GPL-3.0-or-later
#include "import_skips.h"

#include "import_words.h"

#include <QComboBox>
#include <QGridLayout>
#include <QLabel>
#include <QLineEdit>
#include <QPushButton>
#include <QScopedValueRollback>
#include <QVBoxLayout>

namespace rungwright
{

ImportSkips::ImportSkips(QWidget* parent) : QWidget(parent), m_grid(new QGridLayout), m_add(new QPushButton(tr("Add a ru&le")))
{
    auto* layout = new QVBoxLayout(this);
    layout->setContentsMargins(0, 0, 0, 0);
    layout->setSpacing(8);
    auto* head = new QLabel(tr("Pass over rows whose"));
    head->setTextFormat(Qt::PlainText);
    m_add->setObjectName(QStringLiteral("addSkip"));
    m_add->setAutoDefault(false);
    m_add->setAccessibleDescription(tr("Adds a rule by which rows are passed over"));
    m_grid->setHorizontalSpacing(8);
    m_grid->setVerticalSpacing(4);
    m_grid->setColumnStretch(0, 2);
    m_grid->setColumnStretch(2, 1);
    layout->addWidget(head);
    layout->addLayout(m_grid);
    layout->addWidget(m_add, 0, Qt::AlignLeft);
    layout->addStretch(1);
    connect(m_add, &QPushButton::clicked, this, [this] {
        if (m_headers.isEmpty())
            return;
        addRow({SkipRule::Kind::beginsWith, columnAt(m_headers, 0), {}});
        m_rows.back().text->setFocus();
    });
}

void ImportSkips::show(const QStringList& headers, const std::vector<SkipRule>& rules)
{
    const QScopedValueRollback filling(m_filling, true);
    m_headers = headers;
    while (!m_rows.empty())
        removeRow(m_rows.back().remove);
    for (const SkipRule& rule : rules)
        addRow(rule);
    m_add->setEnabled(!headers.isEmpty());
}

void ImportSkips::addRow(const SkipRule& rule)
{
    const auto tell = [this] {
        if (!m_filling)
            emit changed();
    };
    Row row{new QComboBox, new QComboBox, new QLineEdit(rule.text), new QPushButton(tr("Remove"))};
    row.column->setAccessibleName(tr("Column looked at"));
    row.column->setSizeAdjustPolicy(QComboBox::AdjustToMinimumContentsLengthWithIcon);
    row.column->setMinimumContentsLength(10);
    for (qsizetype place = 0; place < m_headers.size(); ++place)
        row.column->addItem(headerText(m_headers, place).simplified());
    row.column->setCurrentIndex(static_cast<int>(placeOf(m_headers, rule.column)));
    row.kind->setAccessibleName(tr("What makes a row be passed over"));
    row.kind->addItem(tr("is empty"), static_cast<int>(SkipRule::Kind::isEmpty));
    row.kind->addItem(tr("begins with"), static_cast<int>(SkipRule::Kind::beginsWith));
    row.kind->setCurrentIndex(row.kind->findData(static_cast<int>(rule.kind)));
    row.text->setAccessibleName(tr("Beginning of the cell"));
    row.text->setPlaceholderText(tr("Total"));
    row.text->setEnabled(rule.kind == SkipRule::Kind::beginsWith);
    row.remove->setAccessibleName(tr("Remove this rule"));
    row.remove->setAutoDefault(false);
    m_rows.push_back(row);
    place();
    connect(row.column, &QComboBox::currentIndexChanged, this, tell);
    connect(row.text, &QLineEdit::textChanged, this, tell);
    connect(row.kind, &QComboBox::currentIndexChanged, this, [row, tell] {
        row.text->setEnabled(row.kind->currentData().toInt() == static_cast<int>(SkipRule::Kind::beginsWith));
        tell();
    });
    connect(row.remove, &QPushButton::clicked, this, [this, button = row.remove] {
        removeRow(button);
        emit changed();
    });
}

void ImportSkips::removeRow(const QPushButton* button)
{
    const auto at = std::find_if(m_rows.begin(), m_rows.end(), [button](const Row& row) { return row.remove == button; });
    if (at == m_rows.end())
        return;
    for (QWidget* widget : std::initializer_list<QWidget*>{at->column, at->kind, at->text, at->remove}) {
        m_grid->removeWidget(widget);
        widget->disconnect(this);
        widget->hide();
        widget->deleteLater(); // not at once: the click that led here came from one of them
    }
    m_rows.erase(at);
    place();
}

void ImportSkips::place()
{
    for (std::size_t i = 0; i < m_rows.size(); ++i) {
        const Row& row = m_rows[i];
        const auto line = static_cast<int>(i);
        m_grid->addWidget(row.column, line, 0);
        m_grid->addWidget(row.kind, line, 1);
        m_grid->addWidget(row.text, line, 2);
        m_grid->addWidget(row.remove, line, 3);
        row.column->setObjectName(QStringLiteral("skipColumn%1").arg(i));
        row.kind->setObjectName(QStringLiteral("skipKind%1").arg(i));
        row.text->setObjectName(QStringLiteral("skipText%1").arg(i));
        row.remove->setObjectName(QStringLiteral("skipRemove%1").arg(i));
    }
}

std::vector<SkipRule> ImportSkips::rules() const
{
    std::vector<SkipRule> rules;
    for (const Row& row : m_rows) {
        SkipRule rule;
        rule.kind = static_cast<SkipRule::Kind>(row.kind->currentData().toInt());
        rule.text = rule.kind == SkipRule::Kind::beginsWith ? row.text->text().trimmed() : QString();
        if (row.column->currentIndex() < 0 || (rule.kind == SkipRule::Kind::beginsWith && rule.text.isEmpty()))
            continue; // not said yet
        rule.column = columnAt(m_headers, row.column->currentIndex());
        rules.push_back(rule);
    }
    return rules;
}

} // namespace rungwright
