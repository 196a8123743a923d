#!/usr/bin/env python3
# SPDX-License-Identifier: GPL-3.0-or-later
"""Writes the eight invented exports and the same data in our own format. Python 3.11, standard library only.

Our own files come from the data, not from the exports, so that a mapping is checked against what was meant.
"""
import csv
import io
import pathlib
import random

FOLDER = pathlib.Path(__file__).parent
OWN = ["site", "tier", "unit", "asking_price", "status", "advertised_floor", "currency", "grade", "area", "vacancy_chance", "locked"]


def units(seed, sites, tiers, names, low, decimals=2, cents=(0,)):
    """Rows as dictionaries in our spelling; prices in minor units until they are written."""
    dice = random.Random(seed)
    rows = []
    for site in sites:
        for number, (tier, area) in enumerate(tiers):
            floor = (low + 900 * number) * 10 ** decimals // 100
            for _ in range(dice.randint(4, 7)):
                price = floor + dice.randrange(0, 4000, 250) * 10 ** decimals // 100 + dice.choice(cents)
                rows.append({
                    "site": site, "tier": tier, "unit": names(site, len(rows) + 1), "price": price, "floor": floor,
                    "status": dice.choice(["vacant", "vacant", "occupied", "occupied", "reserved", "closed"]),
                    "grade": dice.randint(1, 5), "area": area + dice.choice([0, 1, 2]) / 10,
                    "chance": dice.choice([0.05, 0.125, 0.25, 0.5, 1.0]), "locked": dice.random() < 0.3})
    # Every status is there whatever the dice say.
    for row, status in zip(rows, ["vacant", "occupied", "reserved", "closed"]):
        row["status"] = status
    return rows


def money(minor, decimals=2, point=".", group=""):
    whole, rest = divmod(minor, 10 ** decimals)
    digits = f"{whole:,}".replace(",", group)
    return digits + (point + f"{rest:0{decimals}d}" if decimals else "")


def write_own(name, rows, currency, columns):
    with open(FOLDER / f"{name}.own.csv", "w", encoding="utf-8", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(columns)
        for row in rows:
            cells = {"site": row["site"], "tier": row["tier"], "unit": row["unit"], "asking_price": money(row["price"]),
                     "status": row["status"], "advertised_floor": money(row["floor"]), "currency": currency, "grade": row["grade"],
                     "area": f"{row['area']:.1f}", "vacancy_chance": row["chance"], "locked": "yes" if row["locked"] else "no"}
            out.writerow([cells[column] for column in columns])


def write_theirs(name, lines, encoding, delimiter, quoting=csv.QUOTE_MINIMAL, end="\r\n"):
    text = io.StringIO()
    out = csv.writer(text, delimiter=delimiter, quoting=quoting, lineterminator=end)
    for line in lines:
        out.writerow(line)
    (FOLDER / f"{name}.csv").write_bytes(text.getvalue().encode(encoding))


def german():
    words = {"vacant": "frei", "occupied": "vermietet", "reserved": "vorgemerkt", "closed": "außer Betrieb"}
    rows = units(1, ["Moosried Süd", "Grünkehl – Hafen"], [("Abteil 2 m²", 2.0), ("Abteil 5 m²", 5.0)],
                 lambda site, n: f"{site[0]}{n:03d}ß", 4900, cents=(0, 50, 95))
    lines = [["Standort", "Kategorie", "Einheit", "Monatsmiete (€)", "Belegung", "Ab-Preis", "Fläche m²", "Lagegüte", "Preis fest"]]
    for r in rows:
        lines.append([r["site"], r["tier"], r["unit"], money(r["price"], point=","), words[r["status"]], money(r["floor"], point=","),
                      f"{r['area']:.1f}".replace(".", ","), r["grade"], "ja" if r["locked"] else "nein"])
    write_theirs("1-german", lines, "cp1252", ";")
    write_own("1-german", rows, "EUR", [c for c in OWN if c != "vacancy_chance"])


def tab():
    words = {"vacant": "Available", "occupied": "LET", "reserved": "On hold", "closed": "Out of service"}
    rows = units(2, ["Pellow Reach", "Nant y Gwern"], [("Berth 6 m", 14.0), ("Berth 8 m", 21.0), ("Berth 10 m", 33.0)],
                 lambda site, n: f"{site[:2].upper()}-{n}", 21000)
    lines = [["Marina", "Size class", "Berth", "List price", "State", "Price from", "Currency", "Locked"]]
    for r in rows:
        lines.append([r["site"], r["tier"], r["unit"], money(r["price"]), words[r["status"]], money(r["floor"]), "CAD",
                      "Y" if r["locked"] else "N"])
    write_theirs("2-tab", lines, "utf-8-sig", "\t", end="\n")
    write_own("2-tab", rows, "CAD", ["site", "tier", "unit", "asking_price", "status", "advertised_floor", "currency", "locked"])


def grouped():
    words = {"vacant": "Vacant", "occupied": "Occupied", "reserved": "Reserved", "closed": "Maintenance"}
    rows = units(3, ["Ashlow House"], [("Studio", 18.0), ("Two rooms", 41.5)], lambda site, n: f"Flat {n}", 98500, cents=(0, 50))
    lines = [["Property", "Type", "Unit no.", "Asking rent", "Status", "Advertised from", "Area (m2)"]]
    for r in rows:
        lines.append([r["site"], r["tier"], r["unit"], "£" + money(r["price"], group=","), words[r["status"]],
                      "£" + money(r["floor"], group=","), f"{r['area']:.1f}"])
    write_theirs("3-grouped", lines, "utf-8", ",")
    write_own("3-grouped", rows, "GBP", ["site", "tier", "unit", "asking_price", "status", "advertised_floor", "currency", "area"])


def french():
    words = {"vacant": "Libre", "occupied": "Loué", "reserved": "Réservé", "closed": "Hors service"}
    rows = units(4, ["Vaucrêt-le-Bœuf", "L'Épinoche"], [("Bureau partagé", 6.0), ("Bureau fermé", 14.0)],
                 lambda site, n: f"N° {n}", 97000, cents=(0, 50, 90))
    lines = [["Établissement", "Catégorie", "Numéro", "Loyer affiché", "Disponibilité", "À partir de", "Surface"]]
    for r in rows:
        lines.append([r["site"], r["tier"], r["unit"], money(r["price"], point=",", group="\u00a0") + "\u00a0€", words[r["status"]],
                      money(r["floor"], point=",", group="\u00a0") + "\u00a0€", f"{r['area']:.1f}".replace(".", ",") + " m²"])
    write_theirs("4-french", lines, "iso8859-15", ";")
    write_own("4-french", rows, "EUR", ["site", "tier", "unit", "asking_price", "status", "advertised_floor", "currency", "area"])


def two_lines():
    words = {"vacant": "disponible", "occupied": "ocupada", "reserved": "reservada", "closed": "en obras"}
    rows = units(5, ["Peñalquebrada", "Río Cárdeno"], [("Chica", 1.5), ("Mediana", 4.0), ("Grande", 9.0)], lambda site, n: f"T{n:02d}", 6500)
    lines = [["Listado de trasteros"], ["Centro", "Trastero", "", "Precio", "", "Estado", "Superficie"],
             ["", "número", "categoría", "mensual", "desde", "", "m²"]]
    for r in rows:
        lines.append([r["site"], r["unit"], r["tier"], money(r["price"], point=",", group="."), money(r["floor"], point=",", group="."),
                      words[r["status"]], f"{r['area']:.1f}".replace(".", ",")])
    # The line of the title has its one cell only, and a blank line stands below it.
    text = io.StringIO()
    out = csv.writer(text, delimiter="|", lineterminator="\n")
    out.writerow(lines[0])
    text.write("\n")
    out.writerows(lines[1:])
    (FOLDER / "5-two-lines.csv").write_bytes(text.getvalue().encode("utf-8"))
    write_own("5-two-lines", rows, "MXN", ["site", "tier", "unit", "asking_price", "status", "advertised_floor", "currency", "area"])


def odd_order():
    words = {"vacant": "Libero", "occupied": "Affittato", "reserved": "Prenotato", "closed": "Fuori servizio"}
    rows = units(6, ["Borgo Sferrante", "Càlvea Bassa"], [("Posto coperto", 12.0), ("Posto scoperto", 12.5)], lambda site, n: f"P/{n}", 7500)
    lines = [["Data ultimo aggiornamento della scheda", "Probabilità di sfitto stimata per il mese", "Prezzo di listino mensile (EUR)",
              "Stato attuale di occupazione", "Codice interno del contratto in corso", "Tipologia del posto auto", "Posto",
              "Prezzo pubblicato sul sito, a partire da", "Nome della sede", "Superficie in m2", "Prezzo bloccato"]]
    for i, r in enumerate(rows):
        lines.append([f"{i % 28 + 1:02d}/11/2026", f"{r['chance'] * 100:g}".replace(".", ",") + " %", money(r["price"], point=","),
                      words[r["status"]], f"C-{9000 + i}", r["tier"], r["unit"], money(r["floor"], point=","), r["site"],
                      f"{r['area']:.1f}".replace(".", ","), "sì" if r["locked"] else "no"])
    write_theirs("6-odd-order", lines, "utf-16", "\t")
    write_own("6-odd-order", rows, "EUR", [c for c in OWN if c != "grade"])


def total():
    words = {"vacant": "Vrij", "occupied": "Verhuurd", "reserved": "Optie", "closed": "Onderhoud"}
    rows = units(7, ["Kleidervaart"], [("Box S", 3.0), ("Box M", 6.0), ("Box L", 12.0)], lambda site, n: f"{n:03d}", 5500)
    lines = [["Nummer", "Maat", "Status", "Huurprijs", "Oppervlakte"]]
    for r in rows:
        lines.append([r["unit"], r["tier"], words[r["status"]], money(r["price"], point=",", group="."),
                      f"{r['area']:.1f}".replace(".", ",")])
    lines.append(["Totaal", "", "", money(sum(r["price"] for r in rows), point=",", group="."), ""])
    lines.append(["Afgedrukt op 1 december 2026"])
    write_theirs("7-total", lines, "utf-8", ";")
    write_own("7-total", rows, "EUR", ["site", "tier", "unit", "asking_price", "status", "advertised_floor", "currency", "area"])
    floors = {(r["site"], r["tier"]): money(r["floor"]) for r in rows}
    write_theirs("7-total.floors", [["site", "tier", "advertised_floor"], *[[*key, floor] for key, floor in floors.items()]], "utf-8", ",")


def quotes():
    words = {"vacant": "livre", "occupied": "alugado", "reserved": "reservado", "closed": "manutenção"}
    rows = units(8, ['Armazém "Três Rios"', "Doca; Norte"], [("Sala\npequena", 20.0), ('Sala "grande"', 55.0)],
                 lambda site, n: f'"{n}"; lado\nesquerdo' if n % 3 == 0 else f"{n}", 98000)
    lines = [["Local", "Tamanho", "Unidade", "Preço", "Situação", "Preço desde"]]
    for r in rows:
        lines.append([r["site"], r["tier"], r["unit"], "CHF " + swiss(r["price"]), words[r["status"]], "CHF " + swiss(r["floor"])])
    write_theirs("8-quotes", lines, "iso8859-1", ";", csv.QUOTE_ALL)
    write_own("8-quotes", rows, "CHF", ["site", "tier", "unit", "asking_price", "status", "advertised_floor", "currency"])


def swiss(minor):
    return f"{minor // 100:,}".replace(",", "'") + (".-" if minor % 100 == 0 else f".{minor % 100:02d}")


for make in (german, tab, grouped, french, two_lines, odd_order, total, quotes):
    make()
