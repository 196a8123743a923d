// SPDX-License-Identifier: GPL-3.0-or-later
// Questions to R as installed, by way of published/r/live_values.R.
#pragma once

#include <QtTest>

#include <QProcess>
#include <QStandardPaths>

#include <vector>

using Numbers = std::vector<double>;

struct Answers {
    std::vector<Numbers> lines;
    QString missing; ///< Why there are none: R or a package is not installed.
    QString trouble; ///< R failed.
};

inline Answers ask(const QString& topic, const std::vector<Numbers>& questions)
{
    Answers answers;
    const QString rscript = QStandardPaths::findExecutable(QStringLiteral("Rscript"));
    if (rscript.isEmpty()) {
        answers.missing = QStringLiteral("Rscript is not installed");
        return answers;
    }
    QByteArray input;
    for (const Numbers& question : questions) {
        QByteArrayList words;
        for (const double number : question)
            words << QByteArray::number(number, 'g', 17);
        input += words.join(' ') + '\n';
    }
    QProcess r;
    r.start(rscript, {QStringLiteral("--vanilla"), QStringLiteral(RUNGWRIGHT_TEST_DATA "/published/r/live_values.R"), topic});
    r.write(input);
    r.closeWriteChannel();
    if (!r.waitForFinished(300'000) || r.exitStatus() != QProcess::NormalExit || r.exitCode() != 0) {
        answers.trouble = QStringLiteral("R failed: ") + QString::fromLocal8Bit(r.readAllStandardError());
        return answers;
    }
    for (const QByteArray& line : r.readAllStandardOutput().split('\n')) {
        if (line.startsWith("missing ")) {
            answers.missing = QStringLiteral("R's package is not installed: ") + QString::fromLatin1(line.mid(8).trimmed());
            return answers;
        }
        Numbers numbers;
        for (const QByteArray& word : line.simplified().split(' '))
            if (!word.isEmpty())
                numbers.push_back(word.toDouble());
        if (!numbers.empty())
            answers.lines.push_back(numbers);
    }
    return answers;
}

/// Skips or fails when there are no answers, as the environment asks.
#define NEED_ANSWERS(answers, count)                                                                                                       \
    do {                                                                                                                                   \
        QVERIFY2((answers).trouble.isEmpty(), qPrintable((answers).trouble));                                                              \
        if (!(answers).missing.isEmpty()) {                                                                                                \
            QVERIFY2(qEnvironmentVariableIntValue("RUNGWRIGHT_REQUIRE_R") == 0, qPrintable((answers).missing));                            \
            QSKIP(qPrintable((answers).missing));                                                                                          \
        }                                                                                                                                  \
        QCOMPARE((answers).lines.size(), static_cast<std::size_t>(count));                                                                 \
    } while (false)
