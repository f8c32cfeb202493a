"""What the answer is asked with: sizing, money, how sure the figures are, a fit to a logger record."""

from __future__ import annotations

from coldbox.project.fields.declare import TRADE, Field, Table, notes

TABLES = (
    Table(name="sizing", form="one", help="How the capacity is made from the heat."),
    Table(name="money", form="one", help="What energy and insulation cost. Any three capital letters are a currency."),
    Table(
        name="spreads",
        form="one",
        help="How sure the usual figures are, where the file gives no ±: half-widths that hold 95 of 100.",
    ),
    Table(name="fit", form="one", help="Written by the fit to a logger record: factors on the box's own figures."),
)

_SIZE = "sizing"
_MONEY = "money"
_SURE = "spreads"
_FIT = "fit"
_USUAL = "usual in the trade"
_NO_FIT = "none"

FIELDS = (
    Field(_SIZE, "run_hours", "duration", "running hours", "Hours a day the machine may run; the rest is for defrost.",
          3600.0, 86400.0, default_reason="by room temperature and defrost", source=TRADE),
    Field(_SIZE, "safety", "share", "safety", "Added to the capacity.", 0.0, 2.0, default="10 %", default_reason=_USUAL,
          source=TRADE),
    Field(_SIZE, "tested_with_unit", "yes_no", "tested with its unit", "true when body and unit were tested "
          "together: the ATP factor is then 1.35 instead of 1.75.", default="false",
          default_reason="the stricter factor", source="un-atp"),
    notes(_SIZE),
    Field(_MONEY, "tariff", "energy_price", "tariff", "Price of electric energy.", 0.0, 100.0 / 3.6e6,
          default_reason="no money figures without it"),
    Field(_MONEY, "insulation_cost", "volume_price", "insulation cost", "Price of insulation in place.", 0.0, 1e6,
          default_reason="no cheapest thickness without it"),
    Field(_MONEY, "years", "count", "years", "Over how many years.", 1, 100, default="10", default_reason=_USUAL,
          source=TRADE),
    Field(_MONEY, "interest", "share", "interest", "Interest of a year.", 0.0, 1.0, default="0 %",
          default_reason="money is not discounted unless asked", source=TRADE),
    notes(_MONEY),
    *(
        Field(_SURE, key, kind, label, text, 0.0, high, default=default, default_reason=_USUAL, source=TRADE)
        for key, kind, label, text, high, default in (
            ("foam", "share", "foam", "Conductivity of insulation.", 2.0, "10 %"),
            ("ageing", "share", "ageing", "Ageing of insulation, in points added to its conductivity.", 2.0, "5 %"),
            ("air", "share", "air", "Leakage and air change.", 2.0, "50 %"),
            ("openings", "share", "openings", "How often and how long doors are open.", 2.0, "30 %"),
            ("ambient", "difference", "ambient", "Outdoor temperature and that of rooms behind.", 20.0, "2 K"),
            ("enthalpy", "share", "enthalpy", "Heat content of foods, from the choice of model.", 1.0, "10 %"),
            ("freezing_point", "difference", "freezing point", "Freezing points of foods.", 5.0, "0.3 K"),
            ("films", "share", "films", "Surface films.", 2.0, "20 %"),
        )
    ),
    notes(_SURE),
    Field(_FIT, "on", "yes_no", "on", "Whether the factors below are applied.", default="true",
          default_reason="a fit is there to be used", source=TRADE),
    Field(_FIT, "file", "name", "file", "The logger record it was made from.", required=True),
    Field(_FIT, "date", "text", "date", "When it was made.", default_reason=_NO_FIT),
    Field(_FIT, "hash", "text", "hash", "What the record's content was then.", default_reason=_NO_FIT),
    *(
        Field(_FIT, key, "number", label, f"Factor on the {text}.", 0.01, 100.0, default_reason="not fitted")
        for key, label, text in (
            ("conductance", "conductance", "heat that passes through the walls"),
            ("leakage", "leakage", "leakage"),
            ("heat_capacity", "heat capacity", "heat capacity of what is inside"),
        )
    ),
    notes(_FIT),
)  # fmt: skip
