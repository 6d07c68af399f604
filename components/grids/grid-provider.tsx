'use client'

import {
  CellStyleModule,
  CheckboxEditorModule,
  ClientSideRowModelModule,
  ColumnApiModule,
  ColumnAutoSizeModule,
  GridStateModule,
  NumberEditorModule,
  NumberFilterModule,
  RenderApiModule,
  RowApiModule,
  RowAutoHeightModule,
  RowSelectionModule,
  RowStyleModule,
  ScrollApiModule,
  TextEditorModule,
  TextFilterModule,
  TooltipModule,
  themeQuartz,
} from 'ag-grid-community'
import { AgGridProvider } from 'ag-grid-react'
import { type ReactNode } from 'react'
import './grid.css'

/** Only what the product's grids use. */
const modules = [
  CellStyleModule,
  CheckboxEditorModule,
  ClientSideRowModelModule,
  ColumnApiModule,
  ColumnAutoSizeModule,
  GridStateModule,
  NumberEditorModule,
  NumberFilterModule,
  RenderApiModule,
  RowApiModule,
  RowAutoHeightModule,
  RowSelectionModule,
  RowStyleModule,
  ScrollApiModule,
  TextEditorModule,
  TextFilterModule,
  TooltipModule,
]

/** Paper and ink: hairlines instead of boxes; every colour is a token, so the grid follows the theme by itself. */
export const gridTheme = themeQuartz.withParams({
  accentColor: 'var(--accent)',
  backgroundColor: 'var(--paper)',
  foregroundColor: 'var(--ink)',
  borderColor: 'var(--line)',
  browserColorScheme: 'inherit',
  chromeBackgroundColor: 'var(--paper)',
  headerBackgroundColor: 'var(--paper)',
  headerTextColor: 'var(--ink-2)',
  headerFontWeight: 600,
  headerFontSize: 12.5,
  headerColumnBorder: false,
  headerColumnResizeHandleColor: 'transparent',
  pinnedColumnBorder: false,
  headerRowBorder: false,
  fontFamily: 'inherit',
  dataFontSize: 14.5,
  fontSize: 14.5,
  rowBorder: { color: 'var(--line)' },
  columnBorder: false,
  wrapperBorder: false,
  wrapperBorderRadius: 0,
  borderRadius: 3,
  cellHorizontalPadding: 6,
  oddRowBackgroundColor: 'var(--paper)',
  rowHoverColor: 'color-mix(in srgb, var(--accent-wash) 45%, transparent)',
  selectedRowBackgroundColor: 'var(--accent-wash)',
  menuBackgroundColor: 'var(--sheet)',
  menuBorder: { color: 'var(--line-strong)' },
  menuShadow: 'none',
  popupShadow: 'none',
  tooltipBackgroundColor: 'var(--sheet)',
  tooltipTextColor: 'var(--ink)',
  inputBackgroundColor: 'var(--sheet)',
  inputBorder: { color: 'var(--line-strong)' },
  inputFocusShadow: 'none',
  focusShadow: 'none',
  cellEditingShadow: 'none',
  rangeSelectionBorderColor: 'var(--accent)',
  checkboxUncheckedBorderColor: 'var(--line-strong)',
  iconSize: 14,
  headerHeight: 38,
  rowHeight: 46,
})

/** Brings the grid library in, once, for the grids inside. */
export function GridProvider({ children }: { children: ReactNode }) {
  return <AgGridProvider modules={modules}>{children}</AgGridProvider>
}
