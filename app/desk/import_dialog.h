// SPDX-License-Identifier: GPL-3.0-or-later
// How somebody else's unit list is to be read: proposed, shown on its first rows, and changed until it is right.
#pragma once

#include "import_preview.h"
#include "mapping_profile.h"

#include <QDialog>
#include <QFutureWatcher>
#include <QTimer>

#include <memory>

class QSettings;

namespace Ui
{
class ImportDialog;
}

namespace rungwright
{

class ImportColumns;
class ImportSkips;
class ImportStatuses;
class Questions;

/// A list that was looked at.
struct ImportStart {
    QString path;
    ListSample sample;
    MappingProposal proposal;
    /// What the form begins with, when that is not the proposal: what was said, with the file of floors, before the list was refused.
    std::optional<ImportMapping> mapping;
    QString floors;
};

/// Accepted = read the list by mapping().
class ImportDialog : public QDialog
{
    Q_OBJECT
public:
    /// Begins with the saved mapping that fits best, if any, else with the proposal.
    ImportDialog(ImportStart start, const MappingShelf& shelf, Questions& questions, QSettings& settings, QWidget* parent = nullptr);
    ~ImportDialog() override;

    const ImportMapping& mapping() const { return m_mapping; }
    /// The file of floors; empty when the floors come from elsewhere.
    QString floorsPath() const;
    /// The longest it took to show the preview after a change, in milliseconds.
    double slowestPreview() const { return m_slowest; }

public slots:
    void done(int result) override;

protected:
    bool eventFilter(QObject* watched, QEvent* event) override;
    void changeEvent(QEvent* event) override;

private:
    using Notes = std::array<ColumnNote, kColumnNames.size()>;

    void fillChoices();
    void connectFields();
    void dress();
    // Saved mappings.
    void fillProfiles(const QString& chosen);
    void onProfile();
    void saveProfile();
    void removeProfile();
    // The mapping, to the fields and back.
    void use(const ImportMapping& mapping, const Notes& notes, const QStringList& remarks);
    void useProposal(const MappingProposal& proposal);
    void onLayout();
    void onColumns();
    void onFields();
    void showFile();
    void showStatuses();
    void countWholeFile();
    void learnTradeWords();
    // What comes of it.
    void showPreview();
    void showWhatIsMissing();
    QString whyNot() const;

    ImportStart m_start;
    MappingShelf m_shelf;
    Questions& m_questions;
    QSettings& m_settings;
    std::unique_ptr<Ui::ImportDialog> m_ui;
    ImportColumns* m_columns;
    ImportStatuses* m_statuses;
    ImportSkips* m_skips;
    ImportPreviewModel m_preview;
    ImportMapping m_mapping;
    std::vector<MappingShelf::Entry> m_profiles; ///< As in the combo, behind "as proposed".
    std::vector<DistinctValue> m_words;          ///< Of the status column.
    QFutureWatcher<std::vector<DistinctValue>> m_counting;
    QTimer m_soon; ///< From a change to its preview.
    double m_slowest = 0;
    bool m_filling = false;
    bool m_ambiguous = false;
};

} // namespace rungwright
