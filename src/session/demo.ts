/** The demo: an invented bench and an invented run, made with a known impulse bit so that a test can ask for it back. */
import { emptySession, entry, type Part, type Session } from './session.ts';

/**
 * Truth that the demo's readings were made with (fourth-order integration apart from this project's own, ruler to
 * 0.5 mm, eye 0.15 mm): mean impulse bit of the 22 ordinary shots, N·s.
 */
export const DEMO_TRUTH = { meanImpulseBit: 1.274672553e-3, ordinaryShots: 22 } as const;

const TEXT = `No;Kind;Time;Charge (V);Rest (mm);First swing (mm);Back swing (mm);Third swing (mm);Hammer (mN·s);Pressure (Pa);Note
T1;tap;10:03:19;;118.0;126.5;110.0;126.0;0.800;2.1e-3;calibration mass on
T2;tap;10:04:31;;118.0;130.5;106.0;129.5;1.200;2.1e-3;
T3;tap;10:06:19;;118.0;134.0;102.5;133.0;1.600;2.1e-3;
T4;tap;10:07:58;;118.0;138.0;98.5;136.5;2.000;2.1e-3;
T5;tap;10:09:27;;118.0;142.5;94.0;141.0;2.400;2.1e-3;
T6;tap;10:10:44;;118.0;134.5;103.0;133.0;1.600;2.1e-3;
;zero;10:11:24;;118.0;;;;;2.1e-3;
1;shot;10:13:06;1499;118.0;135.5;101.0;134.0;;2.1e-3;mass taken off, first of the day
2;shot;10:14:53;1504;118.0;136.0;101.0;134.5;;2.1e-3;
3;shot;10:16:36;1497;118.0;136.0;100.5;135.0;;2.1e-3;
4;shot;10:18:07;1499;118.0;136.0;101.0;134.5;;2.1e-3;
5;shot;10:19:45;1499;118.5;137.0;100.0;135.5;;2.1e-3;
6;shot;10:20:59;1502;118.0;135.5;101.5;134.5;;2.1e-3;
7;shot;10:22:30;1503;118.0;135.5;101.5;134.0;;2.1e-3;
8;shot;10:24:11;1504;118.0;136.5;100.5;135.0;;2.1e-3;
9;shot;10:25:23;1499;118.0;118.5;118.0;118.5;;2.1e-3;no discharge seen
10;shot;10:26:53;1504;118.0;136.5;100.5;135.5;;2.1e-3;
11;shot;10:28:04;1500;118.0;135.0;101.5;134.0;;2.1e-3;
12;shot;10:29:19;1496;118.0;136.0;101.0;135.0;;2.1e-3;
;zero;10:29:59;;118.5;;;;;2.1e-3;
13;shot;10:31:33;1500;118.0;136.5;100.5;135.0;;2.1e-3;
14;shot;10:33:22;1502;118.0;136.0;101.0;134.5;;2.1e-3;
15;shot;10:34:39;1503;118.0;135.5;101.0;135.0;;2.1e-3;
16;shot;10:36:13;1503;118.5;153.0;85.0;150.5;;2.1e-3;double flash
17;shot;10:37:52;1497;118.0;137.0;100.0;135.5;;2.1e-3;
18;shot;10:39:22;1504;118.0;136.0;100.5;135.0;;2.1e-3;
19;shot;10:40:44;1496;118.0;136.0;101.5;135.0;;2.1e-3;
20;shot;10:42:13;1498;118.0;137.0;100.5;135.5;;2.1e-3;
21;shot;10:43:51;1500;118.0;137.0;100.5;135.5;;2.1e-3;
22;shot;10:45:16;1501;118.0;137.0;100.0;135.5;;2.1e-3;
23;shot;10:46:34;1496;118.0;136.5;100.5;135.5;;2.1e-3;
24;shot;10:47:49;1499;118.0;136.0;101.0;134.5;;2.1e-3;
B1;blank;10:49:15;1500;118.0;118.0;;;;2.1e-3;plume blocked
B2;blank;10:50:50;1500;118.0;118.0;;;;2.1e-3;plume blocked
T7;tap;10:52:28;;118.0;128.5;108.0;128.0;1.000;2.1e-3;calibration mass on again
T8;tap;10:54:03;;118.0;132.5;104.5;132.0;1.400;2.1e-3;
T9;tap;10:55:33;;118.0;136.5;101.0;135.5;1.800;2.1e-3;
T10;tap;10:57:15;;118.5;140.0;96.5;139.5;2.200;2.1e-3;
`;

const part = (id: string, name: string, mass: string, distance: string, ownInertia: string): Part => ({
  id, name, entries: { mass: entry(mass), distance: entry(distance), ...(ownInertia === '' ? {} : { ownInertia: entry(ownInertia) }) },
});

export function demoSession(): Session {
  const base = emptySession();
  return {
    ...base,
    demo: true,
    title: { name: 'Demo: an invented bench', place: 'invented', date: '2026-11-12', remark: 'Invented readings of an invented pulsed plasma thruster, plume caught on a plate. Not a measurement.' },
    entries: {
      leverArm: entry('380 ± 2 mm', 'limits'),
      readingRadius: entry('402.0 ± 0.5 mm', 'limits'),
      division: entry('0.5 mm'),
      readingSpread: entry('0.15 mm'),
      scaleFactor: entry('1.000 ± 0.001', 'limits'),
      gravity: entry('9.8094(2) m/s²'),
      period: entry('1.120(2) s'),
      periodAmplitude: entry('3°'),
      periodCycles: entry('10'),
      calibrationMass: entry('5.00(1) g'),
      calibrationMassDistance: entry('300.0 ± 0.5 mm', 'limits'),
      calibrationMassInertia: entry('40 g·mm²'),
      tapLeverArm: entry('330 ± 1 mm', 'limits'),
      hammerFactor: entry('1 ± 2 %', 'expanded', '2'),
      tapSpread: entry('1 %'),
    },
    parts: [
      part('strip', 'Strip', '18.4(1) g', '200.0 ± 0.5 mm', '245300 ± 700 g·mm²'),
      part('plate', 'Target plate', '6.2(1) g', '380.0 ± 0.5 mm', ''),
    ],
    choices: { ...base.choices, form: 'bodyOfParts', route: 'massesAndPeriod', calibrationMassHung: 'taps', calibration: 'taps' },
    sheets: [{
      id: 'demo', name: 'invented-run.csv', origin: 'file', text: TEXT, sha256: '',
      columns: [
        { role: 'label', unit: '', by: 'person' }, { role: 'kind', unit: '', by: 'person' }, { role: 'time', unit: 's', by: 'person' },
        { role: 'voltage', unit: 'V', by: 'person' }, { role: 'rest', unit: 'mm', by: 'person' }, { role: 'firstSwing', unit: 'mm', by: 'person' },
        { role: 'nextSwing', unit: 'mm', by: 'person' }, { role: 'nextSwing', unit: 'mm', by: 'person' }, { role: 'tapImpulse', unit: 'mN·s', by: 'person' },
        { role: 'pressure', unit: 'Pa', by: 'person' }, { role: 'note', unit: '', by: 'person' },
      ],
      kindOfAll: null, edits: {}, added: [],
    }],
    marks: {
      'demo/17': { setAside: { reason: 'misfire: no discharge' } },
      'demo/25': { setAside: { reason: 'double discharge' } },
    },
  };
}
