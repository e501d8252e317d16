declare module 'xlsx-calc' {
  import type { WorkBook } from 'xlsx'

  /** Calculates every formula of a workbook in place. */
  const calculate: {
    (workbook: WorkBook): void
    import_functions(functions: Record<string, (...values: unknown[]) => unknown>): void
  }
  export default calculate
}
