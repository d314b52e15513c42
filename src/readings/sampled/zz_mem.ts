import { createSampledReader } from './sampledRecord.ts';
import { timelineOf, timeUnitNamed } from './timeline.ts';
import { proposeUses } from './sampledUses.ts';
import { readFileSync } from 'node:fs';
const hwm=()=>Number(/VmHWM:\s+(\d+)/.exec(readFileSync('/proc/self/status','utf8'))![1])/1024;
const rss=()=>Number(/VmRSS:\s+(\d+)/.exec(readFileSync('/proc/self/status','utf8'))![1])/1024;
const ROWS=10_000_000, CH=50_000;
const know = process.argv[2] !== 'unknown';
// chunks are made as they go, one buffer
const enc=new TextEncoder();
function chunk(k:number){let s=k===0?'time (s),displacement (mm)\n':''; for(let i=k*CH;i<(k+1)*CH;i++) s+=`${(i/1000).toFixed(4)},${(12.5+8*Math.sin(i/170)).toFixed(6)}\n`; return enc.encode(s);}
let bytes=0; for (let k=0;k<ROWS/CH;k+=20) bytes+=20*chunk(k).length;
(globalThis as any).gc?.(); const base=rss(); console.log('base',base|0,'hwm',hwm()|0,'bytes',bytes);
const reader=createSampledReader({bytes: know?bytes:0});
let t=0; for (let k=0;k<ROWS/CH;k++){const c=chunk(k); const s=performance.now(); reader.take(c); t+=performance.now()-s;}
const s=performance.now(); const r=reader.finish(); console.log('finish',(performance.now()-s)|0);
console.log('rows',r.rows,'ms',t|0,'hwm',hwm()|0,'hwm-base',(hwm()-base)|0,'two arrays MB',(ROWS*16/1048576)|0);
const s2=performance.now(); const u=proposeUses(r); const s3=performance.now(); const l=timelineOf(r,{by:'time',column:0,unit:timeUnitNamed('s')!},[1]); console.log('uses',(s3-s2)|0,u.uses,'timeline',(performance.now()-s3)|0,l.problems,'hwm-base',(hwm()-base)|0);
