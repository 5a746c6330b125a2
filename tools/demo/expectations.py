"""What the demonstration must come to: each pump's story, held against what was told."""
import csv
import json

WORN = {("press-1", "A"): ("plan", "act")}
HEALTHY = [("press-2", "A"), ("loader-1", "A"), ("trimmer-1", "A")]
AT_MOST_WATCH = {
    ("scarfer-1", "A"): "too new for a baseline",
    ("clipper-1", "A"): "without a thermometer",
    ("stacker-1", "A"): "silent for five days",
}


def failures(fleet, alert_lines, webhook_lines):
    """One sentence for each expectation that was not met."""
    told = {(row["pump"], row["section"]): row for row in fleet}
    return [*_of_levels(told), *_of_double_pump(told), *_of_alerts(alert_lines, webhook_lines)]


def _of_levels(told):
    for key, levels in WORN.items():
        if told[key]["level"] not in levels:
            yield f"{key[0]} is worn, yet {told[key]['level']}; wanted {' or '.join(levels)}"
    for key in HEALTHY:
        if told[key]["level"] != "sound":
            yield f"{key[0]} is healthy, yet {told[key]['level']}; wanted sound"
    if told["barker-1", "A"]["level"] in ("unjudged", "sound"):
        yield f"barker-1 is broken, yet {told['barker-1', 'A']['level']}; wanted watch or more"
    for key, why in AT_MOST_WATCH.items():
        row = told[key]
        if row["level"] not in ("unjudged", "watch"):
            yield f"{key[0]} is {why}, yet {row['level']}; wanted unjudged or at most watch"
        if row["level"] == "unjudged" and not row["reason"]:
            yield f"{key[0]} is unjudged without a reason"


def _of_double_pump(told):
    worn, healthy = told["lathe-1", "A"], told["lathe-1", "B"]
    if worn["level"] not in ("plan", "act"):
        yield f"lathe-1 A is worn, yet {worn['level']}; wanted plan or act"
    if healthy["level"] != "sound":
        yield f"lathe-1 B is healthy, yet {healthy['level']}; wanted sound"
    if healthy["life"]["number"] != 2:
        yield f"lathe-1 B had a cartridge replaced, yet is in life {healthy['life']['number']}; wanted 2"


def _of_alerts(alert_lines, webhook_lines):
    alerts = [json.loads(line) for line in alert_lines]
    if not any(alert.get("pump") == "press-1" for alert in alerts):
        yield "the alert log holds no line on press-1"
    got = {json.loads(line).get("id") for line in webhook_lines}
    missing = [alert["id"] for alert in alerts if alert.get("id") not in got]
    if not got:
        yield "the webhook got nothing"
    if missing:
        yield f"{len(missing)} lines of the alert log never reached the webhook, {missing[0]} for one"


def table(fleet, truth_file):
    """Ratio told beside ratio true, at the end of the year."""
    with open(truth_file, encoding="utf-8") as lines:
        true = {(row["pump"], row["section"]): float(row["leakage_ratio"]) for row in csv.DictReader(lines)}
    rows = [f"{'pump':<12}{'level':<10}{'told':>6}{'low':>7}{'high':>7}{'true':>8}"]
    for row in fleet:
        ratio = row["leakage_ratio"]
        told = "".join(f"{'-' if ratio[k] is None else format(ratio[k], '.2f'):>7}" for k in ("value", "low", "high"))
        rows.append(f"{row['pump'] + ' ' + row['section']:<12}{row['level']:<9}{told}"
                    f"{true[row['pump'], row['section']]:>8.2f}")
    return "\n".join(rows)
