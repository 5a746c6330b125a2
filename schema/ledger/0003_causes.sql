-- Likely causes, ranked with their evidence, and what the instruments showed while a pump ran.

ALTER TABLE day ADD COLUMN causes TEXT NOT NULL DEFAULT '[]';

ALTER TABLE hour_summary ADD COLUMN mean_flow_lpm REAL;
ALTER TABLE hour_summary ADD COLUMN mean_speed_rpm REAL;
ALTER TABLE hour_summary ADD COLUMN mean_temperature_c REAL;
ALTER TABLE hour_summary ADD COLUMN lowest_flow_lpm REAL;
ALTER TABLE hour_summary ADD COLUMN highest_flow_lpm REAL;
ALTER TABLE hour_summary ADD COLUMN lowest_pressure_bar REAL;
ALTER TABLE hour_summary ADD COLUMN highest_pressure_bar REAL;
ALTER TABLE hour_summary ADD COLUMN lowest_speed_rpm REAL;
ALTER TABLE hour_summary ADD COLUMN highest_speed_rpm REAL;
ALTER TABLE hour_summary ADD COLUMN lowest_running_c REAL;
ALTER TABLE hour_summary ADD COLUMN highest_running_c REAL;

CREATE VIEW likely_cause AS
SELECT p.name AS pump, t.section, t.basis, date(d.date * 86400, 'unixepoch') AS date, d.finished,
    c.key + 1 AS place, json_extract(c.value, '$.cause') AS cause, json_extract(c.value, '$.weight') AS weight,
    json_extract(c.value, '$.for') AS in_favour, json_extract(c.value, '$.against') AS against
FROM day d JOIN track t ON t.id = d.track JOIN pump p ON p.id = t.pump JOIN json_each(d.causes) c;
