import { sampledFiles } from '../../../test/bench/sampledFiles.ts';
const cs=sampledFiles.cases; const times:number[][]=cs.map(()=>[]);
for (let r=-2;r<7;r++) cs.forEach((_,k)=>{const i=(k+r+2)%cs.length; const s=performance.now(); cs[i]!.run(); const t=performance.now()-s; if(r>=0) times[i]!.push(t);});
const med=times.map(a=>a.sort((x,y)=>x-y)[a.length>>1]!); cs.forEach((c,i)=>console.log(c.name.padEnd(50), med[i]!.toFixed(0), (med[i]!/med[0]!).toFixed(2)));
