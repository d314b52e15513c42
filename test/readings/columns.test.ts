/** What is proposed for each column, by header words in twelve languages, units, values and place; never without a reason. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { sentenceForProposal } from '../../src/problems/proposals.ts';
import { proposalProblems, proposeColumns } from '../../src/readings/columns.ts';
import { readTable } from '../../src/readings/table.ts';
import { drop, fixture, roles } from './fixture.ts';

const HAND_ROLES = ['label', 'rest', 'firstSwing', 'nextSwing', 'time', 'voltage', 'pressure', 'tapImpulse', 'note'];

// Words of the trade in each language: common practice, no source.
const HEADERS: Readonly<Record<string, string>> = {
  English: 'Shot no.|Rest (mm)|First swing (mm)|Back swing (mm)|Time|Charge voltage (V)|Pressure (Pa)|Hammer impulse (mN.s)|Remarks',
  German: 'Schuss Nr.|Ruhelage (mm)|Erster Ausschlag (mm)|Rückschwung (mm)|Uhrzeit|Ladespannung (V)|Druck (Pa)|Schlagimpuls (mN.s)|Bemerkung',
  French: 'Tir n°|Repos (mm)|Première élongation (mm)|Élongation retour (mm)|Heure|Tension de charge (V)|Pression (Pa)|Impulsion du marteau (mN.s)|Remarques',
  Spanish: 'Disparo n.º|Reposo (mm)|Primera oscilación (mm)|Oscilación de retorno (mm)|Hora|Tensión de carga (V)|Presión (Pa)|Impulso del martillo (mN.s)|Observaciones',
  Italian: 'Colpo n.|Riposo (mm)|Prima oscillazione (mm)|Oscillazione di ritorno (mm)|Ora|Tensione di carica (V)|Pressione (Pa)|Impulso del martello (mN.s)|Osservazioni',
  Portuguese: 'Tiro n.º|Repouso (mm)|Primeira oscilação (mm)|Oscilação de retorno (mm)|Hora|Tensão de carga (V)|Pressão (Pa)|Impulso do martelo (mN.s)|Observações',
  Dutch: 'Schot nr.|Rust (mm)|Eerste uitslag (mm)|Terugslag (mm)|Tijd|Laadspanning (V)|Druk (Pa)|Hamerimpuls (mN.s)|Opmerkingen',
  Polish: 'Strzał nr|Położenie spoczynkowe (mm)|Pierwsze wychylenie (mm)|Wychylenie powrotne (mm)|Godzina|Napięcie ładowania (V)|Ciśnienie (Pa)|Impuls młotka (mN.s)|Uwagi',
  Czech: 'Výstřel č.|Klidová poloha (mm)|První výchylka (mm)|Zpětná výchylka (mm)|Čas|Nabíjecí napětí (V)|Tlak (Pa)|Impuls kladívka (mN.s)|Poznámka',
  Russian: 'Выстрел №|Положение покоя (мм)|Первый размах (mm)|Второй размах (mm)|Время|Напряжение заряда (V)|Давление (Pa)|Импульс молотка (mN.s)|Примечание',
  Japanese: '番号|静止位置 (mm)|最大振れ (mm)|戻り振れ (mm)|時刻|充電電圧 (V)|圧力 (Pa)|打撃力積 (mN.s)|備考',
  Chinese: '编号|静止位置 (mm)|第一次摆动 (mm)|第二次摆动 (mm)|时间|充电电压 (V)|真空度 (Pa)|锤击冲量 (mN.s)|备注',
};

const ROWS = ['1\t12.0\t15.5\t8.6\t14:02\t1500\t0.02\t\tx', '2\t12.1\t15.0\t\t14:05\t1500\t0.02\t1.2\ty'];

describe('headers in twelve languages', () => {
  test.each(Object.entries(HEADERS))('%s', (_, header) => {
    const proposals = proposeColumns(readTable([header.replaceAll('|', '\t'), ...ROWS].join('\n')));
    expect(roles(proposals)).toEqual(HAND_ROLES);
    expect(proposals.every(({ because }) => because.code === 'header')).toBe(true);
  });

  test('capitals and accents make no difference', () => {
    const proposals = proposeColumns(readTable('SHOT\tRUHELAGE (MM)\tPREMIERE ELONGATION (mm)\n1\t12.0\t15.5\n'));
    expect(roles(proposals)).toEqual(['label', 'rest', 'firstSwing']);
  });
});

describe('hand tables', () => {
  test('shots of a bench book', () => {
    const { proposals } = drop(fixture('hand-table.csv'));
    expect(roles(proposals)).toEqual(['label', 'voltage', 'rest', 'firstSwing', 'nextSwing', 'pressure', 'note']);
    expect(proposals.map(({ unit }) => unit)).toEqual(['', 'V', 'mm', 'mm', 'mm', '%', '']);
  });

  test.each([
    ['semicolons-and-decimal-commas.csv', ['label', 'kind', 'time', 'voltage', 'rest', 'firstSwing', 'nextSwing', 'note']],
    ['tabs-from-a-spreadsheet.tsv', ['label', 'kind', 'time', 'voltage', 'rest', 'firstSwing', 'nextSwing', 'pressure', 'note']],
    ['units-row.csv', ['label', 'voltage', 'rest', 'firstSwing', 'nextSwing', 'pressure', 'note']],
    ['preamble.csv', ['label', 'rest', 'firstSwing', 'note']],
    ['taps-by-impulse.csv', ['label', 'tapImpulse', 'firstSwing']],
    ['taps-by-hammer-angle.csv', ['label', 'hammerIn', 'hammerRebound', 'firstSwing']],
    ['free-swing.csv', ['label', 'firstSwing', 'nextSwing']],
    ['period-timings.csv', ['swingsTime']],
    ['angles.csv', ['label', 'rest', 'firstSwing', 'nextSwing']],
    ['bench-in-japanese.csv', ['label', 'kind', 'time', 'voltage', 'rest', 'firstSwing', 'nextSwing', 'note']],
  ])('%s', (name, expected) => {
    expect(roles(drop(fixture(name)).proposals)).toEqual(expected);
  });

  test('readings in degrees are angles', () => {
    expect(drop(fixture('angles.csv')).proposals.slice(1).map(({ unit }) => unit)).toEqual(['°', '°', '°']);
  });

  test('units are taken from the cells where no header has one', () => {
    const { proposals } = drop(fixture('cells-with-units.csv'));
    expect(proposals[1]).toMatchObject({ role: 'rest', unit: 'mm', sure: true, because: { facts: { unitFrom: 'cells' } } });
  });

  test('a missing unit is that of the other readings, else millimetres, and is told', () => {
    expect(drop('Shot,Rest (cm),First swing\n1,1.2,1.55\n2,1.2,1.5\n').proposals[2]).toMatchObject({ unit: 'cm', sure: false, because: { facts: { unitFrom: 'others' } } });
    const bare = drop('Shot,Rest,First swing\n1,12.0,15.5\n2,12.0,15.0\n');
    expect(bare.proposals[2]).toMatchObject({ unit: 'mm', sure: false, because: { facts: { unitFrom: 'assumed' } } });
    expect(bare.problems.map(({ code }) => code)).toEqual(['column-unit-assumed', 'column-unit-assumed']);
  });

  test('a unit that is not known is told', () => {
    const { proposals, problems } = drop('Shot,Rest (div),First swing (div)\n1,12.0,15.5\n2,12.0,15.0\n');
    expect(proposals[1]?.because.facts).toMatchObject({ unknownUnit: 'div', unitFrom: 'assumed' });
    expect(problems[0]).toMatchObject({ code: 'column-unit-assumed', facts: { unknownUnit: 'div' } });
  });

  test('swings with numbers are in order', () => {
    expect(roles(drop('x0 (mm),x1 (mm),x2 (mm),x3 (mm)\n12.0,15.5,8.6,15.2\n').proposals)).toEqual(['rest', 'firstSwing', 'nextSwing', 'nextSwing']);
    expect(roles(drop('Nr;Ruhe (mm);1. Ausschlag (mm);2. Ausschlag (mm)\n1;12,0;15,5;8,6\n').proposals)).toEqual(['label', 'rest', 'firstSwing', 'nextSwing']);
  });

  test('a rest taken after the shot is not the rest', () => {
    expect(roles(drop('Shot,Zero before (mm),Peak (mm),Zero after (mm)\n1,12.0,15.5,12.1\n').proposals)).toEqual(['label', 'rest', 'firstSwing', 'restAfter']);
  });

  test('a computed impulse bit is no tap impulse', () => {
    expect(roles(drop('Shot,Rest (mm),First swing (mm),Impulse bit (uN.s)\n1,12.0,15.5,3.1\n').proposals)).toEqual(['label', 'rest', 'firstSwing', 'ignored']);
  });

  test('two columns that claim one role: the better named has it', () => {
    const { proposals } = drop('Shot,Swing (mm),First swing (mm),Rest (mm),Zero reading at the start (mm)\n1,8.6,15.5,12.0,12.0\n2,8.7,15.2,12.0,12.0\n');
    expect(roles(proposals)).toEqual(['label', 'ignored', 'firstSwing', 'rest', 'ignored']);
    expect(proposals[4]?.because).toMatchObject({ code: 'position', facts: { taken: 'Rest (mm)' } });
  });
});

describe('values, where headers say nothing', () => {
  test('a table without a header', () => {
    const { proposals, problems } = drop(fixture('no-header.csv'));
    expect(roles(proposals)).toEqual(['label', 'voltage', 'rest', 'firstSwing', 'nextSwing']);
    expect(proposals.some(({ sure }) => sure)).toBe(false);
    expect(problems.map(({ code }) => code)).toEqual(Array(5).fill('column-proposed-by-values'));
  });

  test('a header in no known language', () => {
    const { proposals } = drop(fixture('unknown-language.csv'));
    expect(roles(proposals)).toEqual(['label', 'time', 'voltage', 'rest', 'firstSwing', 'note']);
  });

  test('kinds of record are known by their words', () => {
    const { proposals } = drop('Q\tW\tE\tR\n1\tSchuss\t12.0\t15.5\n2\tSchlag\t12.0\t16.0\n3\tSchuss\t12.1\t15.4\n');
    expect(roles(proposals)).toEqual(['label', 'kind', 'rest', 'firstSwing']);
  });

  test('units tell voltage, pressure and tap impulse', () => {
    const { proposals } = drop('A (kV)\tB (mbar)\tC (mN s)\tD (mm)\tE (mm)\n1.5\t0.1\t\t12.0\t15.5\n1.5\t0.1\t1.2\t12.0\t15.9\n');
    expect(roles(proposals)).toEqual(['voltage', 'pressure', 'tapImpulse', 'rest', 'firstSwing']);
  });

  test('the swing with the larger wander is not the rest, whichever stands first', () => {
    const rows = ['15.5\t12.0', '14.1\t12.0', '18.2\t12.1', '16.7\t12.1'];
    expect(roles(drop(['Q\tW', ...rows].join('\n')).proposals)).toEqual(['firstSwing', 'rest']);
  });

  test('one row tells by its order', () => {
    expect(roles(drop('12.0\t15.5\t8.6\n').proposals).slice(0, 2)).toEqual(['rest', 'firstSwing']);
  });

  test('text is a note, blanks are left aside', () => {
    expect(roles(drop('Rest (mm)\tFirst (mm)\tQ\tW\n12.0\t15.5\t\tpale flash, then nothing\n12.0\t15.2\t\tpale flash, then nothing\n').proposals)).toEqual(['rest', 'firstSwing', 'ignored', 'note']);
  });

  test('one word among numbers does not make a column text', () => {
    expect(roles(drop('Shot,Rest (mm),First swing (mm)\n1,12.0,15.5\n2,12.0,gone\n3,12.0,15.1\n').proposals)[2]).toBe('firstSwing');
  });
});

describe('reasons', () => {
  test('meanings of an earlier version are kept', () => {
    const table = readTable(fixture('no-header.csv'));
    const known = proposeColumns(table).map(({ unit }, i) => ({ role: i === 2 ? ('ignored' as const) : ('note' as const), unit, by: 'person' as const }));
    const again = proposeColumns(table, known);
    expect(roles(again)).toEqual(['note', 'note', 'ignored', 'note', 'note']);
    expect(again.every(({ because, by }) => because.code === 'kept' && by === 'person')).toBe(true);
    expect(proposalProblems(table, known, {})).toEqual([]);
  });

  test('a person’s choice is not asked about again', () => {
    const table = readTable('Shot,Rest,First\n1,12.0,15.5\n');
    const [label, rest, first] = proposeColumns(table);
    if (label === undefined || rest === undefined || first === undefined) throw new Error('three columns expected');
    const problems = proposalProblems(table, [label, rest, { ...first, by: 'person' }], { sheet: 's1' });
    expect(problems.map(({ place }) => place.column)).toEqual(['Rest']);
  });

  test('every column of any table has a role, a reason and a sentence that names neither nothing', () => {
    const cell = fc.constantFrom('', '1', '2', '12.0', '15.5', '8.6', '1500', '14:02', 'shot', 'tap', 'fine', '1.2 mm', '3 V');
    const header = fc.constantFrom('', 'Rest', 'First (mm)', 'Swing', 'Kind', 'Shot', 'Vacuum (%)', 'Q', 'U (kV)', 'Zeit', 'Note', 'Hammer (N)');
    const table = fc.integer({ min: 1, max: 6 }).chain((n) => fc.tuple(fc.array(header, { minLength: n, maxLength: n }), fc.array(fc.array(cell, { minLength: n, maxLength: n }), { maxLength: 6 })));
    fc.assert(fc.property(table, ([head, rows]) => {
      const read = readTable([head, ...rows].map((row) => row.join('\t')).join('\n'));
      const proposals = proposeColumns(read);
      expect(proposals).toHaveLength(read.headers.length);
      for (const proposal of proposals) expect(sentenceForProposal(proposal)).toMatch(/^[A-Z].*[a-z%”].*\.$/);
      for (const role of ['kind', 'label', 'rest', 'firstSwing', 'time', 'voltage', 'pressure', 'tapImpulse']) {
        expect(roles(proposals).filter((one) => one === role).length).toBeLessThan(2);
      }
      expect(sentenceText(proposals)).not.toMatch(/undefined|NaN|\[object/);
    }), { numRuns: 300 });
  });
});

const sentenceText = (proposals: readonly Parameters<typeof sentenceForProposal>[0][]): string => proposals.map(sentenceForProposal).join(' ');
