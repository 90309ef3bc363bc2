import { describe, expect, it } from 'vitest';
import type { Fabric } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import type { Pins } from '@/lib/mapping/mapping';
import { buildInstance } from '@/lib/solver/instance';
import { presolve } from '@/lib/solver/presolve/presolve';
import { checkProblem } from '@/lib/solver/problem';
import { fabricSketch, kernelSketch, wall } from '../../helpers/sketches';

/** What presolve says without any search: its reason, or null where it leaves the problem open. */
function reasonOf(kernel: Kernel, fabric: Fabric, pins: Record<string, string> = {}) {
  const checked = checkProblem({ kernel, fabric, pins: pins as Pins, objective: 'wire' });
  if (!checked.ok) throw new Error(checked.error.messages.join('\n'));
  const presolved = presolve(checked.value, buildInstance(kernel, checked.value.graph, pins as Pins, 'wire'));
  return presolved.kind === 'open' ? null : presolved.explanation;
}

/** Three loads on the left, a store on the right of a wall between columns 2 and 3. */
const threeLoads = kernelSketch(
  'x=load y=load z=load s=add:x,y t=add:s,z u=subtract:s,z v=max:t,u out=store:v',
);
const left = { op_x: 'r0c0', op_y: 'r1c0', op_z: 'r2c0' };

describe('a cut with too few channels', () => {
  it('is named with its nets: x, y and z have to leave columns 0 to 2, through one channel', () => {
    const fabric = fabricSketch(['m..aam', 'm..aam', 'm..aam'], { removedLinks: wall(3, 2, [1]) });
    const reason = reasonOf(threeLoads, fabric, left);
    expect(reason).toMatchObject({
      code: 'too few channels',
      opIds: ['op_x', 'op_s', 'op_y', 'op_z', 'op_t', 'op_u'],
      tileIds: ['r1c2', 'r1c3'],
      edgeIds: ['edge_s_a', 'edge_s_b', 'edge_t_b', 'edge_u_b'],
    });
    expect(reason?.message).toBe(
      '3 nets have to lead out of columns 0 to 2 (from x, y, z), but the links there have 1 channel: add 2 channels there, on these links or new ones, or move pins or units to one side.',
    );
  });

  it('is none with three channels in the same place', () => {
    const fabric = fabricSketch(['m..aam', 'm..aam', 'm..aam'], {
      removedLinks: wall(3, 2, [1]),
      linkChannels: { 'r1c2>r1c3': 3 },
    });
    expect(reasonOf(threeLoads, fabric, left)).toBeNull();
  });

  it('is named the other way round where nets have to enter: t and u into the corner of the multipliers', () => {
    const kernel = kernelSketch('x=load y=load t=multiply:x,y u=multiply:y,x w=add:t,u out=store:w');
    const fabric = fabricSketch(['xxaa', 'xxmm', 'aamm'], {
      removedLinks: ['r1c2>r1c1', 'r2c0>r1c0', 'r2c1>r1c1'],
    });
    const reason = reasonOf(kernel, fabric);
    expect(reason).toMatchObject({ code: 'too few channels', tileIds: ['r0c1', 'r0c2'] });
    expect(reason?.message).toMatch(
      /^2 nets have to lead into rows 0 to 1, columns 0 to 1 \(from x, y\).* 1 channel:/,
    );
  });

  it('is found where it is no straight line: an L of four routers with one way out', () => {
    const fabric = fabricSketch(['m.aa', 'm.aa', 'aaaa', 'aaam'], {
      removedLinks: ['r0c1>r0c2', 'r1c1>r1c2', 'r1c0>r2c0'],
    });
    const kernel = kernelSketch('x=load y=load s=add:x,y out=store:s');
    const reason = reasonOf(kernel, fabric, { op_x: 'r0c0', op_y: 'r1c0' });
    expect(reason).toMatchObject({ code: 'too few channels', opIds: ['op_x', 'op_s', 'op_y'] });
    expect(reason?.message).toMatch(
      /^2 nets have to lead out of rows 0 to 1, columns 0 to 1 \(from x, y\).* 1 channel:/,
    );
  });

  it('counts a net once however many of its consumers are beyond: one channel does', () => {
    const kernel = kernelSketch('x=load s=add:x,1 t=add:x,2 u=add:s,t out=store:u');
    const fabric = fabricSketch(['m..aam', 'm..aam'], { removedLinks: wall(2, 2, [1]) });
    expect(reasonOf(kernel, fabric, { op_x: 'r0c0' })).toBeNull();
  });

  it('takes account of ops that fill a side: p and q are pinned to both of its PEs, so that t reads them from beyond', () => {
    const kernel = kernelSketch('x=load y=load p=add:x,1 q=add:y,1 t=add:p,q out=store:t');
    const fabric = fabricSketch(['aaaammm'], { channels: 2, linkChannels: { 'r0c1>r0c2': 1 } });
    const reason = reasonOf(kernel, fabric, { op_p: 'r0c0', op_q: 'r0c1' });
    expect(reason).toMatchObject({ code: 'too few channels', tileIds: ['r0c1', 'r0c2'] });
    expect(reason?.message).toMatch(
      /^2 nets have to lead out of columns 0 to 1 \(from p, q\).* 1 channel: add 1/,
    );
  });
});

describe('a cut that no division of the ops can do with', () => {
  // Every value is read by its two successors, so that any division of the chain cuts at least two nets.
  const braid = kernelSketch(
    'x=load a=add:x,1 b=add:x,a c=add:a,b d=add:b,c e=add:c,d f=add:d,e out=store:f',
  );

  it('is named: four PEs on each side of one channel each way for eight ops that hang together twice', () => {
    const fabric = fabricSketch(['ma.am', 'aa.aa'], { removedLinks: wall(2, 2, [0]) });
    const reason = reasonOf(braid, fabric);
    expect(reason).toMatchObject({ code: 'too few channels', tileIds: ['r0c2', 'r0c3'] });
    expect(reason?.message).toMatch(
      /^However the 8 ops are divided between columns 3 to 4, with PEs for 4 ops, and the rest of the fabric, with PEs for 4, more nets .* 1 channel out of columns 3 to 4 and 1 the other way, at least 1 too few/,
    );
    expect(reason?.opIds.length).toBeGreaterThan(0);
    expect(reason?.edgeIds.length).toBeGreaterThan(0);
  });

  it('is none with two channels, nor where one side has room for all', () => {
    const two = fabricSketch(['ma.am', 'aa.aa'], {
      removedLinks: wall(2, 2, [0]),
      linkChannels: { 'r0c3>r0c2': 2, 'r0c2>r0c3': 2 },
    });
    expect(reasonOf(braid, two)).toBeNull();
    const roomy = fabricSketch(['maa.am', 'maa.aa', 'aaa.aa'], { removedLinks: wall(3, 3, [0]) });
    expect(reasonOf(braid, roomy)).toBeNull();
  });

  it('is named where a value is carried back over a link of one direction', () => {
    // Ten PEs in two parts of five, joined from left to right only; the loop of nine ops does not fit on one side.
    const kernel = kernelSketch(
      'x=load a=add:x,@g b=add:a,1 c=add:b,1 d=add:c,1 e=add:d,1 f=add:e,1 g=add:f,1 out=store:g',
    );
    const fabric = fabricSketch(['maaam', 'aaaaa'], { removedLinks: [...wall(2, 2, [0]), 'r0c3>r0c2'] });
    const reason = reasonOf(kernel, fabric);
    expect(reason).toMatchObject({ code: 'too few channels' });
    expect(reason?.message).toMatch(/0 channels out of columns 3 to 4 and 1 the other way/);
  });
});

describe('an op that no tile can hold for want of links', () => {
  it('is named with its producers: two values for a corner with one incoming channel', () => {
    const kernel = kernelSketch('x=load y=load s=add:x,y out=store:s');
    const fabric = fabricSketch(['am', 'mm'], { removedLinks: ['r1c0>r0c0'] });
    const reason = reasonOf(kernel, fabric);
    expect(reason).toMatchObject({
      code: 'too few channels',
      opIds: ['op_s', 'op_x', 'op_y'],
      tileIds: ['r0c0'],
    });
    expect(reason?.message).toBe(
      's cannot stand on the only PE with a unit for it: it has at most 1 incoming channel for the values of 2 other ops. Add channels or links there, or units where there are more.',
    );
  });

  it('is named where it is pinned to a tile that no link leaves', () => {
    const kernel = kernelSketch('x=load s=add:x,1 out=store:s');
    const fabric = fabricSketch(['aam', 'maa'], { removedLinks: ['r0c0>r0c1', 'r0c0>r1c0'] });
    const reason = reasonOf(kernel, fabric, { op_s: 'r0c0' });
    expect(reason).toMatchObject({ code: 'out of reach', opIds: ['op_s', 'op_out'] });
  });

  it('is named with the neighbour whose tiles are too far, seen from what is left for that', () => {
    // y's pin leaves s the two tiles beside it; from there it is three hops to the store's column.
    const kernel = kernelSketch('y=load s=add:y,1 t=add:s,1 out=store:t');
    const fabric = fabricSketch(['maaaam'], { clock: { periodPs: 150, entryDelayPs: 0, hopDelayPs: 100 } });
    const reason = reasonOf(kernel, fabric, { op_y: 'r0c0', op_out: 'r0c5' });
    expect(reason).toMatchObject({ code: 'out of reach' });
    expect(reason?.message).toMatch(
      /cannot stand .* not within 1 hop of a PE for .* Lengthen the clock period/,
    );
  });
});
