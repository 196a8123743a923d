// SPDX-License-Identifier: GPL-3.0-or-later
#include "questions.h"

#include <QFileDialog>
#include <QFileInfo>
#include <QInputDialog>
#include <QMessageBox>
#include <QPushButton>

namespace rungwright
{

QString Questions::openPath(QWidget* parent, const QString& title, const QString& filter)
{
    const QString path = QFileDialog::getOpenFileName(parent, title, m_folder, filter);
    if (!path.isEmpty())
        m_folder = QFileInfo(path).absolutePath();
    return path;
}

QString Questions::savePath(QWidget* parent, const QString& title, const QString& suggestion, const QString& filter)
{
    const QString start =
        m_folder.isEmpty() || suggestion.contains(QLatin1Char('/')) ? suggestion : m_folder + QLatin1Char('/') + suggestion;
    const QString path = QFileDialog::getSaveFileName(parent, title, start, filter);
    if (!path.isEmpty())
        m_folder = QFileInfo(path).absolutePath();
    return path;
}

int Questions::choose(QWidget* parent, const QString& text, const QString& detail, const QStringList& answers)
{
    QMessageBox box(QMessageBox::Question, QString(), text, QMessageBox::NoButton, parent);
    box.setInformativeText(detail);
    QList<QAbstractButton*> buttons;
    for (const QString& answer : answers)
        buttons << box.addButton(answer, answer == answers.last() ? QMessageBox::RejectRole : QMessageBox::AcceptRole);
    box.setDefaultButton(qobject_cast<QPushButton*>(buttons.first()));
    box.setEscapeButton(buttons.last());
    box.exec();
    const auto at = buttons.indexOf(box.clickedButton());
    return static_cast<int>(at < 0 ? answers.size() - 1 : at);
}

void Questions::tell(QWidget* parent, const QString& text, const QString& detail)
{
    QMessageBox box(QMessageBox::Information, QString(), text, QMessageBox::Ok, parent);
    box.setInformativeText(detail);
    box.setTextInteractionFlags(Qt::TextSelectableByMouse);
    box.exec();
}

QString Questions::text(QWidget* parent, const QString& title, const QString& label, const QString& start)
{
    bool ok = false;
    const QString answer = QInputDialog::getText(parent, title, label, QLineEdit::Normal, start, &ok);
    return !ok ? QString() : answer.isNull() ? QStringLiteral("") : answer; // an empty answer is one
}

QString Questions::longText(QWidget* parent, const QString& title, const QString& label, const QString& start)
{
    bool ok = false;
    const QString answer = QInputDialog::getMultiLineText(parent, title, label, start, &ok);
    return !ok ? QString() : answer.isNull() ? QStringLiteral("") : answer;
}

} // namespace rungwright
