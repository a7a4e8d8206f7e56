import { socialNetwork } from './networks';
import { spectrum, laplacianOperator } from '@/numerics';
import { mkdirSync, writeFileSync } from 'node:fs';
import { execFileSync } from 'node:child_process';
for (const [n,m,ks] of [[10000,50000,[1,8,32]],[100000,1000000,[1,8,32]]] as [number,number,number[]][]) {
  let t=performance.now(); const net=socialNetwork(n,m); console.log(n,'built',net.n,net.targets.length/2,(performance.now()-t).toFixed(0));
  const op=laplacianOperator(net,'normalised'); const x=new Float64Array(net.n).map((_,i)=>Math.sin(i)), y=new Float64Array(net.n); for(let r=0;r<10;r++) op.multiply(x,y); t=performance.now(); for(let r=0;r<30;r++) op.multiply(x,y); console.log('product ms',((performance.now()-t)/30).toFixed(2));
  const dir=`/tmp/eig-${n}`; mkdirSync(dir,{recursive:true}); writeFileSync(dir+'/offsets.bin',net.offsets); writeFileSync(dir+'/targets.bin',net.targets); writeFileSync(dir+'/weights.bin',net.weights);
  for (const k of ks) { t=performance.now(); const s=spectrum(net,{laplacian:'normalised',count:k+1}); const own=(performance.now()-t)/1000; const py=JSON.parse(execFileSync('python3',['tests/bench/arpack.py',dir,String(k),'1e-8','1']).toString()); console.log('k',k,'own',own.toFixed(2),'scipy',py.seconds.toFixed(2),'ratio',(own/py.seconds).toFixed(2),'values',s.values[1]!.toFixed(8),py.values[0].toFixed(8), s.values[k]!.toFixed(8),py.values[k-1].toFixed(8),'res',Math.max(...s.residuals).toExponential(1),py.residual.toExponential(1)); }
}
