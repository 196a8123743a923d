// SPDX-License-Identifier: GPL-3.0-or-later
#include "floor_question.h"

#include "document.h"
#include "plot_words.h"
#include "questions.h"
#include "wording.h"
#include "words.h"

namespace rungwright
{

void askFloor(Document& document, int tier, Questions& questions, QWidget* parent)
{
    const Tier& asked = document.tier(tier)->tier;
    const Currency& currency = document.scenario().currency;
    const QString name = isolated(shownText(asked.name));
    QString typed = asked.hasFloor() ? moneyText(asked.advertisedFloor, currency) : QString();
    for (;;) {
        const QString answer = questions.text(
            parent, Words::tr("Advertised floor"),
            Words::tr("%1 is advertised from (%2; leave empty when no floor is known):").arg(name, QString::fromStdString(currency.code)),
            typed);
        if (answer.isNull())
            return;
        typed = answer.trimmed();
        if (typed.isEmpty()) {
            document.setFloor(tier, Price{});
            return;
        }
        const auto floor = moneyFromText(typed, currency);
        if (floor && *floor > Price{}) {
            document.setFloor(tier, *floor);
            return;
        }
        questions.tell(parent, Words::tr("“%1” is not taken for a floor.").arg(shownText(typed)),
                       Words::tr("Type an amount above zero, like %1, or nothing at all when no floor is known.")
                           .arg(moneyText(Price{69 * currency.minorPerMajor()}, currency)));
    }
}

} // namespace rungwright
