// SPDX-License-Identifier: GPL-3.0-or-later
// Their words for the statuses, and ours beside them.
#pragma once

#include "mapping_preview.h"

#include <QWidget>

#include <vector>

class QComboBox;
class QGridLayout;
class QLabel;

namespace rungwright
{

class ImportStatuses : public QWidget
{
    Q_OBJECT
public:
    explicit ImportStatuses(QWidget* parent = nullptr);

    /// The words of the list's status column, with how often each stands there; empty when the status comes from no column. Words that the
    /// mapping does not know stand for nothing yet.
    void show(const std::vector<DistinctValue>& words, const ImportMapping& mapping, bool wholeFile);
    /// The same words and more of them, counted in the whole list: rows that are there keep what was said in them.
    void showMore(const std::vector<DistinctValue>& words, const ImportMapping& mapping);
    void writeTo(ImportMapping& mapping) const;
    /// Words seen that stand for no status yet.
    int unsaid() const;

signals:
    void changed();

private:
    struct Row {
        QString word;
        QLabel* count;
        QComboBox* status;
    };

    void clear();
    void add(const DistinctValue& value, const ImportMapping& mapping);

    QLabel* m_head;
    QGridLayout* m_grid;
    std::vector<Row> m_rows;
};

} // namespace rungwright
