import { it } from 'vitest';
import { nonNegativeLeastSquares as nn } from '../../../analysis/unmixing/non-negative.ts';
it('p',()=>{
  let seed=1; const r=()=>{seed=(seed*1664525+1013904223)>>>0; return seed/2**32};
  const bad:Record<string,number>={}; let worst=0, worstP=0, n=0;
  for (const eps of [0,1e-16,1e-15,1e-14,1e-13,1e-12,1e-10,1e-6,1e-3]) { worst=0;worstP=0;let fails=0; let t0=performance.now(); let nan=0, neg=0;
  for (let k=0;k<4000;k++){ const m=6+Math.floor(r()*10), s=2+Math.floor(r()*6);
    const cols:Float64Array[]=[]; for(let j=0;j<s;j++) cols.push(Float64Array.from({length:m},()=>r()*2-(k%2?0:1)));
    for(let j=0;j<3;j++){ const a=cols[Math.floor(r()*s)]!,b=cols[Math.floor(r()*s)]!,w=r()*2-0.5; cols.push(a.map((v,i)=>(v*w+b[i]!)*(1+eps*(r()-.5))))}
    const b= k%3===0? cols[0]!.map((v,i)=>v+cols[1]![i]!) : Float64Array.from({length:m},()=>r()*2-1);
    const S=nn(cols,b); const nb=Math.hypot(...b); if([...S.x].some(Number.isNaN))nan++; if(Math.min(...S.x)<0)neg++;
    cols.forEach((c,j)=>{ const w=S.dual[j]!/(Math.hypot(...c)*nb); worst=Math.max(worst,w); if(S.passive.includes(j))worstP=Math.max(worstP,Math.abs(w)); if(w>1e-9)fails++; });
  } console.log('eps',eps,'worst',worst.toExponential(1),worstP.toExponential(1),'fails',fails,'nan',nan,'neg',neg,(performance.now()-t0).toFixed(0)); }
});
