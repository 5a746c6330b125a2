// Values are kept to seven significant digits, so that the same reading written "181.20", 181.2 or 2628.08 psi twice is
// the same value, and a repeat is known as a repeat.
#pragma once

namespace slipledger::intake {

// The double nearest to `value` written with seven significant digits, as printf's "%.7g" rounds. Infinities and NaN come
// back unchanged; minus zero becomes zero.
double seven_digits(double value);

}  // namespace slipledger::intake
