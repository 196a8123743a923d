// SPDX-License-Identifier: GPL-3.0-or-later
// Which rows of a list are no units: totals, footers.
#pragma once

#include "mapping_preview.h"

#include <QWidget>

#include <vector>

class QComboBox;
class QGridLayout;
class QLineEdit;
class QPushButton;

namespace rungwright
{

class ImportSkips : public QWidget
{
    Q_OBJECT
public:
    explicit ImportSkips(QWidget* parent = nullptr);

    void show(const QStringList& headers, const std::vector<SkipRule>& rules);
    std::vector<SkipRule> rules() const;

signals:
    void changed();

private:
    struct Row {
        QComboBox* column;
        QComboBox* kind;
        QLineEdit* text;
        QPushButton* remove;
    };

    void addRow(const SkipRule& rule);
    void removeRow(const QPushButton* button);
    void place();

    QStringList m_headers;
    QGridLayout* m_grid;
    QPushButton* m_add;
    std::vector<Row> m_rows;
    bool m_filling = false;
};

} // namespace rungwright
