/** What a new board begins with: short, whole, and over its budget, so that there is something to see and to mend. */
export const starterBoard = `stackup {
  copper  TOP     35 um
  prepreg 0.20 mm er 4.2
  plane   GND     18 um
}

net CLK { swing 3.3 V; rise 1 ns; source 40 ohm; load 1 Mohm, 5 pF }
net SENSE { source 1 kohm; load 1 Mohm, 20 pF; tolerates 10 mV peak }

run clock-past-sense on TOP for 30 mm {
  trace CLK   0.20 mm
  gap   0.20 mm
  trace SENSE 0.15 mm
}
`;
