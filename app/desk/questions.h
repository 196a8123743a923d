// SPDX-License-Identifier: GPL-3.0-or-later
// The seam through which the desk asks the user short questions, so that a test can preset the next answer and never blocks.
#pragma once

#include <QString>
#include <QStringList>

class QWidget;

namespace rungwright
{

class Questions
{
public:
    virtual ~Questions() = default;

    /// A file to open; empty when given up. `filter` as for QFileDialog.
    virtual QString openPath(QWidget* parent, const QString& title, const QString& filter);
    /// A file to write; empty when given up. Overwriting has been confirmed by the user when a path comes back.
    virtual QString savePath(QWidget* parent, const QString& title, const QString& suggestion, const QString& filter);
    /// One of `answers` (index), the last of them when the window is closed. `text` is one question, `detail` what hangs on it.
    virtual int choose(QWidget* parent, const QString& text, const QString& detail, const QStringList& answers);
    /// Something the user must know before going on.
    virtual void tell(QWidget* parent, const QString& text, const QString& detail);
    /// A short text; null QString when given up.
    virtual QString text(QWidget* parent, const QString& title, const QString& label, const QString& start);
    /// A longer text; null QString when given up.
    virtual QString longText(QWidget* parent, const QString& title, const QString& label, const QString& start);

protected:
    /// The folder the last answer lay in.
    QString m_folder;
};

} // namespace rungwright
