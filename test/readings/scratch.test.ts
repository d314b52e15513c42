import { test } from 'vitest';
import { cutRows } from '../../src/readings/cut.ts';
import { findHeader } from '../../src/readings/header.ts';
import { fixture } from './fixture.ts';
test('x', () => { const r = cutRows(fixture('sensor-trace.csv'), ',').rows.filter(x=>x.cells.join('')!==''); process.stdout.write(JSON.stringify([r, findHeader(r, [])], null, 0)); });
