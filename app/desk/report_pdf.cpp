// SPDX-License-Identifier: GPL-3.0-or-later
#include "report_pdf.h"

#include "caution.h"
#include "plot_words.h"
#include "reminders.h"
#include "report_pages.h"
#include "side_by_side_plot.h"
#include "signoff_words.h"
#include "whole_file.h"
#include "wording.h"
#include "words.h"

#include <QBuffer>
#include <QCoreApplication>
#include <QLocale>
#include <QPageLayout>

#include <algorithm>
#include <array>
#include <unordered_map>

namespace rungwright
{

namespace
{

constexpr int kMostPages = 4;
/// A note longer than this is cut, and the report says so.
constexpr int kMostNote = 600;
constexpr std::array kKeyFigures{"gap", "gap_share", "expected_cheapest", "chance_floor_met", "asking_total"};

/// One report being drawn; run twice, as the foot of page 1 speaks of the last.
class ReportPainter
{
    Q_DECLARE_TR_FUNCTIONS(rungwright::Report)

public:
    ReportPainter(const SignOffCase& c, const ReportFrame& frame) : m_case(c), m_frame(frame)
    {
        m_site = isolated(shownText(c.tier.site, 120));
        m_tier = isolated(shownText(c.tier.name, 120));
        m_ladder = isolated(shownText(c.ladder, 120));
    }

    int draw(QPdfWriter& writer, int total)
    {
        ReportPages pages(writer, tr("%1 · %2 · %3 · %4").arg(m_site, m_tier, m_ladder, m_frame.when), cautionText(), total);
        if (!pages.paints())
            return 0;
        m_pages = &pages;
        drawHead();
        drawKeyFigures();
        drawPicture();
        pages.newPage();
        drawChecks();
        drawReminders();
        drawFigures();
        drawChanges();
        return pages.finish();
    }

private:
    using Weight = ReportPages::Weight;

    void drawHead()
    {
        ReportPages& p = *m_pages;
        p.paragraph(m_case.candidate < 0 ? tr("Current ladder for sign-off") : tr("“%1” for sign-off").arg(m_ladder), Weight::strong, 1.8);
        p.gap(2);
        p.paragraph(
            tr("%1 · %2 · advertised from %3 %4")
                .arg(m_site, m_tier, floorText(m_case.tier.advertisedFloor, m_case.currency), QString::fromStdString(m_case.currency.code)),
            Weight::plain, 1.15);
        p.gap(4);
        const QString who = m_frame.who.isEmpty() ? tr("Nobody named") : tr("Prepared by %1").arg(isolated(shownText(m_frame.who, 120)));
        QString line = tr("%1 · %2 · %3").arg(who, m_frame.when, SignOffWords::model(m_case));
        if (!m_case.scenario.isEmpty())
            line += tr(" · scenario “%1”").arg(isolated(shownText(m_case.scenario, 120)));
        p.paragraph(line, Weight::faint);
        if (!m_frame.note.isEmpty()) {
            p.gap(4);
            const bool cut = m_frame.note.size() > kMostNote;
            const QString note = cut ? m_frame.note.left(kMostNote) + QStringLiteral("…") : m_frame.note;
            p.paragraph(cut ? tr("Note: %1 (The note is cut here.)").arg(note) : tr("Note: %1").arg(note));
        }
        p.gap(10);
        p.paragraph(SignOffWords::keySentence(m_case), Weight::strong, 1.15);
        p.gap(8);
    }

    std::vector<ReportCell> figureCells(const QString& name, const QString& was, const QString& is, const QString& by) const
    {
        const double money = 104;
        return {{name, m_pages->width() - 3 * (money + 8), false, false},
                {was, money, true, false},
                {is, money, true, false},
                {by, money, true, false}};
    }

    void drawFigureRow(const FigureRow& row)
    {
        const QString name = QString(row.indent * 3, QLatin1Char(' ')) + QCoreApplication::translate("FigureRows", row.label);
        const auto was = row.value(m_case.before);
        const auto is = row.value(m_case.after);
        m_pages->row(figureCells(name, figureText(row, was, m_case.currency), figureText(row, is, m_case.currency),
                                 figureChangeText(row, was, is, m_case.currency)));
    }

    void drawFigureHead() { m_pages->row(figureCells(QString(), tr("Today"), tr("New"), tr("Change")), Weight::faint); }

    void drawKeyFigures()
    {
        drawFigureHead();
        m_pages->rule();
        const auto rows = figureRows();
        for (const char* key : kKeyFigures) {
            const auto found = std::ranges::find_if(rows, [key](const FigureRow& row) { return qstrcmp(row.key, key) == 0; });
            if (found != rows.end())
                drawFigureRow(*found);
        }
        m_pages->gap(12);
    }

    void drawPicture()
    {
        ReportPages& p = *m_pages;
        p.paragraph(tr("Ladder and curtain, today and new, on one price axis"), Weight::faint);
        p.gap(4);
        const double height = std::min(p.roomLeft(), p.width() * 0.85);
        if (height < 160)
            return;
        SideBySidePlot plot;
        QFont font = p.font(Weight::small);
        plot.setFont(font);
        QPalette paper = plot.palette();
        paper.setColor(QPalette::Window, Look::light().paper);
        plot.setPalette(paper);
        const QRectF where = p.take(height);
        plot.resize(where.size().toSize());
        const auto today = askingPrices(m_case.tier.units);
        const std::vector<SideLadder> ladders{
            {tr("today"), measured(m_case.tier, today, m_case.model), today},
            {m_case.candidate < 0 ? tr("new") : m_case.ladder, measured(m_case.tier, m_case.prices, m_case.model), m_case.prices}};
        plot.setLadders(m_case.tier, m_case.currency, ladders);
        plot.paintInto(p.painter(), where.toRect());
    }

    void drawChecks()
    {
        ReportPages& p = *m_pages;
        p.heading(tr("Checks"), 3 * p.lineHeight());
        const double outcome = 96;
        const double name = 184;
        for (const Check& check : m_case.checks) {
            p.row({{SignOffWords::outcomeSign(check.outcome) + QLatin1Char(' ') + SignOffWords::outcome(check.outcome), outcome, false,
                    false},
                   {SignOffWords::checkName(check.kind), name, false, true},
                   {SignOffWords::why(check, m_case.tier.advertisedFloor, m_case.currency), p.width() - outcome - name - 16, false, true}});
            p.gap(2);
        }
        p.gap(10);
    }

    void drawReminders()
    {
        ReportPages& p = *m_pages;
        p.heading(tr("Reminders"), 3 * p.lineHeight());
        const double rule = 184;
        QStringList places = m_frame.places;
        places << QString();
        for (const QString& place : std::as_const(places)) {
            for (const Reminder& reminder : remindersOf(place)) {
                p.row({{reminder.rule, rule, false, true}, {reminder.text, p.width() - rule - 8, false, true}});
                p.gap(2);
            }
        }
        p.paragraph(remindersCaution(), Weight::faint);
        p.gap(10);
    }

    void drawFigures()
    {
        ReportPages& p = *m_pages;
        p.heading(tr("Figures"), 4 * p.lineHeight());
        drawFigureHead();
        p.rule();
        for (const FigureRow& row : figureRows())
            drawFigureRow(row);
        p.gap(10);
    }

    std::vector<ReportCell> changeCells(const QString& unit, const QString& from, const QString& to, const QString& by,
                                        const QString& percent, const QString& rule) const
    {
        const double money = 88;
        const double share = 64;
        const double broken = 148;
        return {{unit, m_pages->width() - 3 * (money + 8) - (share + 8) - (broken + 8), false, false},
                {from, money, true, false},
                {to, money, true, false},
                {by, money, true, false},
                {percent, share, true, false},
                {rule, broken, false, false}};
    }

    void drawChangeHead()
    {
        m_pages->row(changeCells(tr("Unit"), tr("From"), tr("To"), tr("Change"), tr("Percent"), tr("Rule broken")), Weight::faint);
        m_pages->rule();
    }

    void drawChanges()
    {
        ReportPages& p = *m_pages;
        std::vector<std::uint32_t> changed;
        for (std::uint32_t unit = 0; unit < m_case.prices.size(); ++unit) {
            if (m_case.prices[unit] != m_case.tier.units[unit].asking)
                changed.push_back(unit);
        }
        const auto by = [this](std::uint32_t unit) { return m_case.prices[unit] - m_case.tier.units[unit].asking; };
        std::ranges::stable_sort(changed, std::greater{}, [&](std::uint32_t unit) { return std::abs(by(unit).minor); });
        std::unordered_map<std::uint32_t, QString> broken;
        for (const RuleBreach& breach : m_case.breaches)
            broken[breach.unit] = SignOffWords::broken(breach);

        p.heading(tr("Changes"), 5 * p.lineHeight());
        if (changed.empty()) {
            p.paragraph(tr("No price changes."));
            return;
        }
        drawChangeHead();
        const double line = p.rowHeight(changeCells({}, {}, {}, {}, {}, {}), Weight::plain);
        std::size_t shown = 0;
        for (const std::uint32_t unit : changed) {
            const bool last = p.page() == kMostPages;
            // On the last page there must be room for the sentence that says what is left out, unless nothing is.
            if (last && p.roomLeft() < 3 * line && shown + 1 < changed.size())
                break;
            if (!last && p.roomLeft() < line) {
                p.newPage();
                drawChangeHead();
            }
            const double share = 100.0 * inMinor(by(unit)) / inMinor(m_case.tier.units[unit].asking);
            const QString percent = (share > 0 ? QStringLiteral("+") : QString()) + numberText(share) + QStringLiteral("\u00a0%");
            const auto rule = broken.find(unit);
            p.row(changeCells(isolated(shownText(m_case.tier.units[unit].name)), moneyText(m_case.tier.units[unit].asking, m_case.currency),
                              moneyText(m_case.prices[unit], m_case.currency), signedMoneyText(inMinor(by(unit)), m_case.currency), percent,
                              rule == broken.end() ? QString() : rule->second));
            ++shown;
        }
        p.gap(4);
        if (shown < changed.size()) {
            p.paragraph(tr("The %1 greatest of %2 changes; all are in the price sheet.")
                            .arg(numberText(static_cast<double>(shown), 0), numberText(static_cast<double>(changed.size()), 0)),
                        Weight::strong);
        }
    }

    const SignOffCase& m_case;
    const ReportFrame& m_frame;
    QString m_site, m_tier, m_ladder;
    ReportPages* m_pages = nullptr;
};

QByteArray drawnReport(const SignOffCase& c, const ReportFrame& frame, int& pages)
{
    QByteArray bytes;
    QBuffer buffer(&bytes);
    buffer.open(QIODevice::WriteOnly);
    QPdfWriter writer(&buffer);
    writer.setCreator(QStringLiteral("Rungwright"));
    writer.setTitle(shownText(c.tier.site + " · " + c.tier.name, 200));
    writer.setResolution(ReportPages::kPerInch);
    writer.setPageLayout(QPageLayout(QPageSize(frame.paper), QPageLayout::Portrait, QMarginsF(), QPageLayout::Point));
    pages = ReportPainter(c, frame).draw(writer, pages);
    return pages > 0 ? bytes : QByteArray();
}

} // namespace

QByteArray reportPdf(const SignOffCase& c, const ReportFrame& frame)
{
    int pages = 0;
    drawnReport(c, frame, pages);
    return pages > 0 ? drawnReport(c, frame, pages) : QByteArray();
}

Outcome<bool> writeReport(const SignOffCase& c, const ReportFrame& frame, const QString& path)
{
    const QByteArray bytes = reportPdf(c, frame);
    if (bytes.isEmpty())
        return Trouble{QCoreApplication::translate("Report", "%1: the report could not be drawn.").arg(path).toStdString()};
    return writeWhole(path, bytes);
}

QPageSize::PageSizeId paperOf(const QLocale& locale)
{
    switch (locale.territory()) {
    case QLocale::UnitedStates:
    case QLocale::Canada:
    case QLocale::Mexico:
    case QLocale::PuertoRico:
    case QLocale::Philippines:
    case QLocale::Chile:
    case QLocale::Colombia:
    case QLocale::Venezuela:
        return QPageSize::Letter;
    default:
        return QPageSize::A4;
    }
}

} // namespace rungwright
