/** Small models that the tests in the editor change. */

/** One mass on one spring: sqrt(400 kN/m / 100 kg) / 2π = 10.07 Hz (closed form). */
export const UNIT_FREQUENCY = Math.sqrt(400e3 / 100) / (2 * Math.PI);

export const UNIT = `thrum 1
title "Unit on a mount"

> source: weighbridge ticket KW-0007
let unit_mass = 100 kg
> source: test sheet KW-T-01
let mount = 400 N/mm

mass unit = unit_mass
spring feet between unit and ground = mount
damper oil between unit and ground = 400 N*s/m

ask modes

expect stiff = natural_frequency(1) >= 8 Hz
expect soft = natural_frequency(1) <= 9 Hz
`;

/** The same where everything holds. */
export const SOUND = UNIT.replace("<= 9 Hz", "<= 12 Hz");

/** With two cases, so that each expectation is three tests. */
export const CASES = `${UNIT}
case heavy
    unit_mass = 130 kg
case light
    unit_mass = 80 kg
`;
