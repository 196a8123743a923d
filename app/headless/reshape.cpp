// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

#include "caution.h"
#include "input.h"
#include "price_sheet.h"
#include "reshape_words.h"
#include "rules_json.h"
#include "scenario_json.h"
#include "selection.h"
#include "streams.h"

#include <algorithm>
#include <iterator>
#include <optional>
#include <utility>

namespace rungwright
{

namespace
{

QString utf8Text(std::string_view utf8) { return QString::fromUtf8(utf8.data(), qsizetype(utf8.size())); }

/// The end of a command line that cannot be followed, or nothing.
std::optional<ExitStatus> refuseTarget(const Request& request, bool isScenario)
{
    const QString& target = request.out.isEmpty() ? request.reshape.sheet : request.out;
    const char* option = request.out.isEmpty() ? "--sheet" : "--out";
    const auto overwrites = [&](const char* what) {
        return refuse(ExitStatus::wrongUsage, std::string("rungwright: ") + option + " would overwrite " + what);
    };
    for (const auto& [input, name] : {std::pair{request.mapping, "the --mapping file"},
                                      {request.floors, "the --floors file"},
                                      {request.reshape.rules, "the --rules file"}}) {
        if (!input.isEmpty() && sameFile(input, target))
            return overwrites(name);
    }
    if (sameFile(request.file, target))
        return request.out.isEmpty() || !isScenario ? std::optional(overwrites("FILE")) : std::nullopt;
    // Another scenario may hold work that nobody meant to give away.
    if (isScenarioFile(target))
        return overwrites(request.out.isEmpty() ? "a scenario; name a new file"
                                                : "another scenario; name a new file, or give that scenario as FILE");
    return std::nullopt;
}

std::string freeName(const TierCase& tierCase, const QString& wanted)
{
    const auto taken = [&](const std::string& name) {
        return name == kCurrentName || std::ranges::any_of(tierCase.candidates, [&](const Candidate& one) { return one.name == name; });
    };
    std::string name = wanted.toStdString();
    for (int n = 2; taken(name); ++n)
        name = QStringLiteral("%1 %2").arg(wanted, QString::number(n)).toStdString();
    return name;
}

/// What became of the tiers.
struct Tally {
    qsizetype reshaped = 0;
    qsizetype unchanged = 0; ///< Already as wished.
    qsizetype without = 0;   ///< No ladder as wished.
    qsizetype missed = 0;    ///< Among the reshaped: target or total missed on the price points.
};

class Reshaping
{
public:
    Reshaping(const Request& request, Scenario& scenario, const RuleSet* rules, ChangeTarget target) :
        m_request(request), m_scenario(scenario), m_target(target)
    {
        if (rules) {
            m_ruled.rules = rules->rules;
            m_ruled.ownRules = rules->ownRules;
        } else {
            m_ruled.rules = scenario.rules;
            m_ruled.ownRules = scenario.ownRules;
        }
    }

    void reshape(std::size_t at, const ModelSettings& model)
    {
        const TierCase& tierCase = std::as_const(m_scenario.tiers)[at];
        const Tier& tier = tierCase.tier;
        const PriceRules& rules = rulesFor(m_ruled, tier);
        ChangeWish wish;
        wish.order = m_request.reshape.order.value_or(rules.order);
        wish.total = m_request.reshape.total;
        wish.target = m_target;
        wish.takenStay = m_request.reshape.takenStay;
        const LeastChangeAnswer& answer = m_solver.solve(tier, model, rules, wish);
        const Currency& currency = m_scenario.currency;
        if (answer.obstacle != Obstacle::none) {
            ++tally.without;
            const QStringList sentences{obstacleText(answer, tier, wish, currency),
                                        easingTexts(answer, wish, currency).join(QLatin1Char(' '))};
            tell(tier, sentences.join(QLatin1Char(' ')).trimmed());
            return;
        }
        if (!answer.targetMet || answer.totalMiss != Price{0})
            tell(tier, roundingText(answer, currency));
        const bool misses = !answer.targetMet || missesTotal(tier, rules, answer);
        if (misses && answer.changed == 0) {
            ++tally.without;
            return;
        }
        tally.missed += misses ? 1 : 0;
        if (answer.changed == 0) {
            ++tally.unchanged;
            m_done.push_back({at, -1});
            return;
        }
        ++tally.reshaped;
        const QString name = m_request.candidate ? *m_request.candidate : leastChangeName(m_target, currency);
        m_scenario.tiers[at].candidates.push_back({freeName(tierCase, name), {}, answer.prices});
        m_done.push_back({at, int(std::as_const(m_scenario.tiers)[at].candidates.size()) - 1});
    }

    Outcome<bool> write() const
    {
        if (!m_request.out.isEmpty())
            return saveScenario(m_scenario, m_request.out);
        std::vector<SheetRow> rows;
        for (const auto& [at, candidate] : m_done) {
            auto more = sheetRows(m_scenario, m_scenario.tiers[at], candidate);
            rows.insert(rows.end(), std::make_move_iterator(more.begin()), std::make_move_iterator(more.end()));
        }
        return saveSheet(rows, m_scenario.currency, m_request.reshape.sheet);
    }

    Tally tally;

private:
    struct Done {
        std::size_t tier;
        int candidate; ///< -1: nothing had to change.
    };

    /// A wished total may be missed by less than a step of the price points, which could not give it; a rule may not be broken by that
    /// either.
    static bool missesTotal(const Tier& tier, const PriceRules& rules, const LeastChangeAnswer& answer)
    {
        Price today;
        for (const Unit& unit : tier.units) {
            if (unit.status == Status::vacant)
                today += unit.asking;
        }
        const auto room = totalRoomOf(today, rules);
        const Price miss = std::max(answer.totalMiss, -answer.totalMiss);
        return miss >= rules.points.step || (room && (answer.total < room->least || answer.total > room->most));
    }

    static void tell(const Tier& tier, const QString& sentence)
    {
        say(QStringLiteral("%1 / %2: %3").arg(utf8Text(tier.site), utf8Text(tier.name), sentence));
    }

    const Request& m_request;
    Scenario& m_scenario;
    Scenario m_ruled; ///< Holds the rules in force, and no tiers.
    ChangeTarget m_target;
    LeastChange m_solver;
    std::vector<Done> m_done;
};

} // namespace

ExitStatus reshape(const Request& request)
{
    Outcome<Scenario> opened = openInput(request);
    if (!opened)
        return refuse(ExitStatus::inputRefused, opened.trouble());
    Scenario scenario = std::move(opened).value();
    Request tiersOnly = request;
    tiersOnly.candidate.reset(); // Here it names what is made.
    const auto chosen = chooseLadders(scenario, tiersOnly);
    if (!chosen)
        return refuse(ExitStatus::wrongUsage, chosen.trouble());
    const Outcome<ChangeTarget> target = targetOf(request.reshape, scenario.currency);
    if (!target)
        return refuse(ExitStatus::wrongUsage, target.trouble());
    const bool isScenario = request.mapping.isEmpty() && isScenarioFile(request.file);
    if (const auto status = refuseTarget(request, isScenario))
        return *status;

    std::optional<RuleSet> rules;
    if (!request.reshape.rules.isEmpty()) {
        Outcome<RuleSet> read = loadRules(request.reshape.rules, scenario.currency);
        if (!read)
            return refuse(ExitStatus::inputRefused, read.trouble());
        rules = std::move(read).value();
        if (!isScenario) { // A new scenario keeps the rules its candidates were made under; another's own are not replaced unasked.
            scenario.rules = rules->rules;
            scenario.ownRules = rules->ownRules;
        }
    }

    // A misspelt name would bind nothing, and nobody would know.
    if (rules) {
        for (const OwnRules& own : rules->ownRules) {
            const bool known = std::ranges::any_of(std::as_const(scenario.tiers), [&](const TierCase& one) {
                return one.tier.site == own.scope.site && (own.scope.tier.empty() || one.tier.name == own.scope.tier);
            });
            if (!known)
                say(QStringLiteral("%1: the rules of '%2' bind nothing: there is no such %3 in %4")
                        .arg(request.reshape.rules,
                             utf8Text(own.scope.tier.empty() ? own.scope.site : own.scope.site + " / " + own.scope.tier),
                             own.scope.tier.empty() ? QStringLiteral("site") : QStringLiteral("tier"), request.file));
        }
    }

    Reshaping reshaping(request, scenario, rules ? &*rules : nullptr, target.value());
    // The ladders point into the tiers, in their order.
    std::size_t at = 0;
    for (const ChosenLadder& ladder : chosen.value()) {
        while (&std::as_const(scenario.tiers)[at] != ladder.tierCase)
            ++at;
        reshaping.reshape(at, ladder.settings);
    }

    const Tally& tally = reshaping.tally;
    const QString file = request.out.isEmpty() ? request.reshape.sheet : request.out;
    const bool incomplete = tally.without + tally.missed > 0;
    if (tally.reshaped + tally.unchanged == 0)
        return refuse(ExitStatus::tiersWithout,
                      QStringLiteral("%1: not written, for no tier has a ladder as wished").arg(file).toStdString());
    if (const Outcome<bool> written = reshaping.write(); !written)
        return refuse(ExitStatus::cannotWrite, written.trouble());
    QString said = QStringLiteral("%1: tiers reshaped: %2, already as wished: %3, without a ladder as wished: %4")
                       .arg(file, QString::number(tally.reshaped), QString::number(tally.unchanged), QString::number(tally.without));
    if (tally.missed > 0)
        said += QStringLiteral(", reshaped but missing it on the price points: %1").arg(tally.missed);
    say(said);
    say(cautionText());
    return incomplete ? ExitStatus::tiersWithout : ExitStatus::done;
}

} // namespace rungwright
