// SPDX-License-Identifier: GPL-3.0-or-later
// Where each of our columns comes from: one row each, chosen from the list's own columns.
#pragma once

#include "mapping_preview.h"

#include <QWidget>

#include <array>
#include <vector>

class QComboBox;
class QLabel;
class QLineEdit;
class QPushButton;

namespace rungwright
{

class Questions;

class ImportColumns : public QWidget
{
    Q_OBJECT
public:
    explicit ImportColumns(Questions& questions, QWidget* parent = nullptr);

    /// Their columns, and what stands in the first row of each, to choose by.
    void setTheirs(const QStringList& headers, const QStringList& examples);
    /// Shows the mapping's sources. `notes` say why; empty for those of a saved mapping.
    void setMapping(const ImportMapping& mapping, const std::array<ColumnNote, kColumnNames.size()>& notes);
    /// Writes the sources, and where floors come from, into a mapping.
    void writeTo(ImportMapping& mapping) const;
    /// The file of floors; empty while none was named.
    QString floorsPath() const;
    void setFloorsPath(const QString& path);
    /// Says beside each row how many of its cells are not understood, in place of why it was proposed.
    void showTroubles(const MappingPreview& preview);

signals:
    void changed();

private:
    /// What an entry of the combo means, beside the places of their columns (0 and more).
    enum Choice { absent = -1, constant = -2, floorsFile = -3, noFloors = -4 };

    struct Row {
        QLabel* title;
        QComboBox* source;
        QLineEdit* constant;
        QLabel* note;
        QString why;
        Choice fallback; ///< Without their columns: what the combo stands at.
    };

    void build();
    void fillSources(std::size_t row);
    void choose(std::size_t row, int choice);
    void showRow(std::size_t row);
    void onChosen(std::size_t row);
    void browse();
    int choiceOf(std::size_t row) const;

    Questions& m_questions;
    std::array<Row, kColumnNames.size()> m_rows{};
    QLineEdit* m_floorsPath = nullptr;
    QPushButton* m_browse = nullptr;
    QStringList m_headers;
    QStringList m_examples;
    bool m_filling = false;
};

} // namespace rungwright
