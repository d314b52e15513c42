import { test } from 'vitest';
import { readTable } from '../../src/readings/table.ts';
import { proposeColumns } from '../../src/readings/columns.ts';
import { recordsOf } from '../../src/readings/records.ts';
const texts = [
`Shot,Volts,Rest (mm),First swing (mm),Back swing (mm),Vacuum (%),Note
1,1500,12.0,15.5,8.6,95,
2,1500,12.0,15.0,,95,double flash
3,1480,12.5,,,95,no fire
`,
`Swing no.;Right (mm);Left (mm)\n1;31,6;-29,1\n2;26,9;-24,8\n`,
`Tap,Hammer drawn to (deg),Rebound (deg),First swing (mm)\n1,30,12,15.2\n2,35,13,16.0`,
`Tap,Hammer impulse (mN.s),First swing (mm)\n1,1.2,15\n2,1.3,16.2`,
`Weight (mg),Reading up (mm),Reading down (mm)\n10,12.1,12.2\n20,13.3,13.2`,
`1;1500;12,0;15,5;8,6\n2;1500;12,0;15,0;9,0\n3;1490;12,5;15,9;9,4`,
`Rest,First\n12,5,15,0\n12,0,15,5\n`,
`12,5,15,1\n12,3,15,7\n13,1,16,2`,
`# bench run\nBench, operator; A\nPressure: 20 Pa\n\nNr;Art;Ruhelage;Ausschlag;Rückschwung;Bemerkung\n;;mm;mm;mm;\n1;Schuss;12,0;15,5;8,6;hell\n2;Schlag;12,0;15,5;;\n`,
];
test('look', () => {
  const out: unknown[] = [];
  for (const t of texts) { const table = readTable(t); const p = proposeColumns(table);
   const r = recordsOf({id:'s1',name:'a.csv',columns:p,kindOfAll:null,edits:{},added:[]}, table);
   out.push(JSON.stringify({...table, rows: table.rows.length, problems: undefined}), table.problems.map(x=>JSON.stringify(x)), p.map(x=>`${x.role} ${x.unit} ${x.sure} ${JSON.stringify(x.because)}`), r.records.map(x=>`${x.id} ${x.kind} ${x.label} rest ${x.rest?.value} first ${x.firstSwing?.value} next ${x.nextSwings.map(y=>y?.value)} tap ${x.tapImpulse?.value} V ${x.voltage?.value} ${x.note} ${x.problems.map(y=>y.code)}`), r.problems.map(x=>JSON.stringify(x)));
  }
  process.stdout.write(JSON.stringify(out,null,1));
});
