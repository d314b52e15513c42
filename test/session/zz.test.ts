import { it } from 'vitest';
import { writeFileSync } from 'node:fs';
import { reduce } from '../../src/reduction/reduce.ts';
import { readSheets } from '../../src/reduction/sheets.ts';
import { demoSession } from '../../src/session/demo.ts';
it('dump', () => {
  const s0=demoSession(); writeFileSync("/tmp/fs/demo.json", JSON.stringify(reduce(s0,"demo/20")));const lines=s0.sheets[0]!.text.trim().split("\n"); const rows=lines.slice(1);
  const text=[lines[0],...rows,...rows,...rows,...rows,...rows].join('\n');
  const s={...s0,sheets:[{...s0.sheets[0]!,text}]};
  const out:number[]=[]; const sh:number[]=[];
  for(let i=0;i<12;i++){ let t=performance.now(); reduce(s,'demo/20'); out.push(performance.now()-t); t=performance.now(); readSheets(s); sh.push(performance.now()-t);} 
  writeFileSync('/tmp/fs/t.json', JSON.stringify({out,sh}));
});
