// SPDX-License-Identifier: GPL-3.0-or-later
#include "candidates_panel.h"

#include "candidate_delegate.h"
#include "questions.h"
#include "ui_candidates_panel.h"

namespace rungwright
{

CandidatesPanel::CandidatesPanel(QWidget* parent) : QWidget(parent), m_ui(std::make_unique<Ui::CandidatesPanel>()) { m_ui->setupUi(this); }

CandidatesPanel::~CandidatesPanel() = default;

void CandidatesPanel::attach(Workbench& bench, Questions& questions)
{
    m_bench = &bench;
    m_questions = &questions;
    m_model = std::make_unique<CandidatesModel>(bench);
    auto* delegate = new CandidateDelegate(bench, m_ui->candidatesList);
    m_ui->candidatesList->setModel(m_model.get());
    m_ui->candidatesList->setItemDelegate(delegate);
    m_ui->candidatesList->setMouseTracking(true);
    // One row of cards and, where there are many, the scroll bar below them.
    m_ui->candidatesList->setFixedHeight(delegate->cardSize().height() + 18);
    setMaximumHeight(sizeHint().height());

    const auto onButton = [this](QToolButton* button, const QString& text, const QString& tip, void (CandidatesPanel::*slot)()) {
        button->setText(text);
        button->setToolTip(tip);
        button->setAccessibleName(tip);
        connect(button, &QToolButton::clicked, this, slot);
    };
    onButton(m_ui->copyCandidateButton, tr("Copy"), tr("Make a new candidate from this ladder"), &CandidatesPanel::copyWorked);
    onButton(m_ui->renameCandidateButton, tr("Rename"), tr("Rename this candidate"), &CandidatesPanel::renameWorked);
    onButton(m_ui->noteCandidateButton, tr("Note"), tr("Write a note on this candidate"), &CandidatesPanel::noteWorked);
    onButton(m_ui->discardCandidateButton, tr("Discard"), tr("Discard this candidate"), &CandidatesPanel::discardWorked);
    m_ui->chooseCandidateButton->setText(tr("Price sheet…"));
    m_ui->chooseCandidateButton->setToolTip(tr("Choose this ladder and hand it over as a price sheet"));
    m_ui->chooseCandidateButton->setAccessibleName(m_ui->chooseCandidateButton->toolTip());
    connect(m_ui->chooseCandidateButton, &QToolButton::clicked, this, [this] { emit sheetWanted(m_bench->candidate()); });

    connect(m_ui->candidatesList->selectionModel(), &QItemSelectionModel::currentChanged, this, [this](const QModelIndex& now) {
        if (now.isValid() && !m_followingBench)
            m_bench->workOn(CandidatesModel::candidateOf(now.row()));
    });
    connect(&bench, &Workbench::reset, this, &CandidatesPanel::onBenchReset);
    onBenchReset();
}

void CandidatesPanel::onBenchReset()
{
    m_followingBench = true;
    const QModelIndex at = m_model->index(CandidatesModel::rowOf(m_bench->candidate()));
    m_ui->candidatesList->setCurrentIndex(at);
    m_ui->candidatesList->scrollTo(at);
    m_followingBench = false;
    showButtons();
}

void CandidatesPanel::showButtons()
{
    const bool any = m_bench->tierCase() != nullptr;
    const bool own = any && m_bench->candidate() >= 0;
    m_ui->copyCandidateButton->setEnabled(any);
    m_ui->renameCandidateButton->setEnabled(own);
    m_ui->noteCandidateButton->setEnabled(own);
    m_ui->discardCandidateButton->setEnabled(own);
    m_ui->chooseCandidateButton->setEnabled(any);
}

void CandidatesPanel::copyWorked()
{
    if (m_bench->tierCase())
        m_bench->document().copyCandidate(m_bench->tier(), m_bench->candidate());
}

void CandidatesPanel::renameWorked()
{
    if (m_bench->candidate() < 0)
        return;
    QString name = m_bench->candidateName();
    for (QString label = tr("Name:");;) {
        name = m_questions->text(window(), tr("Rename the candidate"), label, name);
        if (name.isNull() || m_bench->document().renameCandidate(m_bench->tier(), m_bench->candidate(), name))
            return;
        label = name.trimmed().isEmpty() ? tr("A name is needed:") : tr("That name is taken. Another name:");
    }
}

void CandidatesPanel::noteWorked()
{
    const int candidate = m_bench->candidate();
    if (candidate < 0)
        return;
    const QString was = QString::fromStdString(m_bench->tierCase()->candidates[static_cast<std::size_t>(candidate)].note);
    const QString note = m_questions->longText(window(), tr("Note on %1").arg(m_bench->candidateName()), tr("Note:"), was);
    if (!note.isNull())
        m_bench->document().setCandidateNote(m_bench->tier(), candidate, note);
}

void CandidatesPanel::discardWorked()
{
    if (m_bench->candidate() >= 0)
        m_bench->document().discardCandidate(m_bench->tier(), m_bench->candidate()); // undo brings it back
}

} // namespace rungwright
