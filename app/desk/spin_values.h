// SPDX-License-Identifier: GPL-3.0-or-later
// Spin boxes whose every new value is tried at once.
#pragma once

#include <QDoubleSpinBox>

#include <utility>

namespace rungwright
{

/// Calls `then` with each new value of `spin`. On Enter a spin box tells its value again, the old one too (QAbstractSpinBox interprets its
/// text and always emits while it tracks the keyboard): an Enter that keeps what is tried must not first begin a trial of its own.
template <class Then>
void onNewValue(QDoubleSpinBox& spin, QObject* context, Then then)
{
    QObject::connect(&spin, &QDoubleSpinBox::valueChanged, context, [last = spin.value(), then](double value) mutable {
        if (std::exchange(last, value) != value)
            then(value);
    });
}

} // namespace rungwright
