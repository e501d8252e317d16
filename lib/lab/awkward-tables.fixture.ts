import type { LabOptions } from './model'

export type AwkwardTable = {
  name: string
  text: string
  options?: LabOptions
  /** Each sample's results in words (see reading.fixture). */
  table?: Record<string, Record<string, string>>
  also?: object
}

const lines = (...rows: string[]): string => `${rows.join('\n')}\n`
const na = (value: string, kind = 'value') => ({ Na: `${kind} ${value} mg/L` })

/** Tables as laboratories send them, by what makes them awkward; all invented. */
export const awkward: Record<string, AwkwardTable[]> = {
  separators: [
    {
      name: 'pipes with rules',
      text: lines('| Sample | Na (mg/L) |', '|---|---:|', '| A-1 | 1.5 |', '| A-2 | 2.5 |'),
      table: { 'A-1': na('1.5'), 'A-2': na('2.5') },
    },
    {
      name: 'spaces, a blank cell in a row',
      text: lines(
        'Sample     Na (mg/L)   K (mg/L)   Cl (mg/L)',
        '24-1       1.5                    3',
        '24-2       1.6         2.5        4',
        '24-3       1.7         2.6        5',
      ),
      table: {
        '24-1': { Na: 'value 1.5 mg/L', K: 'blank mg/L', Cl: 'value 3 mg/L' },
        '24-2': { Na: 'value 1.6 mg/L', K: 'value 2.5 mg/L', Cl: 'value 4 mg/L' },
        '24-3': { Na: 'value 1.7 mg/L', K: 'value 2.6 mg/L', Cl: 'value 5 mg/L' },
      },
    },
    {
      name: 'commas padded with spaces, quotes over lines, CRLF and a mark',
      text: '\ufeffSample,  Na (mg/L),  Remark\r\n"A,1",  1.5,  "two\r\nlines"\r\nA2,  2.5,  \r\n',
      table: { 'A,1': na('1.5'), A2: na('2.5') },
      also: { samples: [{ id: 'A,1' }, { id: 'A2' }] },
    },
    {
      name: 'semicolons told by the first line',
      text: lines('sep=;', 'Sample;Na (mg/L)', 'A;1,5', 'B;2,5'),
      table: { A: na('1.5'), B: na('2.5') },
    },
    {
      name: 'a quote that never closes',
      text: lines('Sample;Na (mg/L);Size', 'A;1,5;"2', 'B;2,5;3'),
      table: { A: { ...na('1.5') }, B: { ...na('2.5'), Size: 'value 3' } },
    },
  ],
  'decimal signs proved': [
    {
      name: 'two marks in one number',
      text: lines('Sample\tNa (mg/L)', 'A\t1.234,5', 'B\t2.345'),
      table: { A: na('1234.5'), B: na('2345') },
      also: { decimal: 'comma' },
    },
    {
      name: 'a mark used twice',
      text: lines('Sample\tNa (mg/L)', 'A\t1,234,567', 'B\t2,345'),
      table: { A: na('1234567'), B: na('2345') },
      also: { decimal: 'point' },
    },
    {
      name: 'a leading zero',
      text: lines('Sample\tNa (mg/L)', 'A\t0,123', 'B\t1,234'),
      table: { A: na('0.123'), B: na('1.234') },
      also: { decimal: 'comma' },
    },
    {
      name: 'semicolons with commas in numbers',
      text: lines('Probe;Na (mg/L)', 'A;1,234', 'B;2,345'),
      table: { A: na('1.234'), B: na('2.345') },
      also: { decimal: 'comma' },
    },
    {
      name: 'commas between cells',
      text: lines('Sample,Na (mg/L)', 'A,1.234', 'B,"2,345"'),
      table: { A: na('1.234'), B: na('2345') },
      also: { decimal: 'point' },
    },
  ],
  'decimal signs asked': [
    {
      name: 'only 1,234',
      text: lines('Sample\tNa (mg/L)\tK (mg/L)', 'A\t1,234\t5', 'B\t2,345\t<6,789'),
      table: { A: { Na: 'unclear mg/L', K: 'value 5 mg/L' }, B: { Na: 'unclear mg/L', K: 'unclear mg/L' } },
      also: { decimal: null, questions: [{ code: 'decimal', where: ['Na', 'K'], options: ['point', 'comma'] }] },
    },
    {
      name: 'only 1.234',
      text: lines('Sample\tNa (mg/L)', 'A\t1.234', 'B\t12'),
      table: { A: { Na: 'unclear mg/L' }, B: na('12') },
      also: { questions: [{ code: 'decimal', where: ['Na'] }] },
    },
    {
      name: 'evidence for both',
      text: lines('Sample\tNa (mg/L)\tK (mg/L)', 'A\t12,5\t1.5', 'B\t1,234\t2'),
      table: { A: { Na: 'value 12.5 mg/L', K: 'value 1.5 mg/L' }, B: { Na: 'unclear mg/L', K: 'value 2 mg/L' } },
      also: { questions: [{ code: 'decimal', where: ['Na'] }] },
    },
    {
      name: 'answered',
      text: lines('Sample\tNa (mg/L)', 'A\t1,234'),
      options: { decimal: 'comma' },
      table: { A: na('1.234') },
      also: { decimal: 'comma', questions: [] },
    },
  ],
  'numbers of every spelling': [
    {
      name: 'spaces and apostrophes',
      text: lines('Sample\tNa (mg/L)', 'A\t1 234,5', 'B\t1\u00a0234', 'C\t1\u202f234\u202f567', "D\t1'234"),
      table: { A: na('1234.5'), B: na('1234'), C: na('1234567'), D: na('1234') },
    },
    {
      name: 'minus signs and powers',
      text: lines('Sample\tNa (mg/L)', 'A\t−0.5', 'B\t1.2E-3', 'C\t1.5 × 10^-2', 'D\t2·10⁻³', 'E\t.5'),
      table: { A: na('-0.5'), B: na('0.0012'), C: na('0.015'), D: na('0.002'), E: na('0.5') },
    },
    {
      name: 'no numbers at all',
      text: lines('Sample\tNa (mg/L)\tK (mg/L)', 'A\t12 5\t1', 'B\t1-2\t2', 'C\t5/3\t3', 'D\t1.2.3.4\t4'),
      also: { notUnderstood: [{ row: 2, column: 2, raw: '12 5' }, { raw: '1-2' }, { raw: '5/3' }, { raw: '1.2.3.4' }] },
    },
  ],
  'below, above, about': [
    {
      name: 'signs',
      text: lines('Sample,Na (mg/L)', 'A,<0.01', 'B,< 0.02', 'C,>100', 'D,~5', 'E,≤ 3'),
      table: {
        A: na('0.01', 'below'),
        B: na('0.02', 'below'),
        C: na('100', 'above'),
        D: na('5', 'about'),
        E: na('3', 'below'),
      },
    },
    {
      name: 'limits by name',
      text: lines('Sample,Na (mg/L)', 'A,<LOD', 'B,<DL', 'C,BDL', 'D,1.5'),
      table: { A: { Na: 'below mg/L' }, B: { Na: 'below mg/L' }, C: { Na: 'below mg/L' }, D: na('1.5') },
    },
    {
      name: 'words with the limit',
      text: lines('Probe;Na (mg/L)', 'A;n.n. (<0,05)', 'B;<LOD (0,01)', 'C;ca. 5,5'),
      table: { A: na('0.05', 'notDetected'), B: na('0.01', 'below'), C: na('5.5', 'about') },
    },
  ],
  'words in place of numbers': [
    {
      name: 'not detected and trace',
      text: lines('Sample,Na (mg/L)', 'A,ND', 'B,n.d.', 'C,n.n.', 'D,trace', 'E,tr', 'F,Spuren'),
      table: {
        A: { Na: 'notDetected mg/L' },
        B: { Na: 'notDetected mg/L' },
        C: { Na: 'notDetected mg/L' },
        D: { Na: 'trace mg/L' },
        E: { Na: 'trace mg/L' },
        F: { Na: 'trace mg/L' },
      },
    },
    {
      name: 'not analysed and blank',
      text: lines('Sample,Na (mg/L),K (mg/L)', 'A,n.a.,1', 'B,NR,1', 'C,n.b.,1', 'D,-,1', 'E,#N/A,1', 'F,,1'),
      also: {
        samples: ['A', 'B', 'C', 'D', 'E']
          .map((id) => ({ id, results: [{ kind: 'notAnalysed' }, {}] }))
          .concat([{ id: 'F', results: [{ kind: 'blank', raw: '' } as never, {}] }]),
      },
    },
    {
      name: 'by difference',
      text: lines('Probe;H2O (Gew.-%);NaCl (Gew.-%)', 'A;by difference;1,5', 'B;bal.;2,5', 'C;Rest;3,5'),
      table: {
        A: { H2O: 'difference Gew.-%', NaCl: 'value 1.5 Gew.-%' },
        B: { H2O: 'difference Gew.-%', NaCl: 'value 2.5 Gew.-%' },
        C: { H2O: 'difference Gew.-%', NaCl: 'value 3.5 Gew.-%' },
      },
    },
  ],
  uncertainties: [
    {
      name: 'in the cell',
      text: lines('Sample,Na (mg/L)', 'A,5.2 ± 0.1', 'B,5.2 +/- 0.1', 'C,5.2 ± 2 %', 'D,(5.2 ± 0.1) g/L'),
      table: { A: na('5.2 ±0.1'), B: na('5.2 ±0.1'), C: na('5.2 ±0.104'), D: { Na: 'value 5.2 ±0.1 g/L' } },
    },
    {
      name: 'in a column beside',
      text: lines('Sample,Na (mg/L),±,K (mg/L),K uncertainty', 'A,5.2,0.1,3,5 %', 'B,6.2,0.2,4,'),
      table: {
        A: { Na: 'value 5.2 ±0.1 mg/L', K: 'value 3 ±0.15 mg/L' },
        B: { Na: 'value 6.2 ±0.2 mg/L', K: 'value 4 mg/L' },
      },
    },
    {
      name: 'in a long table',
      text: lines('Sample,Analyte,Result,Uncertainty,Unit', 'A,Na,5.2,0.1,mg/L', 'A,K,3,2 %,mg/L'),
      table: { A: { Na: 'value 5.2 ±0.1 mg/L', K: 'value 3 ±0.06 mg/L' } },
    },
  ],
  flags: [
    {
      name: 'a star',
      text: lines('Sample,Na (mg/L)', 'A,12.5*', 'B,*3', 'C,<5*'),
      table: { A: { Na: 'value 12.5 mg/L *' }, B: { Na: 'value 3 mg/L *' }, C: { Na: 'below 5 mg/L *' } },
    },
    {
      name: 'a dagger and a bracket',
      text: lines('Sample,Na (mg/L)', 'A,12.5†', 'B,3 (a)'),
      table: { A: { Na: 'value 12.5 mg/L †' }, B: { Na: 'value 3 mg/L (a)' } },
    },
    {
      name: 'a column of flags',
      text: lines(
        'Sample,Analyte,Result,Qualifier,Unit',
        'A,Na,0.5,J,mg/L',
        'A,K,0.1,U,mg/L',
        'A,Cl,2,>,mg/L',
        'A,F,,ND,mg/L',
      ),
      table: { A: { Na: 'value 0.5 mg/L J', K: 'below 0.1 mg/L U', Cl: 'above 2 mg/L', F: 'notDetected mg/L' } },
    },
  ],
  units: [
    {
      name: 'a row of units',
      text: lines('Sample\tNa\tNaCl', '\tmg/L\twt %', 'A\t1.5\t2.5'),
      table: { A: { Na: 'value 1.5 mg/L', NaCl: 'value 2.5 wt %' } },
    },
    {
      name: 'in heads of every manner',
      text: lines('Sample;Na [mg/L];NaCl, wt%;K mg/l;Ca in mg/L;Cl / g/L;Mg_mg/kg', 'A;1,5;2;3;4;5;6'),
      table: {
        A: {
          Na: 'value 1.5 mg/L',
          NaCl: 'value 2 wt%',
          K: 'value 3 mg/l',
          Ca: 'value 4 mg/L',
          Cl: 'value 5 g/L',
          Mg: 'value 6 mg/kg',
        },
      },
    },
    {
      name: 'of a cell',
      text: lines('Sample,Na (mg/L)', 'A,1.5 g/L', 'B,0.5 %', 'C,2'),
      table: { A: { Na: 'value 1.5 g/L' }, B: { Na: 'value 0.5 %' }, C: na('2') },
    },
    {
      name: 'head and row at odds',
      text: lines('Sample,Na (mg/L),K', ',g/L,g/L', 'A,1.5,2'),
      table: { A: { Na: 'value 1.5', K: 'value 2 g/L' } },
      also: { questions: [{ code: 'unit', where: ['Na'], options: ['mg/L', 'g/L'] }] },
    },
  ],
  'reckoned as': [
    {
      name: 'in heads',
      text: lines('Sample,P as P2O5 (g/kg),Nitrate (mg/L as N),Hardness as CaCO3 (mg/L)', 'A,0.12,5.2,120'),
      table: {
        A: { P: 'value 0.12 g/kg as P2O5', Nitrate: 'value 5.2 mg/L as N', Hardness: 'value 120 mg/L as CaCO3' },
      },
    },
    {
      name: 'in the row of units',
      text: lines('Probe;Nitrat;Härte', ';mg/l als N;mg/l als CaCO₃', 'A;1,5;2,5'),
      table: { A: { Nitrat: 'value 1.5 mg/l as N', Härte: 'value 2.5 mg/l as CaCO3' } },
    },
    {
      name: 'in a long table',
      text: lines('sample,analyte,result,unit', 'A,P as P2O5,0.12,g/kg', 'A,NH4,3,mg/L as N'),
      table: { A: { P: 'value 0.12 g/kg as P2O5', NH4: 'value 3 mg/L as N' } },
    },
  ],
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
