// SPDX-License-Identifier: GPL-3.0-or-later
#include "flags_dialog.h"

#include "ui_flags_dialog.h"

#include <QPushButton>

namespace rungwright
{

FlagsDialog::FlagsDialog(const Worklist& list, QWidget* parent) : QDialog(parent), m_list(list), m_ui(std::make_unique<Ui::FlagsDialog>())
{
    m_ui->setupUi(this);
    show(list.thresholds());
    connect(m_ui->leansLeftBox, &QDoubleSpinBox::valueChanged, this, &FlagsDialog::preview);
    connect(m_ui->gapShareBox, &QDoubleSpinBox::valueChanged, this, &FlagsDialog::preview);
    connect(m_ui->lastUnitsBox, &QSpinBox::valueChanged, this, &FlagsDialog::preview);
    connect(&list, &Worklist::measured, this, &FlagsDialog::preview);
    connect(m_ui->buttonBox->button(QDialogButtonBox::RestoreDefaults), &QPushButton::clicked, this, [this] { show(FlagThresholds{}); });
    preview();
}

FlagsDialog::~FlagsDialog() = default;

void FlagsDialog::show(const FlagThresholds& thresholds)
{
    m_ui->leansLeftBox->setValue(thresholds.leansLeft);
    m_ui->gapShareBox->setValue(100 * thresholds.gapShare);
    m_ui->lastUnitsBox->setValue(thresholds.lastUnits);
}

FlagThresholds FlagsDialog::thresholds() const
{
    // What was not touched stays as exact as a file had it.
    FlagThresholds wanted = m_list.thresholds();
    const auto changed = [](const QDoubleSpinBox& box, double shown) { return box.textFromValue(box.value()) != box.textFromValue(shown); };
    if (changed(*m_ui->leansLeftBox, wanted.leansLeft))
        wanted.leansLeft = m_ui->leansLeftBox->value();
    if (changed(*m_ui->gapShareBox, 100 * wanted.gapShare))
        wanted.gapShare = m_ui->gapShareBox->value() / 100;
    wanted.lastUnits = m_ui->lastUnitsBox->value();
    return wanted;
}

void FlagsDialog::preview()
{
    const FlagThresholds wanted = thresholds();
    int left = 0;
    int wide = 0;
    int last = 0;
    for (int tier = 0; tier < m_list.count(); ++tier) {
        const FlagSet flags = flagsOf(m_list.row(tier), wanted);
        left += flags.has(Flag::leansLeft) ? 1 : 0;
        wide += flags.has(Flag::wideGap) ? 1 : 0;
        last += flags.has(Flag::lastUnits) ? 1 : 0;
    }
    const auto said = [this](int n) { return tr("%1 of %2 tiers").arg(QLocale().toString(n), QLocale().toString(m_list.count())); };
    m_ui->leansLeftCount->setText(said(left));
    m_ui->gapShareCount->setText(said(wide));
    m_ui->lastUnitsCount->setText(said(last));
}

} // namespace rungwright
