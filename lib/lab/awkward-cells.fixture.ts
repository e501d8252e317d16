import { type AwkwardTable, lines, na } from './awkward-table.fixture'

/** Tables awkward by their cells; all invented. */
export const awkwardCells: Record<string, AwkwardTable[]> = {
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
}
