-- Lives: what the baseline of a day rests on, what the part leaks when healthy, a replacement nobody told, and what a life
-- was told of its sisters when it began. Every table and column is told in schema/README.md.

ALTER TABLE day ADD COLUMN baseline INTEGER NOT NULL DEFAULT 0;
ALTER TABLE day ADD COLUMN healthy_laminar REAL;
ALTER TABLE day ADD COLUMN healthy_orifice REAL;
ALTER TABLE day ADD COLUMN healthy_speed REAL;
ALTER TABLE day ADD COLUMN healthy_sd REAL;
ALTER TABLE day ADD COLUMN replacement_at INTEGER;
ALTER TABLE day ADD COLUMN replacement_before REAL;
ALTER TABLE day ADD COLUMN replacement_after REAL;

CREATE TABLE life_prior (
    track INTEGER NOT NULL REFERENCES track (id),
    life INTEGER NOT NULL,
    date INTEGER NOT NULL,
    begins INTEGER NOT NULL,
    model TEXT NOT NULL,
    sisters TEXT NOT NULL,
    PRIMARY KEY (track, life)
) STRICT, WITHOUT ROWID;
CREATE INDEX life_prior_by_date ON life_prior (date);

-- Read with every span of readings; there are few of them among many events.
CREATE INDEX dated_event_settled ON dated_event (pump) WHERE kind = 'settled';
