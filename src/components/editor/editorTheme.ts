import { EditorView } from '@codemirror/view'

/** The editor in the colours of the page; they follow the theme through the custom properties. */
export const editorTheme = EditorView.theme({
  '&': { backgroundColor: 'var(--sheet)', color: 'var(--ink)', fontSize: '13px' },
  '&.cm-focused': { outline: '2px solid var(--action)', outlineOffset: '1px' },
  '.cm-content': {
    fontFamily: '"JetBrains Mono Variable", ui-monospace, monospace',
    lineHeight: '22px',
    padding: '8px 0',
    caretColor: 'var(--ink)',
  },
  '.cm-cursor': { borderLeftColor: 'var(--ink)', borderLeftWidth: '2px' },
  '.cm-gutters': {
    backgroundColor: 'var(--sheet)',
    color: 'var(--ink-soft)',
    border: 'none',
    borderRight: '1px solid var(--line)',
    fontFamily: '"JetBrains Mono Variable", ui-monospace, monospace',
  },
  '.cm-activeLine': { backgroundColor: 'color-mix(in oklab, var(--action) 6%, transparent)' },
  '.cm-activeLineGutter': { backgroundColor: 'transparent', color: 'var(--ink)' },
  '&.cm-focused .cm-selectionBackground, .cm-selectionBackground': {
    backgroundColor: 'color-mix(in oklab, var(--action) 24%, transparent) !important',
  },
  '.cm-matchingBracket, &.cm-focused .cm-matchingBracket': {
    backgroundColor: 'var(--action-wash)',
    outline: '1px solid var(--action)',
  },
  '.cm-tooltip': {
    backgroundColor: 'var(--sheet)',
    color: 'var(--ink)',
    border: '1px solid var(--edge)',
    borderRadius: '4px',
    boxShadow: '0 8px 24px -8px rgb(0 0 0 / 0.28)',
    maxWidth: '440px',
  },
  '.cm-tooltip.cm-tooltip-autocomplete > ul': {
    fontFamily: '"JetBrains Mono Variable", ui-monospace, monospace',
    fontSize: '12px',
    maxHeight: '240px',
  },
  '.cm-tooltip.cm-tooltip-autocomplete > ul > li': { padding: '3px 8px', lineHeight: '18px' },
  '.cm-tooltip-autocomplete ul li[aria-selected]': {
    backgroundColor: 'var(--action)',
    color: 'var(--on-action)',
  },
  '.cm-tooltip-autocomplete ul li[aria-selected] .cm-completionDetail': { color: 'inherit' },
  '.cm-completionDetail': { color: 'var(--ink-soft)', fontStyle: 'normal', marginLeft: '12px' },
  '.cm-completionInfo': { padding: '8px', maxWidth: '320px', fontSize: '13px' },
  '.cm-completionIcon': { display: 'none' },
  '.cm-diagnostic': { padding: '6px 10px', borderLeft: '3px solid transparent' },
  '.cm-diagnostic-error': { borderLeftColor: 'var(--rejected)' },
  '.cm-diagnostic-warning': { borderLeftColor: 'var(--found-fill)' },
  '.cm-diagnostic code': {
    fontFamily: '"JetBrains Mono Variable", ui-monospace, monospace',
    fontSize: '0.92em',
  },
  '.cm-diagnosticAction': {
    backgroundColor: 'var(--action)',
    color: 'var(--on-action)',
    borderRadius: '4px',
    padding: '2px 8px',
    marginLeft: '8px',
  },
  '.cm-lintRange-error': {
    backgroundImage: 'none',
    textDecoration: 'underline wavy var(--rejected) 1.5px',
    textUnderlineOffset: '4px',
    textDecorationSkipInk: 'none',
  },
  '.cm-lintRange-warning': {
    backgroundImage: 'none',
    textDecoration: 'underline dotted var(--found) 2px',
    textUnderlineOffset: '4px',
    textDecorationSkipInk: 'none',
  },
  '.rule-hover': { padding: '8px 10px', fontFamily: '"IBM Plex Sans Variable", system-ui, sans-serif' },
  '.rule-hover > code': {
    fontFamily: '"JetBrains Mono Variable", ui-monospace, monospace',
    fontSize: '12px',
    fontWeight: '600',
  },
  '.rule-hover > p': { margin: '4px 0 0' },
  '.rule-hover-formula': { margin: '6px 0 0', overflowX: 'auto' },
  '.rule-hover > .rule-hover-facts': { color: 'var(--ink-soft)', fontSize: '12px' },
})
