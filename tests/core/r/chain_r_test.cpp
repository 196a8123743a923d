// SPDX-License-Identifier: GPL-3.0-or-later
// The least change of a chain against quadprog: live on a thousand random problems where R is installed, and on forty whose answers are
// kept.
#include <QtTest>

#include "reshape/chain_solver.h"

#include "core/close.h"
#include "core/r/ask_r.h"
#include "core/reshape/random_chains.h"
#include "published/least_change.h"

using namespace rungwright;

namespace
{

QString describe(std::size_t i, const Chain& chain, const ChainAnswer& answer)
{
    QStringList words;
    for (const double number : chain.question())
        words << QString::number(number, 'g', 17);
    return QStringLiteral("problem %1, status %2, total %3 to %4, least expected %5: %6")
        .arg(i)
        .arg(static_cast<int>(answer.status))
        .arg(answer.leastTotal, 0, 'g', 17)
        .arg(answer.mostTotal, 0, 'g', 17)
        .arg(answer.leastExpected.value_or(0), 0, 'g', 17)
        .arg(words.join(u' '));
}

} // namespace

class ChainRTest : public QObject
{
    Q_OBJECT

private slots:
    void keptAnswers();
    void randomProblems();
};

void ChainRTest::keptAnswers()
{
    QCOMPARE(published::leastChanges().size(), std::size_t{40});
    ChainSolver solver;
    int solved = 0;
    for (const published::LeastChange& kept : published::leastChanges()) {
        Chain chain{kept.p, kept.v, kept.lo, kept.hi, kept.c, kept.w, {}, {}};
        if (!std::isnan(kept.total))
            chain.total = kept.total;
        if (!std::isnan(kept.expectedMost))
            chain.expectedMost = kept.expectedMost;
        const ChainAnswer& answer = solver.solve(chain.problem());
        QCOMPARE(answer.status == ChainStatus::solved, !std::isnan(kept.cost));
        if (answer.status != ChainStatus::solved)
            continue;
        ++solved;
        COMPARE_CLOSE(answer.cost, kept.cost, 1e-8); // As asked of the solver.
    }
    QCOMPARE(solved, 32);
}

void ChainRTest::randomProblems()
{
    std::mt19937_64 random(401);
    std::vector<Chain> chains;
    std::vector<Numbers> questions;
    for (int i = 0; i < 1000; ++i) {
        chains.push_back(randomChain(random, 1 + random() % 40));
        questions.push_back(chains.back().question());
    }
    const Answers answers = ask(QStringLiteral("chain"), questions);
    NEED_ANSWERS(answers, questions.size());
    ChainSolver solver;
    int infeasible = 0;
    int targetBinds = 0;
    int bothBind = 0;
    double worst = 0;
    for (std::size_t i = 0; i < chains.size(); ++i) {
        const ChainAnswer& answer = solver.solve(chains[i].problem());
        const bool solved = answer.status == ChainStatus::solved;
        QVERIFY2(solved == (answers.lines[i][0] == 0), qPrintable(describe(i, chains[i], answer)));
        infeasible += !solved;
        if (!solved)
            continue;
        targetBinds += answer.lambda > 0;
        bothBind += answer.lambda > 0 && answer.mu != 0;
        // 1e-8 relative, as asked; costs below a hundredth of a minor unit squared are nothing but rounding.
        worst = std::max(worst, std::abs(answer.cost - answers.lines[i][1]) / std::max(answers.lines[i][1], 1e-2));
        COMPARE_WITHIN(answer.cost, answers.lines[i][1], 1e-8 * std::max(answers.lines[i][1], 1e-2));
    }
    qInfo("1000 problems: %d infeasible, target binds in %d, with the total in %d; largest relative difference of cost %.2g", infeasible,
          targetBinds, bothBind, worst);
    QVERIFY(infeasible > 60 && targetBinds > 400 && bothBind > 300);
}

QTEST_GUILESS_MAIN(ChainRTest)
#include "chain_r_test.moc"
