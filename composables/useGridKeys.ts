import type { Column, ListKind } from '~/utils/posting/rows'

export type GridColumn = Column | 'remove'
/** The cells that are written in, and the button behind them. The gap of a point is a distance: it shows no way to go, so nobody can type it. */
export const gridColumns: Record<ListKind, readonly [Column, Column, Column, 'remove']> = {
  reading: ['frame', 'reading', 'gap', 'remove'],
  point: ['frame', 'x', 'y', 'remove'],
}
export interface GridCell {
  row: number
  column: GridColumn
}
export interface GridMoves {
  kind: () => ListKind
  rows: () => number
  go: (cell: GridCell) => void
  /** Enter on the last row: one more drawing. */
  add: () => void
  insert: (row: number) => void
  remove: (row: number) => void
  /** Out of the grid, to what comes after it. */
  leave: () => void
}

const PAGE = 10

/**
 * Keys between the cells of a list. Up, Down, Enter and Page keys change the row; Left, Right, Home and End change the column
 * once the caret is at that end of the text, so that a reading can still be corrected; Tab goes on through the cells and out
 * at the end; Escape leaves at once. Ctrl (or ⌘) with Enter puts a drawing in below, with Delete takes this one out.
 */
export function useGridKeys(moves: GridMoves) {
  return function onKey(event: KeyboardEvent, { row, column }: GridCell): void {
    const input = event.target instanceof HTMLInputElement ? event.target : null
    const last = moves.rows() - 1
    const columns = gridColumns[moves.kind()]
    const at = columns.indexOf(column)
    const command = event.ctrlKey || event.metaKey
    const go = (toRow: number, toColumn: number) => {
      event.preventDefault()
      moves.go({ row: Math.min(Math.max(toRow, 0), last), column: columns[Math.min(Math.max(toColumn, 0), columns.length - 1)]! })
    }
    const done = (act: () => void) => {
      event.preventDefault()
      act()
    }
    if (event.altKey || event.isComposing) return
    switch (event.key) {
      case 'ArrowUp':
        return go(row - 1, at)
      case 'ArrowDown':
        return go(row + 1, at)
      case 'PageUp':
        return go(row - PAGE, at)
      case 'PageDown':
        return go(row + PAGE, at)
      case 'Enter':
        if (command) return done(() => moves.insert(row))
        if (event.shiftKey) return go(row - 1, at)
        if (column === 'remove') return
        return row === last ? done(moves.add) : go(row + 1, at)
      case 'ArrowLeft':
        return caretAt(input, 'start') && at > 0 ? go(row, at - 1) : undefined
      case 'ArrowRight':
        return caretAt(input, 'end') && at < columns.length - 1 ? go(row, at + 1) : undefined
      case 'Home':
        if (command) return go(0, at)
        return caretAt(input, 'start') ? go(row, 0) : undefined
      case 'End':
        if (command) return go(last, at)
        return caretAt(input, 'end') ? go(row, 2) : undefined
      case 'Tab':
        return tab(event, row, at, last, go)
      case 'Escape':
        return done(moves.leave)
      case 'Delete':
      case 'Backspace':
        return command ? done(() => moves.remove(row)) : undefined
    }
  }
}

/** Through the three cells that are written in, row by row; past either end the browser's own way on is taken. */
function tab(event: KeyboardEvent, row: number, at: number, last: number, go: (row: number, column: number) => void) {
  if (event.shiftKey) {
    if (at > 0) return go(row, at - 1)
    return row > 0 ? go(row - 1, 2) : undefined
  }
  if (at < 2) return go(row, at + 1)
  return row < last ? go(row + 1, 0) : undefined
}

/** A whole cell selected counts as both ends: that is how a cell looks when it was just walked into. */
function caretAt(input: HTMLInputElement | null, end: 'start' | 'end'): boolean {
  if (!input) return true
  const { selectionStart, selectionEnd, value } = input
  if (selectionStart === 0 && selectionEnd === value.length) return true
  return selectionStart === selectionEnd && selectionStart === (end === 'start' ? 0 : value.length)
}
