/** A board with every statement of the language, for tests that go through all of them. */
export const everything = `quietrun 1
board valve {
  temperature 55 degC
  headroom 6 dB
  combine rss
  clearance 0.15 mm
  emits at most 40 dBuV/m at 3 m from 30 MHz to 88 MHz
  waive outside-model because "as measured"
}
stackup {
  mask 25 um er 3.4 flat
  copper TOP 35 um undercut 8 um
  prepreg 0.20 mm ± 10 % er 4.2 loss 0.018
  plane GND1 18 um
  core 1.10 mm er 4.4
  plane PWR 18 um
  dielectric 0.20 mm er 4.2 +- 0.2
  copper BOTTOM 1 oz
}
stackup flex {
  copper F1 18 um
  dielectric 50 um er 3.2
  plane FG 18 um
}
family gate-drive { swing 12 V; rise 15 ns; source 4R7; repeats 100 kHz }
family slow is gate-drive
net VALVE is slow {
  swing 0 V to 24 V
  rise 40 ns
  fall 50 ns
  load 10 kohm, 470 pF
  repeats 20 kHz duty 30 %
  current 1.8 A rise 60 ns
  switches with GATES
  working 48 V dc
}
net MAINS { sine 230 V rms at 50 Hz to 60 Hz; source 0.5 ohm; load 100 ohm; once; swing 1 V; rise 1 us }
net RX {
  source 200 ohm
  load 1 Mohm, 8 pF
  tolerates 2 mV peak
  tolerates 1 mV rms
  band 10 kHz to 4 MHz
  noise 5 nV/rtHz, 2 pA/rtHz corner 2 kHz
  contact -20 dB at 5 V
  samples 2 us after GATES
  length 60 mm
  both ways
}
net RX_N is lvcmos33 { tolerates none }
net D[0..7] is lvcmos18 { rise 1 ns }
pair AIN is lvds {
  plus RX
  minus RX_N
  across 100 ohm, 2 pF
  common tolerates 0.5 V peak
  rejects 80 dB
}
run valve-past-rx on TOP for 38 mm {
  trace VALVE 0.25 mm
  gap 0.30 mm
  trace RX 0.15 mm after 12 mm
  waive over-budget because "measured"
}
run alley for 22 mm {
  on TOP {
    trace RX 0.20 mm
    gap 0.40 mm
    guard GND 0.25 mm stitched 4 mm
    gap 0.40 mm
    trace RX_N 0.15 mm reversed
  }
  on BOTTOM {
    shift 0.10 mm
    trace D[0..7] 0.10 mm spaced 0.12 mm
    gap 0.3 mm
    return RTN 2 mm
  }
  without GND1
}
loop switch on TOP {
  carries VALVE 1.8 A rise 40 ns
  rectangle 22 mm by 9 mm at (10 mm, 4 mm)
  strip 1 mm
  over GND1
  area at most 120 mm2
  inductance at most 25 nH
  turned 90 deg about x
}
loop input on TOP { senses RX; path (40 mm, 4 mm) (54 mm, 4 mm), (54 mm, 5.5 mm, 1 mm); wire 0.3 mm }
loop coil { carries MAINS 1 A rms at 50 Hz; circle 9 mm at (1 mm, 1 mm) }
loop probe on TOP { senses AIN; trace 20 mm above GND1 at (0 mm, 3 mm) }
return ground {
  strip 30 mm by 1.5 mm on TOP
  over GND1
  via 3 drill 0.3 mm length 1.6 mm
  measured 2 mohm, 1.2 nH
  carries VALVE
  carries D[0..3]
  refers RX
}
link relay { between MAINS and RX; capacitance 0.8 pF; mutual 3 nH }
shield lid {
  covers RX
  covers AIN
  covers input
  sheet aluminium 0.5 mm
  slot 6 mm
  grounded
}
ambient radio { field 10 V/m from 80 MHz to 1 GHz modulated 80 % }
waive over-budget on RX because "0.9 mV measured on revision B"
`;
