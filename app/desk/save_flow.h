// SPDX-License-Identifier: GPL-3.0-or-later
// Saving: what the desk asks and says on the way. Writing goes on beside the editing.
#pragma once

#include "autosave.h"
#include "document.h"

#include <QFutureWatcher>
#include <QObject>

class QWidget;

namespace rungwright
{

class Questions;

class SaveFlow : public QObject
{
    Q_OBJECT
public:
    SaveFlow(Document& document, Questions& questions, Autosave& autosave, QWidget* window);
    ~SaveFlow() override;

    /// Begins to write a copy of the scenario as it is now, off the window's thread; a second call waits for the first. The document counts
    /// as modified until the copy is written, and what is edited meanwhile keeps it so. False when the user gave up.
    bool save();
    bool saveAs();
    bool writing() const { return m_writing; }
    /// Waits until nothing is being written, with the window painted but taking no input. False when the last writing went wrong.
    bool finishWriting();
    /// Asks what to do with unsaved changes, and waits until they are written; false = stay.
    bool mayLeave();

signals:
    void writingChanged(bool writing);
    /// A scenario now stands in `path`.
    void savedAs(const QString& path);
    void told(const QString& sentence);

private:
    void write(const QString& path);
    void written();
    QString suggestedName() const;

    Document& m_document;
    Questions& m_questions;
    Autosave& m_autosave;
    QWidget* m_window;
    QFutureWatcher<QString> m_watcher; ///< The trouble, or nothing.
    QString m_path;                    ///< Where what is being written goes.
    std::uint64_t m_revision = 0;      ///< What it is.
    QString m_next;                    ///< To be written after it.
    bool m_writing = false;
    bool m_wentWell = true;
};

} // namespace rungwright
