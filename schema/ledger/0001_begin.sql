-- The ledger's first form. Every table and column is told in schema/README.md. Times are milliseconds since 1970, UTC;
-- dates are days since 1970 in the plant's time zone. A released migration never changes: add the next number instead.

-- Names -------------------------------------------------------------------------------------------------------------

CREATE TABLE feed (
    id INTEGER PRIMARY KEY,
    name TEXT NOT NULL UNIQUE,
    corrects TEXT
) STRICT;

CREATE TABLE pump (
    id INTEGER PRIMARY KEY,
    name TEXT NOT NULL UNIQUE
) STRICT;

CREATE TABLE point (
    id INTEGER PRIMARY KEY,
    kind TEXT NOT NULL CHECK (kind IN ('pump', 'section', 'reservoir', 'drain-group')),
    name TEXT NOT NULL,
    section TEXT NOT NULL DEFAULT '',
    moved_until INTEGER,
    block_readings INTEGER NOT NULL DEFAULT 0,
    block_disputed INTEGER NOT NULL DEFAULT 0,
    UNIQUE (kind, name, section)
) STRICT;

CREATE TABLE point_name (
    pump INTEGER NOT NULL REFERENCES pump (id),
    section TEXT NOT NULL,
    point INTEGER NOT NULL REFERENCES point (id),
    PRIMARY KEY (pump, section)
) STRICT, WITHOUT ROWID;

CREATE TABLE point_pump (
    point INTEGER NOT NULL REFERENCES point (id),
    pump INTEGER NOT NULL REFERENCES pump (id),
    PRIMARY KEY (point, pump)
) STRICT, WITHOUT ROWID;

CREATE TABLE track (
    id INTEGER PRIMARY KEY,
    pump INTEGER NOT NULL REFERENCES pump (id),
    section TEXT NOT NULL,
    basis TEXT NOT NULL CHECK (basis IN ('case-drain', 'delivery')),
    UNIQUE (pump, section, basis)
) STRICT;

-- Readings ----------------------------------------------------------------------------------------------------------

CREATE TABLE recent (
    time INTEGER NOT NULL,
    point INTEGER NOT NULL,
    feed INTEGER NOT NULL,
    disputed INTEGER NOT NULL DEFAULT 0,
    outlet_pressure REAL,
    shaft_speed REAL,
    case_drain_flow REAL,
    fluid_temperature REAL,
    delivery_flow REAL,
    inlet_pressure REAL,
    case_pressure REAL,
    stroke REAL,
    shaft_power REAL,
    drain_temperature REAL,
    running REAL,
    hour_meter REAL,
    particle_count REAL,
    filter_dp REAL,
    feeds BLOB,
    PRIMARY KEY (time, point)
) STRICT, WITHOUT ROWID;

CREATE TABLE hour_block (
    id INTEGER PRIMARY KEY,
    point INTEGER NOT NULL REFERENCES point (id),
    hour INTEGER NOT NULL,
    readings INTEGER NOT NULL,
    disputed INTEGER NOT NULL,
    data BLOB NOT NULL
) STRICT;
CREATE UNIQUE INDEX hour_block_key ON hour_block (point, hour);

CREATE TABLE dispute (
    point INTEGER NOT NULL REFERENCES point (id),
    time INTEGER NOT NULL,
    quantity INTEGER NOT NULL,
    value REAL NOT NULL,
    feed INTEGER NOT NULL,
    PRIMARY KEY (point, time, quantity, value)
) STRICT, WITHOUT ROWID;

CREATE TABLE refused (
    id INTEGER PRIMARY KEY,
    feed INTEGER NOT NULL REFERENCES feed (id),
    place TEXT NOT NULL,
    code TEXT NOT NULL,
    message TEXT NOT NULL,
    text TEXT NOT NULL,
    received INTEGER NOT NULL
) STRICT;
CREATE INDEX refused_by_feed ON refused (feed, code);

CREATE TABLE receipt (
    sha256 TEXT PRIMARY KEY,
    feed INTEGER NOT NULL REFERENCES feed (id),
    file TEXT NOT NULL,
    rows INTEGER NOT NULL,
    stored INTEGER NOT NULL,
    repeated INTEGER NOT NULL,
    refused INTEGER NOT NULL,
    taken INTEGER NOT NULL
) STRICT, WITHOUT ROWID;

-- What is to be judged ----------------------------------------------------------------------------------------------

CREATE TABLE pump_state (
    pump INTEGER PRIMARY KEY REFERENCES pump (id),
    newest INTEGER,
    oldest INTEGER,
    closed_until INTEGER,
    generation INTEGER NOT NULL DEFAULT 0,
    mark_from INTEGER,
    mark_to INTEGER
) STRICT;

-- Judgement ---------------------------------------------------------------------------------------------------------

CREATE TABLE hour_summary (
    track INTEGER NOT NULL REFERENCES track (id),
    start INTEGER NOT NULL,
    length_ms INTEGER NOT NULL,
    date INTEGER NOT NULL,
    life INTEGER NOT NULL,
    full_flow INTEGER NOT NULL,
    compensating INTEGER NOT NULL,
    stopped INTEGER NOT NULL,
    below_minimum_speed INTEGER NOT NULL,
    cold INTEGER NOT NULL,
    thin INTEGER NOT NULL,
    transient INTEGER NOT NULL,
    part_stroke INTEGER NOT NULL,
    relieving INTEGER NOT NULL,
    motoring INTEGER NOT NULL,
    variable_speed INTEGER NOT NULL,
    no_pressure INTEGER NOT NULL,
    no_speed INTEGER NOT NULL,
    no_temperature INTEGER NOT NULL,
    below_least_flow INTEGER NOT NULL,
    impossible INTEGER NOT NULL,
    running_h REAL,
    judged_h REAL,
    stop_count INTEGER NOT NULL,
    stop_flow_lpm REAL,
    drain_share REAL,
    highest_temperature_c REAL,
    highest_case_bar REAL,
    lowest_inlet_bar REAL,
    mean_pressure_bar REAL,
    level INTEGER NOT NULL,
    reason INTEGER NOT NULL,
    leakage_ratio REAL,
    leakage_ratio_low REAL,
    leakage_ratio_high REAL,
    filtered_ratio REAL,
    filtered_ratio_low REAL,
    filtered_ratio_high REAL,
    efficiency REAL,
    efficiency_low REAL,
    efficiency_high REAL,
    leakage_lpm REAL,
    excess_lpm REAL,
    leakage_kw REAL,
    outside_coverage INTEGER NOT NULL,
    PRIMARY KEY (track, start)
) STRICT, WITHOUT ROWID;

CREATE TABLE regime_moments (
    track INTEGER NOT NULL,
    start INTEGER NOT NULL,
    regime INTEGER NOT NULL,
    count INTEGER NOT NULL,
    leakage_lpm REAL,
    f1 REAL,
    f2 REAL,
    f3 REAL,
    cov_yy REAL,
    cov_1y REAL,
    cov_11 REAL,
    cov_2y REAL,
    cov_21 REAL,
    cov_22 REAL,
    cov_3y REAL,
    cov_31 REAL,
    cov_32 REAL,
    cov_33 REAL,
    standard_error_lpm REAL,
    dp_bar REAL,
    temperature_c REAL,
    dp_variance REAL,
    dp_temperature_covariance REAL,
    temperature_variance REAL,
    viscosity_cst REAL,
    speed_rpm REAL,
    delivery_lpm REAL,
    theoretical_lpm REAL,
    PRIMARY KEY (track, start, regime),
    FOREIGN KEY (track, start) REFERENCES hour_summary (track, start) ON DELETE CASCADE
) STRICT, WITHOUT ROWID;

CREATE TABLE day (
    track INTEGER NOT NULL REFERENCES track (id),
    date INTEGER NOT NULL,
    begin_time INTEGER NOT NULL,
    end_time INTEGER NOT NULL,
    finished INTEGER NOT NULL,
    life INTEGER NOT NULL,
    level INTEGER NOT NULL,
    reason INTEGER NOT NULL,
    leakage_ratio REAL,
    leakage_ratio_low REAL,
    leakage_ratio_high REAL,
    efficiency REAL,
    efficiency_low REAL,
    efficiency_high REAL,
    efficiency_baseline REAL,
    efficiency_at_rated INTEGER NOT NULL,
    clearance_growth_percent REAL,
    leakage_lpm REAL,
    excess_lpm REAL,
    leakage_kw REAL,
    trend_per_1000_h REAL,
    trend_low REAL,
    trend_high REAL,
    trend_established INTEGER NOT NULL,
    onset INTEGER,
    hours_low REAL,
    hours_mid REAL,
    hours_high REAL,
    hours_limit TEXT NOT NULL,
    step_ratio REAL,
    cause INTEGER NOT NULL,
    cause_weight REAL,
    running_h REAL,
    judged_h REAL,
    life_running_h REAL,
    life_judged_h REAL,
    learning_h_left REAL,
    share_judged_30d REAL,
    slip_coefficient REAL,
    zero_lpm REAL,
    PRIMARY KEY (track, date)
) STRICT, WITHOUT ROWID;

CREATE TABLE day_facts (
    pump INTEGER NOT NULL REFERENCES pump (id),
    section TEXT NOT NULL,
    date INTEGER NOT NULL,
    outlet_pressure_s REAL,
    shaft_speed_s REAL,
    case_drain_flow_s REAL,
    fluid_temperature_s REAL,
    delivery_flow_s REAL,
    inlet_pressure_s REAL,
    case_pressure_s REAL,
    stroke_s REAL,
    shaft_power_s REAL,
    drain_temperature_s REAL,
    running_s REAL,
    hour_meter_s REAL,
    particle_count_s REAL,
    filter_dp_s REAL,
    plateau_bar REAL,
    PRIMARY KEY (pump, section, date)
) STRICT, WITHOUT ROWID;

CREATE TABLE checkpoint (
    track INTEGER NOT NULL REFERENCES track (id),
    date INTEGER NOT NULL,
    state BLOB NOT NULL,
    PRIMARY KEY (track, date)
) STRICT;

CREATE TABLE alarm_change (
    id INTEGER PRIMARY KEY,
    track INTEGER NOT NULL REFERENCES track (id),
    at INTEGER NOT NULL,
    began INTEGER NOT NULL,
    life INTEGER NOT NULL,
    rule TEXT NOT NULL,
    edge INTEGER NOT NULL,
    level INTEGER NOT NULL,
    value REAL,
    "limit" REAL
) STRICT;
CREATE INDEX alarm_change_key ON alarm_change (track, at);

-- What people and the outside world are told, and tell ----------------------------------------------------------------

CREATE TABLE dated_event (
    id INTEGER PRIMARY KEY,
    pump TEXT NOT NULL,
    section TEXT NOT NULL,
    kind TEXT NOT NULL,
    at INTEGER NOT NULL,
    entered INTEGER NOT NULL,
    "by" TEXT NOT NULL,
    user TEXT NOT NULL,
    body TEXT NOT NULL
) STRICT;
CREATE INDEX dated_event_by_pump ON dated_event (pump, at);

CREATE TABLE notice (
    number INTEGER PRIMARY KEY,
    id TEXT NOT NULL UNIQUE,
    pump TEXT NOT NULL,
    section TEXT NOT NULL,
    episode TEXT NOT NULL,
    kind TEXT NOT NULL,
    level TEXT NOT NULL,
    at INTEGER NOT NULL,
    body TEXT NOT NULL
) STRICT;
CREATE INDEX notice_by_pump ON notice (pump);

CREATE TABLE outbox (
    id INTEGER PRIMARY KEY AUTOINCREMENT,
    target TEXT NOT NULL,
    notice INTEGER NOT NULL REFERENCES notice (number),
    state INTEGER NOT NULL DEFAULT 0,
    attempts INTEGER NOT NULL DEFAULT 0,
    next_try INTEGER,
    last_error TEXT NOT NULL DEFAULT ''
) STRICT;
CREATE INDEX outbox_open ON outbox (target, id) WHERE state <> 1;

-- Views for people with an SQL tool -----------------------------------------------------------------------------------

CREATE VIEW summary AS
SELECT p.name AS pump, t.section, t.basis, strftime('%Y-%m-%dT%H:%M:%SZ', s.start / 1000, 'unixepoch') AS start,
    s.length_ms / 60000.0 AS minutes, date(s.date * 86400, 'unixepoch') AS date, s.life, s.running_h, s.judged_h,
    CASE s.level WHEN 0 THEN 'unjudged' WHEN 1 THEN 'sound' WHEN 2 THEN 'watch' WHEN 3 THEN 'plan' ELSE 'act' END AS level,
    s.leakage_ratio, s.leakage_ratio_low, s.leakage_ratio_high, s.filtered_ratio, s.filtered_ratio_low,
    s.filtered_ratio_high, s.efficiency, s.efficiency_low, s.efficiency_high, s.leakage_lpm, s.excess_lpm, s.leakage_kw,
    s.drain_share, s.highest_temperature_c, s.highest_case_bar, s.lowest_inlet_bar, s.mean_pressure_bar,
    s.full_flow, s.compensating, s.stopped, s.below_minimum_speed, s.cold, s.thin, s.transient, s.part_stroke,
    s.relieving, s.motoring, s.variable_speed, s.no_pressure, s.no_speed, s.no_temperature, s.below_least_flow,
    s.impossible
FROM hour_summary s JOIN track t ON t.id = s.track JOIN pump p ON p.id = t.pump;

CREATE VIEW verdict AS
SELECT p.name AS pump, t.section, t.basis, date(d.date * 86400, 'unixepoch') AS date, d.finished, d.life,
    CASE d.level WHEN 0 THEN 'unjudged' WHEN 1 THEN 'sound' WHEN 2 THEN 'watch' WHEN 3 THEN 'plan' ELSE 'act' END AS level,
    d.leakage_ratio, d.leakage_ratio_low, d.leakage_ratio_high, d.efficiency, d.efficiency_low, d.efficiency_high,
    d.efficiency_baseline, d.clearance_growth_percent, d.leakage_lpm, d.excess_lpm, d.leakage_kw, d.trend_per_1000_h,
    d.hours_low, d.hours_mid, d.hours_high, d.hours_limit, d.step_ratio, d.running_h, d.judged_h, d.life_running_h,
    d.life_judged_h
FROM day d JOIN track t ON t.id = d.track JOIN pump p ON p.id = t.pump;

CREATE VIEW alarm AS
SELECT p.name AS pump, t.section, t.basis, a.rule, a.life,
    CASE a.edge WHEN 0 THEN 'raised' WHEN 1 THEN 'worsened' WHEN 2 THEN 'eased' ELSE 'returned' END AS change,
    CASE a.level WHEN 0 THEN 'unjudged' WHEN 1 THEN 'sound' WHEN 2 THEN 'watch' WHEN 3 THEN 'plan' ELSE 'act' END AS level,
    strftime('%Y-%m-%dT%H:%M:%SZ', a.at / 1000, 'unixepoch') AS at,
    strftime('%Y-%m-%dT%H:%M:%SZ', a.began / 1000, 'unixepoch') AS began, a.value, a."limit"
FROM alarm_change a JOIN track t ON t.id = a.track JOIN pump p ON p.id = t.pump;

CREATE VIEW event AS
SELECT id, pump, section, kind, strftime('%Y-%m-%dT%H:%M:%SZ', at / 1000, 'unixepoch') AS at,
    strftime('%Y-%m-%dT%H:%M:%SZ', entered / 1000, 'unixepoch') AS entered, "by", user, body
FROM dated_event;

CREATE VIEW refused_row AS
SELECT r.id, f.name AS feed, r.place, r.code, r.message, r.text,
    strftime('%Y-%m-%dT%H:%M:%SZ', r.received / 1000, 'unixepoch') AS received
FROM refused r JOIN feed f ON f.id = r.feed;
