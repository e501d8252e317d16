import { type AwkwardTable, lines, na } from './awkward-table.fixture'

/** Tables awkward by their build; all invented. */
export const awkwardBuilds: Record<string, AwkwardTable[]> = {
  bases: [
    {
      name: 'in heads',
      text: lines('Sample,Ash (% dry),S (wt% a.r.),C (wt% daf)', 'A,5,0.5,70'),
      table: { A: { Ash: 'value 5 % dry', S: 'value 0.5 wt% as-received', C: 'value 70 wt% dry-ash-free' } },
    },
    {
      name: 'in a row',
      text: lines('Sample,Ash,S', ',wt%,wt%', 'Basis,d.b.,as received', 'A,5,0.5'),
      table: { A: { Ash: 'value 5 wt% dry', S: 'value 0.5 wt% as-received' } },
    },
    {
      name: 'in a title',
      text: lines('All results on dry basis', 'Sample,Ash (wt%)', 'A,5', 'B,6'),
      table: { A: { Ash: 'value 5 wt% dry' }, B: { Ash: 'value 6 wt% dry' } },
    },
    {
      name: 'another, as its text',
      text: lines('Sample,Analyte,Result,Unit,Basis', 'A,Ash,5,wt%,air-dried', 'B,Ash,6,wt%,wet'),
      table: { A: { Ash: 'value 5 wt% air-dried' }, B: { Ash: 'value 6 wt% as-received' } },
    },
  ],
  'bases asked': [
    {
      name: 'a moisture in %',
      text: lines('Sample,Moisture (%),NaCl (wt%)', 'A,10,20'),
      also: { questions: [{ code: 'basis', where: ['Moisture'], options: ['as-received', 'dry'] }] },
    },
    {
      name: 'both bases and a column of neither',
      text: lines('Sample,Ash (wt% dry),S (wt% ar),N (wt%),pH', 'A,5,0.5,1,7'),
      also: { questions: [{ code: 'basis', where: ['N'] }] },
    },
    {
      name: 'a moisture that says which',
      text: lines('Sample,"Moisture (%, wet basis)"', 'A,10', 'B,11'),
      table: { A: { Moisture: 'value 10 % as-received' }, B: { Moisture: 'value 11 % as-received' } },
      also: { questions: [] },
    },
  ],
  'samples across': [
    {
      name: 'with a column of units',
      text: lines(
        'Component,Unit,24-1,24-2',
        'Stream,,101,102',
        'Date,,2026-03-14,2026-03-15',
        'NaCl,wt%,23.1,n.d.',
        'H2O,wt%,bal.,96.5',
      ),
      table: {
        '24-1': { NaCl: 'value 23.1 wt%', H2O: 'difference wt%' },
        '24-2': { NaCl: 'notDetected wt%', H2O: 'value 96.5 wt%' },
      },
      also: { shape: 'transposed', samples: [{ stream: '101', takenAt: '2026-03-14' }, { stream: '102' }] },
    },
    {
      name: 'numbers for ids under a blank corner',
      text: lines(';101;104', 'NaCl (Gew.-%);1,2;3,4', 'KCl (Gew.-%);1;2'),
      table: {
        101: { NaCl: 'value 1.2 Gew.-%', KCl: 'value 1 Gew.-%' },
        104: { NaCl: 'value 3.4 Gew.-%', KCl: 'value 2 Gew.-%' },
      },
      also: { shape: 'transposed' },
    },
    {
      name: 'stream above the sample',
      text: lines('Stream,101,102', 'Sample,24-1,24-2', 'Na (mg/L),1.5,2.5', 'Mean,1,2'),
      table: { '24-1': na('1.5'), '24-2': na('2.5') },
      also: { samples: [{ stream: '101' }, { stream: '102' }], totals: [{ label: 'Mean' }] },
    },
  ],
  'a result a row': [
    {
      name: 'German, semicolons',
      text: lines(
        'Probe;Strom;Parameter;Ergebnis;Einheit;Bezug;Methode;Bemerkung',
        'P-1;101;Wassergehalt;12,5;%;OS;DIN;',
        'P-1;101;Asche;5,1;%;TS;DIN;unsicher',
      ),
      table: { 'P-1': { Wassergehalt: 'value 12.5 % as-received', Asche: 'value 5.1 % dry' } },
      also: { shape: 'long', questions: [], samples: [{ stream: '101', method: 'DIN', note: 'unsicher' }] },
    },
    {
      name: 'one sample named above',
      text: lines(
        'Sample:,24-0311',
        'Stream:,101',
        'Sampled:,2026-03-14 06:00',
        '',
        'Parameter,Result,Unit',
        'NaCl,23.1,wt%',
        'KCl,<0.1,wt%',
      ),
      table: { '24-0311': { NaCl: 'value 23.1 wt%', KCl: 'below 0.1 wt%' } },
      also: { shape: 'long', samples: [{ stream: '101', takenAt: '2026-03-14T06:00' }] },
    },
    {
      name: 'sample said once',
      text: lines('sample_id,analyte,result,unit', 'A,Na,1,mg/L', ',K,2,mg/L', 'B,Na,3,mg/L'),
      table: { A: { Na: 'value 1 mg/L', K: 'value 2 mg/L' }, B: na('3') },
    },
  ],
  totals: [
    {
      name: 'rows',
      text: lines(
        'Sample,NaCl (wt%)',
        'A,60',
        'B,61',
        'Mean (n=2),60.5',
        'Std dev,0.7',
        'Min,60',
        'Max,61',
        'LOD,0.01',
      ),
      table: { A: { NaCl: 'value 60 wt%' }, B: { NaCl: 'value 61 wt%' } },
      also: {
        totals: ['Mean (n=2)', 'Std dev', 'Min', 'Max', 'LOD'].map((label) => ({
          label,
          results: [{ analyte: 'NaCl' }],
        })),
      },
    },
    {
      name: 'columns',
      text: lines('Probe;NaCl (Gew.-%);KCl (Gew.-%);Summe', 'A;60;40;100', 'Mittelwert;60;40;100'),
      table: { A: { NaCl: 'value 60 Gew.-%', KCl: 'value 40 Gew.-%' } },
      also: {
        questions: [],
        totals: [{ label: 'Mittelwert' }, { label: 'Summe', results: [{ sample: 'A', value: 100 }] }],
      },
    },
    {
      name: 'but not Total P, N and S',
      text: lines('Sample,Total P (mg/L),N (mg/L),S (mg/L)', 'A,1,2,3'),
      table: { A: { 'Total P': 'value 1 mg/L', N: 'value 2 mg/L', S: 'value 3 mg/L' } },
      also: { totals: [] },
    },
  ],
  'titles and foot lines': [
    {
      name: 'above and below',
      text: lines(
        'Laboratory report 123,,,',
        'Customer: Example,,,',
        'Sample,Stream,NaCl (wt%),Remark',
        'A-1,101,12.5*,ok',
        'A-2,102,ND,',
        '* outside calibration,,,',
        'Authorised by: J. Doe,,,',
      ),
      table: { 'A-1': { NaCl: 'value 12.5 wt% *' }, 'A-2': { NaCl: 'notDetected wt%' } },
      also: { notUnderstood: [], samples: [{ note: 'ok' }, { note: '' }] },
    },
    {
      name: 'a sample without results is still one',
      text: lines('Sample,NaCl (wt%)', 'A-1,1.5', 'A-2,', 'A-3,2.5', 'End of report,'),
      table: { 'A-1': { NaCl: 'value 1.5 wt%' }, 'A-2': { NaCl: 'blank wt%' }, 'A-3': { NaCl: 'value 2.5 wt%' } },
    },
    {
      name: 'groups above the heads',
      text: lines('Sample\tCations\t\tAnions\t', '\tNa\tK\tCl\tSO4', '\tmg/L\tmg/L\tmg/L\tmg/L', 'A-1\t1\t2\t3\t4'),
      table: { 'A-1': { Na: 'value 1 mg/L', K: 'value 2 mg/L', Cl: 'value 3 mg/L', SO4: 'value 4 mg/L' } },
    },
  ],
  'blank columns and rows': [
    {
      name: 'between all',
      text: lines('Sample,,Na (mg/L),,K (mg/L)', ',,,,', 'A,,1.5,,2.5', ',,,,', 'B,,1.6,,2.6'),
      table: { A: { Na: 'value 1.5 mg/L', K: 'value 2.5 mg/L' }, B: { Na: 'value 1.6 mg/L', K: 'value 2.6 mg/L' } },
    },
    {
      name: 'before the first',
      text: lines(',,', ',Sample,Na (mg/L)', ',A,1.5', ',B,2.5'),
      table: { A: na('1.5'), B: na('2.5') },
    },
    {
      name: 'lines of nothing',
      text: lines('', '', 'Sample;Na (mg/L)', '', 'A;1,5', '', '', 'B;2,5', ''),
      table: { A: na('1.5'), B: na('2.5') },
    },
  ],
  'several tables': [
    {
      name: 'one below the other',
      text: lines('Sample;Na (mg/L)', 'A;1,5', 'B;1,6', '', 'Sample;Cl (mg/L)', 'A;5,5', 'B;7,5'),
      table: { A: { Na: 'value 1.5 mg/L', Cl: 'value 5.5 mg/L' }, B: { Na: 'value 1.6 mg/L', Cl: 'value 7.5 mg/L' } },
    },
    {
      name: 'side by side',
      text: lines('Sample,Na (mg/L),,Sample,Cl (mg/L)', 'A,1.5,,A,2.5', 'B,1.6,,C,2.6'),
      table: { A: { Na: 'value 1.5 mg/L', Cl: 'value 2.5 mg/L' }, B: na('1.6'), C: { Cl: 'value 2.6 mg/L' } },
    },
    {
      name: 'heads again',
      text: lines('Sample,Na (mg/L)', 'A,1.5', 'Sample,Na (mg/L)', 'B,1.7', 'Sample,Na (mg/L)', 'C,1.8'),
      table: { A: na('1.5'), B: na('1.7'), C: na('1.8') },
    },
    {
      name: 'of two shapes',
      text: lines('Sample,Na (mg/L)', 'A,1.5', 'B,1.6', '', 'Sample,Analyte,Result,Unit', 'A,Cl,3,mg/L'),
      table: { A: { Na: 'value 1.5 mg/L', Cl: 'value 3 mg/L' }, B: na('1.6') },
      also: { shape: 'wide' },
    },
  ],
  replicates: [
    {
      name: 'the same id again',
      text: lines('Sample,Na (mg/L)', 'A,1.5', 'A,1.6'),
      table: { A: na('1.5'), 'A ~ A': na('1.6') },
    },
    {
      name: 'endings',
      text: lines(
        'Sample,Stream,Na (mg/L)',
        '24-1,101,1',
        '24-1 dup,101,2',
        '24-2 rep 1,102,3',
        '24-2 rep 2,102,4',
        '24-3/1,103,5',
        '24-3/2,103,6',
        '24-4-A,104,7',
        '24-4-B,104,8',
      ),
      table: {
        '24-1': na('1'),
        '24-1 dup ~ 24-1': na('2'),
        '24-2 rep 1 ~ 24-2': na('3'),
        '24-2 rep 2 ~ 24-2': na('4'),
        '24-3/1 ~ 24-3': na('5'),
        '24-3/2 ~ 24-3': na('6'),
        '24-4-A ~ 24-4': na('7'),
        '24-4-B ~ 24-4': na('8'),
      },
    },
    {
      name: 'not on another stream, not without a sibling',
      text: lines('Sample,Stream,Na (mg/L)', '24-4-A,104,5', '24-4-B,105,6', '24-5-A,106,6'),
      table: { '24-4-A': na('5'), '24-4-B': na('6'), '24-5-A': na('6') },
    },
    {
      name: 'in a long table',
      text: lines('sample,analyte,result,unit', 'A,Na,1,mg/L', 'A,Na,2,mg/L', 'A,K,3,mg/L'),
      table: { A: { Na: 'value 1 mg/L', K: 'value 3 mg/L' }, 'A ~ A': na('2') },
    },
  ],
  dates: [
    {
      name: 'of every spelling',
      text: lines(
        'Probe;Datum;Na (mg/L)',
        'A;14.03.2026 06:30;1',
        'B;14-Mar-2026;2',
        'C;2026-03-14;3',
        'D;14. März 2026;4',
        'E;14/03/2026 6:30;5',
      ),
      also: {
        samples: ['2026-03-14T06:30', '2026-03-14', '2026-03-14', '2026-03-14', '2026-03-14T06:30'].map((takenAt) => ({
          takenAt,
        })),
        questions: [],
      },
    },
    {
      name: 'asked',
      text: lines('Sample,Date,Na (mg/L)', 'A,03/04/2026,1', 'B,05/06/2026,2'),
      also: {
        questions: [{ code: 'dates', where: ['Date'], options: ['dmy', 'mdy'] }],
        samples: [{ note: 'Date: 03/04/2026' }, {}],
      },
    },
    {
      name: 'decided by another row',
      text: lines('Sample,Date,Time,Na (mg/L)', 'A,03/04/2026,06:00,1', 'B,24/04/2026,18:30,2'),
      also: { questions: [], samples: [{ takenAt: '2026-04-03T06:00' }, { takenAt: '2026-04-24T18:30' }] },
    },
    {
      name: 'answered',
      text: lines('Sample,Date,Na (mg/L)', 'A,03/04/2026,1', 'B,05/06/2026,2'),
      options: { dates: 'mdy' },
      also: { questions: [], samples: [{ takenAt: '2026-03-04' }, { takenAt: '2026-05-06' }] },
    },
  ],
  'notes, methods and unknown words': [
    {
      name: 'columns of words',
      text: lines('Sample,Method,Na (mg/L),Remarks,Operator', 'A,IC,1.5,cloudy,JK', 'B,IC,2.5,,JK'),
      table: { A: na('1.5'), B: na('2.5') },
      also: {
        notUnderstood: [],
        samples: [
          { method: 'IC', note: 'cloudy; Operator: JK' },
          { method: 'IC', note: 'Operator: JK' },
        ],
      },
    },
    {
      name: 'a note among results',
      text: lines('Sample,Na (mg/L),K (mg/L)', 'A,see note 2,3', 'B,1,2'),
      table: { A: { K: 'value 3 mg/L' }, B: { Na: 'value 1 mg/L', K: 'value 2 mg/L' } },
      also: { notUnderstood: [{ row: 2, column: 2, raw: 'see note 2' }] },
    },
    {
      name: 'a column no one knows',
      text: lines('Sample,Na (mg/L),Zustand', 'A,1,klar', 'B,2,trüb'),
      table: { A: na('1'), B: na('2') },
      also: {
        notUnderstood: [
          { row: 2, column: 3, raw: 'klar' },
          { row: 3, column: 3, raw: 'trüb' },
        ],
      },
    },
  ],
}
