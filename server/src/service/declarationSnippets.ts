/**
 * Declarations to be filled in, offered where a declaration may begin and nowhere else: an editor's own list of snippets knows of no
 * such place. `$1` and `${2:…}` are the places, in the order in which they are gone through.
 */
import { rules } from '../rules/index';

export interface DeclarationSnippet {
  /** What is typed to find it. */
  readonly prefix: string;
  readonly about: string;
  readonly body: string;
}

const lines = (...all: readonly string[]) => all.join('\n');

export const declarationSnippets: readonly DeclarationSnippet[] = [
  {
    prefix: 'board',
    about: 'The board: temperature, headroom, clearance',
    body: lines('board ${1:name} {', '  temperature ${2:25 degC}', '  headroom    ${3:6 dB}', '  combine     ${4|worst,rss|}', '  clearance   ${5:0.15 mm}', '}', '$0'),
  },
  {
    prefix: 'stackup',
    about: 'A board of four layers, two of them planes',
    body: lines('stackup {', '  mask    25 um er 3.4', '  copper  TOP     35 um', '  prepreg ${1:0.20 mm} er ${2:4.2}', '  plane   ${3:GND}     18 um', '  core    ${4:1.10 mm} er 4.4', '  plane   ${5:PWR}     18 um', '  prepreg ${1:0.20 mm} er ${2:4.2}', '  copper  BOTTOM  35 um', '  mask    25 um er 3.4', '}', '$0'),
  },
  {
    prefix: 'stackup-two',
    about: 'A board of two layers, one of them a plane',
    body: lines('stackup {', '  mask   25 um er 3.4', '  copper TOP    35 um', '  core   ${1:1.5 mm} er ${2:4.4}', '  plane  ${3:GND}    35 um', '}', '$0'),
  },
  {
    prefix: 'use',
    about: 'Takes what another file declares',
    body: lines('use "${1:common/layers.quiet}"', '$0'),
  },
  {
    prefix: 'family',
    about: 'Properties that several nets share',
    body: lines('family ${1:name} { swing ${2:3.3 V}; rise ${3:2 ns}; source ${4:33 ohm} }', '$0'),
  },
  {
    prefix: 'net',
    about: 'A net that is a source of noise',
    body: lines('net ${1:NAME} {', '  swing  ${2:3.3 V}', '  rise   ${3:2 ns}', '  source ${4:33 ohm}', '  load   ${5:10 kohm}, ${6:5 pF}', '}', '$0'),
  },
  {
    prefix: 'net-receiver',
    about: 'A net that tolerates so much noise',
    body: lines('net ${1:NAME} {', '  source    ${2:200 ohm}', '  load      ${3:1 Mohm}, ${4:8 pF}', '  tolerates ${5:2 mV} ${6|peak,rms|}', '  band      ${7:10 kHz} to ${8:4 MHz}', '}', '$0'),
  },
  {
    prefix: 'pair',
    about: 'Two nets that carry one signal as a difference',
    body: lines('pair ${1:NAME} {', '  plus      ${2:NAME_P}', '  minus     ${3:NAME_N}', '  across    ${4:100 ohm}', '  tolerates ${5:10 mV} ${6|peak,rms|}', '}', '$0'),
  },
  {
    prefix: 'run',
    about: 'Two conductors beside each other',
    body: lines('run ${1:name} on ${2:TOP} for ${3:20 mm} {', '  trace ${4:A} ${5:0.15 mm}', '  gap   ${6:0.20 mm}', '  trace ${7:B} ${8:0.15 mm}', '}', '$0'),
  },
  {
    prefix: 'run-guard',
    about: 'Two conductors with a stitched guard between them',
    body: lines('run ${1:name} on ${2:TOP} for ${3:20 mm} {', '  trace ${4:A}   ${5:0.15 mm}', '  gap   ${6:0.20 mm}', '  guard ${7:GND} ${8:0.25 mm} stitched ${9:4 mm}', '  gap   ${6:0.20 mm}', '  trace ${10:B}   ${11:0.15 mm}', '}', '$0'),
  },
  {
    prefix: 'run-layers',
    about: 'Conductors above each other',
    body: lines('run ${1:name} for ${2:20 mm} {', '  on ${3:TOP} {', '    trace ${4:A} ${5:0.15 mm}', '  }', '  on ${6:L3} {', '    shift ${7:0.10 mm}', '    trace ${8:B} ${9:0.15 mm}', '  }', '}', '$0'),
  },
  {
    prefix: 'loop',
    about: 'A closed path of current',
    body: lines('loop ${1:name} on ${2:TOP} {', '  carries   ${3:NET}', '  rectangle ${4:22 mm} by ${5:9 mm}', '  strip     ${6:1 mm}', '  over      ${7:GND}', '  area      at most ${8:120 mm2}', '}', '$0'),
  },
  {
    prefix: 'loop-receiver',
    about: 'A loop in which a voltage is induced',
    body: lines('loop ${1:name} on ${2:TOP} {', '  senses ${3:NET}', '  path   (${4:40 mm}, ${5:4 mm}) (${6:54 mm}, ${5:4 mm}) (${6:54 mm}, ${7:6 mm}) (${4:40 mm}, ${7:6 mm})', '  wire   ${8:0.3 mm}', '}', '$0'),
  },
  {
    prefix: 'return',
    about: 'Conductor that several currents share on their way back',
    body: lines('return ${1:name} {', '  strip   ${2:30 mm} by ${3:1.5 mm} on ${4:TOP}', '  carries ${5:NET}', '  refers  ${6:RECEIVER}', '}', '$0'),
  },
  {
    prefix: 'link',
    about: 'Coupling in a connector, a relay, a transformer',
    body: lines('link ${1:name} { between ${2:A} and ${3:B}; capacitance ${4:0.8 pF} }', '$0'),
  },
  {
    prefix: 'shield',
    about: 'A metal cover',
    body: lines('shield ${1:name} {', '  covers ${2:NET}', '  sheet  ${3|aluminium,copper,brass,tin,steel,nickel-silver|} ${4:0.5 mm}', '  slot   ${5:6 mm}', '  ${6|grounded,floating|}', '}', '$0'),
  },
  {
    prefix: 'ambient',
    about: 'A radio field that the board has to live in',
    body: lines('ambient ${1:name} { field ${2:10 V/m} from ${3:80 MHz} to ${4:1 GHz} modulated ${5:80 %} }', '$0'),
  },
  {
    prefix: 'waive',
    about: 'Keeps a finding, with a reason',
    body: lines(`waive \${1|${rules.filter(({ waivable }) => waivable).map(({ name }) => name).join(',')}|} on \${2:NAME} because "\${3:reason}"`, '$0'),
  },
];
