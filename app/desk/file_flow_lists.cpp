// SPDX-License-Identifier: GPL-3.0-or-later
// Unit lists on their way to the desk: read as they are or mapped first, brought in as a new scenario or into the one on the desk.
#include "file_flow.h"

#include "import_dialog.h"
#include "questions.h"
#include "refresh_dialog.h"
#include "refused_rows_dialog.h"
#include "wording.h"

#include <QFileInfo>
#include <QLocale>
#include <QThreadPool>

namespace rungwright
{

namespace
{

QString counted(qint64 count) { return numberText(static_cast<double>(count), 0); }

} // namespace

void FileFlow::bringIn(Intake intake)
{
    if (intake.purpose == Purpose::fresh && !mayLeave()) {
        giveUp();
        return;
    }
    m_askedFor = m_document.revision();
    intake.request.forRefresh = intake.purpose == Purpose::refresh;
    // Amounts of a refresh are those of the scenario: a list in another currency is refused by its reader.
    const std::string& code = m_document.scenario().currency.code;
    if (intake.purpose == Purpose::refresh && code != "XXX")
        intake.request.options.currencyCode = QString::fromStdString(code);
    if (intake.look.ownFormat)
        read(std::move(intake));
    else
        showForm(std::move(intake));
}

void FileFlow::showForm(Intake intake)
{
    if (!intake.look.ownFormat || !intake.look.readable) {
        showProposed(std::move(intake));
        return;
    }
    // Of our own format, but something is wrong with it: nothing was proposed yet.
    m_work.start<MappingProposal>(
        tr("Looking at the columns of %1 …").arg(QFileInfo(intake.request.path).fileName()),
        [sample = intake.look.sample](const LongWork::Progress&) { return proposeMapping(sample); },
        [this, intake](std::optional<MappingProposal> proposal) mutable {
            if (!proposal) {
                giveUp();
                return;
            }
            intake.look.proposal = std::move(*proposal);
            intake.look.ownFormat = false;
            showProposed(std::move(intake));
        });
}

void FileFlow::showProposed(Intake intake)
{
    ImportStart start;
    start.path = intake.request.path;
    start.sample = intake.look.sample;
    start.proposal = intake.look.proposal;
    start.mapping = intake.request.mapping;
    start.floors = intake.request.floors;
    const MappingShelf shelf(m_stateFolder + QStringLiteral("/mappings"));
    auto* form = new ImportDialog(std::move(start), shelf, m_questions, m_settings, m_window);
    connect(form, &QDialog::finished, this, [this, form, intake = std::move(intake)](int result) mutable {
        m_dialog = nullptr;
        if (result != QDialog::Accepted) {
            giveUp();
            emit done();
            return;
        }
        intake.request.mapping = form->mapping();
        intake.request.floors = form->floorsPath();
        intake.request.options.withoutBadRows = false;
        read(std::move(intake));
    });
    show(form);
}

void FileFlow::read(Intake intake)
{
    m_work.start<ReadList>(
        tr("Reading %1 …").arg(QFileInfo(intake.request.path).fileName()),
        [request = intake.request, tell = tellerFor(intake)](const LongWork::Progress& progress) {
            return readList(request, progress, tell);
        },
        [this, intake](std::optional<ReadList> list) mutable {
            ++m_reading;
            // Where it comes onto the desk, its rows follow in the same place without a gap.
            if (!list || !list->said.clean())
                emit readingOver();
            if (list)
                listRead(std::move(intake), std::move(*list));
            else
                giveUp();
            if (!m_work.busy())
                emit readingOver();
        });
}

TellSoFar FileFlow::tellerFor(const Intake& intake)
{
    if (intake.purpose != Purpose::fresh)
        return {};
    return [this, reading = ++m_reading, name = QFileInfo(intake.request.path).fileName()](const ListSoFar& list) {
        QMetaObject::invokeMethod(
            this,
            [this, reading, name, list] {
                if (reading == m_reading)
                    emit readingRows(name, list);
            },
            Qt::QueuedConnection);
    };
}

void FileFlow::listRead(Intake intake, ReadList list)
{
    const QString name = QFileInfo(intake.request.path).fileName();
    if (!list.said.fileTrouble.isEmpty() && !intake.look.readable) {
        m_questions.tell(m_window, tr("“%1” could not be opened.").arg(name), list.said.fileTrouble);
        return;
    }
    if (!list.said.fileTrouble.isEmpty()) {
        const QString way = intake.request.mapping ? tr("Back to the columns…") : tr("Map the columns…");
        if (m_questions.choose(m_window, tr("“%1” could not be read.").arg(name), list.said.fileTrouble, {way, tr("Close")}) == 0)
            showForm(std::move(intake));
        else
            giveUp();
        return;
    }
    if (!list.said.clean() && !intake.request.options.withoutBadRows) {
        showRefused(std::move(intake), list);
        return;
    }
    if (list.tierCount == 0) {
        m_questions.tell(m_window, tr("“%1” holds no tier that can be taken.").arg(name), list.notes.join(QLatin1Char('\n')));
        return;
    }
    if (intake.purpose == Purpose::refresh)
        planRefreshFrom(intake, list);
    else if (settleCurrency(intake, list) && !changedSinceAsked())
        takeList(intake, std::move(list));
}

void FileFlow::showRefused(Intake intake, const ReadList& list)
{
    auto* dialog = new RefusedRowsDialog(list.said, intake.request.path, m_window);
    dialog->offerMapping(intake.request.mapping ? tr("Back to the &columns…") : tr("Map the &columns…"));
    connect(dialog, &QDialog::finished, this, [this, intake = std::move(intake)](int result) mutable {
        m_dialog = nullptr;
        if (result == RefusedRowsDialog::mapColumns) {
            showForm(std::move(intake));
        } else if (result == QDialog::Accepted) {
            intake.request.options.withoutBadRows = true;
            read(std::move(intake));
        } else {
            giveUp();
            emit done();
        }
    });
    show(dialog);
}

bool FileFlow::settleCurrency(Intake& intake, ReadList& list)
{
    // With a mapping the form has asked.
    if (list.said.currency.code != "XXX" || !intake.request.options.currencyCode.isEmpty() || intake.request.mapping)
        return true;
    const QString answer =
        m_questions.text(m_window, tr("Currency"), tr("The list names no currency. Its ISO 4217 code, for example EUR (empty for none):"),
                         QLocale().currencySymbol(QLocale::CurrencyIsoCode));
    if (answer.isNull()) {
        giveUp();
        return false;
    }
    const QString code = answer.trimmed().toUpper();
    if (code.isEmpty() || code == QStringLiteral("XXX"))
        return true;
    const auto currency = findCurrency(code.toStdString());
    if (currency && currency->decimals == list.said.currency.decimals) {
        list.said.currency = *currency;
        return true;
    }
    intake.request.options.currencyCode = code;
    read(std::move(intake)); // the decimals allowed depend on it
    return false;
}

void FileFlow::takeList(const Intake& intake, ReadList list)
{
    Scenario scenario;
    scenario.currency = list.said.currency;
    scenario.title = QFileInfo(intake.request.path).completeBaseName().toStdString();
    scenario.tiers = std::move(list.tiers);
    const auto tiers = static_cast<qint64>(scenario.tiers.size());
    takeScenario(std::move(scenario), {}, false);
    QStringList said{tr("%1 units in %2 tiers imported.").arg(counted(list.said.rowsTaken), counted(tiers))};
    if (list.said.refusedCount > 0)
        said << tr("%1 rows were left out.").arg(counted(list.said.refusedCount));
    said << list.notes;
    if (!list.said.unknownColumns.isEmpty())
        said << tr("Columns not used: %1.").arg(list.said.unknownColumns.join(QStringLiteral(", ")));
    emit told(said.join(QLatin1Char(' ')));
}

void FileFlow::planRefreshFrom(const Intake& intake, const ReadList& list)
{
    QStringList also;
    if (list.said.refusedCount > 0)
        also << (list.said.refusedCount == 1
                     ? tr("1 row was left out: its unit counts as gone.")
                     : tr("%1 rows were left out: their units count as gone.").arg(counted(list.said.refusedCount)));
    also << list.notes;
    m_work.start<Outcome<RefreshPlan>>(
        tr("Comparing %1 with the scenario …").arg(QFileInfo(intake.request.path).fileName()),
        [now = m_document.scenario(), currency = list.said.currency, listed = list.listed](const LongWork::Progress& progress) {
            return planRefresh(now, currency, std::move(*listed), progress);
        },
        [this, path = intake.request.path, also](std::optional<Outcome<RefreshPlan>> plan) {
            if (!plan)
                giveUp();
            else if (plan->ok())
                showRefresh(path, std::move(*plan).value(), also);
            else
                m_questions.tell(m_window, tr("The scenario could not be refreshed from “%1”.").arg(QFileInfo(path).fileName()),
                                 QString::fromStdString(plan->trouble()));
        });
}

void FileFlow::showRefresh(const QString& path, RefreshPlan plan, const QStringList& alsoSaid)
{
    // The dialog only looks at it. It holds two scenarios: who lets go of it last does not wait until they are gone.
    const std::shared_ptr<RefreshPlan> held(new RefreshPlan(std::move(plan)),
                                            [](RefreshPlan* former) { QThreadPool::globalInstance()->start([former] { delete former; }); });
    auto* dialog = new RefreshDialog(*held, held->currency, path, m_window, &m_questions, alsoSaid);
    connect(dialog, &QDialog::finished, this, [this, held, path, alsoSaid](int result) {
        m_dialog = nullptr;
        const QString name = QFileInfo(path).fileName();
        if (result != QDialog::Accepted) {
            giveUp();
        } else if (m_document.refresh(*held, name)) {
            emit told((QStringList{tr("Refreshed from %1.").arg(name)} + alsoSaid).join(QLatin1Char(' ')));
        } else {
            m_questions.tell(m_window, tr("The scenario could not be refreshed from “%1”.").arg(name),
                             tr("It was edited since the list was compared with it. Refresh once more."));
        }
        emit done();
    });
    show(dialog);
}

} // namespace rungwright
