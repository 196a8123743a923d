// SPDX-License-Identifier: GPL-3.0-or-later
// Unsaved work survives a crash and leaves nothing behind after a good end.
#include "autosave.h"

#include "invented_tier.h"
#include "recent_files.h"
#include "scenario_json.h"

#include <QSettings>
#include <QTemporaryDir>
#include <QTest>

using namespace rungwright;

class AutosaveTest : public QObject
{
    Q_OBJECT
private slots:
    void copyIsWrittenAndFoundAfterACrash();
    void savingRemovesTheCopy();
    void undoingEverythingRemovesTheCopy();
    void workWithoutAFileIsFoundToo();
    void anotherWindowIsNoticed();
    void troubleIsSaidOnce();
    void recentFilesKeepTenAndForgetTheGone();
};

void AutosaveTest::copyIsWrittenAndFoundAfterACrash()
{
    QTemporaryDir folder;
    const QString path = folder.filePath(QStringLiteral("a.rungs.json"));
    QVERIFY(saveScenario(inventedScenario(), path).ok());
    QByteArray unsaved;
    {
        Document document;
        Autosave autosave(document, folder.filePath(QStringLiteral("state")));
        autosave.setDelay(1);
        document.begin(inventedScenario(), path, true);
        autosave.follow();
        document.copyCandidate(0, -1);
        unsaved = scenarioToJson(document.scenario());
        QTRY_VERIFY(QFile::exists(autosave.copyPath()));
        autosave.flush();
        // The window dies here without saying goodbye: nothing calls discardCopy().
    }
    Document document;
    const Autosave autosave(document, folder.filePath(QStringLiteral("state")));
    const auto left = autosave.leftBehind(path);
    QVERIFY(left);
    QCOMPARE(left->forPath, path);
    const auto recovered = loadScenario(left->copyPath);
    QVERIFY(recovered.ok());
    QCOMPARE(scenarioToJson(recovered.value()), unsaved);
    QCOMPARE(loadScenario(path).value(), inventedScenario()); // the file itself was not touched
}

void AutosaveTest::savingRemovesTheCopy()
{
    QTemporaryDir folder;
    const QString path = folder.filePath(QStringLiteral("a.rungs.json"));
    Document document;
    Autosave autosave(document, folder.filePath(QStringLiteral("state")));
    document.begin(inventedScenario(), path, false);
    autosave.follow();
    autosave.flush();
    QVERIFY(QFile::exists(autosave.copyPath()));
    QVERIFY(document.saveTo(path).ok());
    QVERIFY(!QFile::exists(autosave.copyPath()));
    QVERIFY(!autosave.leftBehind(path));
}

void AutosaveTest::undoingEverythingRemovesTheCopy()
{
    QTemporaryDir folder;
    const QString path = folder.filePath(QStringLiteral("a.rungs.json"));
    QVERIFY(saveScenario(inventedScenario(), path).ok());
    Document document;
    Autosave autosave(document, folder.filePath(QStringLiteral("state")));
    document.begin(inventedScenario(), path, true);
    autosave.follow();
    document.copyCandidate(0, -1);
    autosave.flush();
    QVERIFY(QFile::exists(autosave.copyPath()));
    document.undoStack().undo();
    QVERIFY(!QFile::exists(autosave.copyPath()));
}

void AutosaveTest::workWithoutAFileIsFoundToo()
{
    QTemporaryDir folder;
    const QString state = folder.filePath(QStringLiteral("state"));
    {
        Document document;
        Autosave autosave(document, state);
        document.begin(inventedScenario(), {}, false);
        autosave.follow();
        autosave.flush();
        // While its window lives, no other window is offered it.
        Document second;
        const Autosave other(second, state);
        QVERIFY(!other.leftBehind({}));
    }
    Document document;
    const Autosave autosave(document, state);
    const auto left = autosave.leftBehind({});
    QVERIFY(left);
    QCOMPARE(loadScenario(left->copyPath).value(), inventedScenario());
}

void AutosaveTest::anotherWindowIsNoticed()
{
    QTemporaryDir folder;
    const QString path = folder.filePath(QStringLiteral("a.rungs.json"));
    const QString state = folder.filePath(QStringLiteral("state"));
    Document second;
    const Autosave other(second, state);
    {
        Document document;
        Autosave autosave(document, state);
        document.begin(inventedScenario(), path, false);
        autosave.follow();
        autosave.flush();
        QVERIFY(other.openElsewhere(path));
        QVERIFY(!autosave.openElsewhere(path));
        QVERIFY(!other.leftBehind(path)); // it is being worked on, not left behind
    }
    QVERIFY(!other.openElsewhere(path));
}

void AutosaveTest::troubleIsSaidOnce()
{
    QTemporaryDir folder;
    Document document;
    Autosave autosave(document, folder.filePath(QStringLiteral("state")));
    int said = 0;
    connect(&autosave, &Autosave::trouble, this, [&said](const QString& message) {
        QVERIFY(!message.isEmpty());
        ++said;
    });
    document.begin(inventedScenario(), folder.filePath(QStringLiteral("gone/a.rungs.json")), false);
    autosave.follow();
    autosave.flush();
    document.copyCandidate(0, -1);
    autosave.flush();
    QTRY_COMPARE(said, 1);
    QTest::qWait(20);
    QCOMPARE(said, 1);
}

void AutosaveTest::recentFilesKeepTenAndForgetTheGone()
{
    QTemporaryDir folder;
    QSettings settings(folder.filePath(QStringLiteral("s.ini")), QSettings::IniFormat);
    RecentFiles recent(settings);
    for (int i = 0; i < 12; ++i) {
        const QString path = folder.filePath(QStringLiteral("%1.rungs.json").arg(i));
        QVERIFY(saveScenario(inventedScenario(), path).ok());
        recent.add(path);
    }
    QCOMPARE(recent.list().size(), 10);
    QVERIFY(recent.list().first().endsWith(QStringLiteral("/11.rungs.json")));
    QVERIFY(QFile::remove(recent.list().first()));
    QCOMPARE(recent.list().size(), 9);
    recent.add(recent.list().last());
    QCOMPARE(recent.list().size(), 9);
}

QTEST_GUILESS_MAIN(AutosaveTest)
#include "autosave_test.moc"
