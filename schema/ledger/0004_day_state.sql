-- What looking back on days needs of each: wear filter's x, v, u with their covariance as they stood at the day's end,
-- whether wear was let go that day; and the running hours a day by which hours become dates.
ALTER TABLE day ADD COLUMN duty_h_per_day REAL;
ALTER TABLE day ADD COLUMN wear REAL;
ALTER TABLE day ADD COLUMN drift REAL;
ALTER TABLE day ADD COLUMN disturbance REAL;
ALTER TABLE day ADD COLUMN wear_variance REAL;
ALTER TABLE day ADD COLUMN wear_drift_covariance REAL;
ALTER TABLE day ADD COLUMN drift_variance REAL;
ALTER TABLE day ADD COLUMN wear_disturbance_covariance REAL;
ALTER TABLE day ADD COLUMN drift_disturbance_covariance REAL;
ALTER TABLE day ADD COLUMN disturbance_variance REAL;
ALTER TABLE day ADD COLUMN wear_let_go INTEGER NOT NULL DEFAULT 0;
-- Weights of the wear laws dw/dt = rate w^k with k = -0.6, 0, 0.6 and 1.2, by the days alone.
ALTER TABLE day ADD COLUMN law_slowing REAL;
ALTER TABLE day ADD COLUMN law_straight REAL;
ALTER TABLE day ADD COLUMN law_speeding REAL;
ALTER TABLE day ADD COLUMN law_racing REAL;
