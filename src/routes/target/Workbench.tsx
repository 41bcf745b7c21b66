import { useCallback, useMemo, useState, type ReactNode } from 'react'
import { type EditorView } from '@codemirror/view'
import { type Scope } from '../../../shared/polytopes.ts'
import { type TargetDetail } from '../../../shared/targets.ts'
import { checkRule, formatRule, parseRule } from '../../../scoring/index.ts'
import { IssueList } from '../../components/editor/IssueList.tsx'
import { ReferenceList } from '../../components/editor/ReferenceList.tsx'
import { RuleEditor } from '../../components/editor/RuleEditor.tsx'
import { describeScope } from '../../components/scope/scopeAddress.ts'
import { isEmptyScope, ScopeFields } from '../../components/scope/ScopeFields.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { Tabs } from '../../components/ui/Tabs.tsx'
import { PreviewPanel } from './PreviewPanel.tsx'
import { usePreview } from './usePreview.ts'
import { useWorkScope } from './useWorkScope.ts'

interface WorkbenchProps {
  campaign: string
  /** The saved target that is worked on, if it is one. */
  target?: TargetDetail
  text: string
  onText: (text: string) => void
  /** A further tab, for the versions of a saved target. */
  versions?: ReactNode
}

/** Editor on the left, live answer on the right. */
export function Workbench({ campaign, target, text, onText, versions }: WorkbenchProps) {
  const [view, setView] = useState<EditorView | null>(null)
  const [tab, setTab] = useState('preview')
  const [scope, setScope] = useWorkScope(target?.id ?? campaign, target?.latestScope ?? null)
  const [size, setSize] = useState(300)
  const check = useMemo(() => checkRule(text), [text])
  const preview = usePreview(campaign, { text, scope, size, seed: 1 }, check.ok)

  const insert = useCallback(
    (piece: string) => {
      if (!view) return
      view.dispatch(view.state.replaceSelection(piece))
      view.focus()
    },
    [view],
  )
  const tidy = () => {
    const { rule } = parseRule(text)
    if (rule) onText(formatRule(rule))
  }

  return (
    <div className="grid grid-cols-1 gap-x-8 gap-y-6 border-t pt-4 md:grid-cols-[minmax(0,11fr)_minmax(0,9fr)]">
      <div className="min-w-0 md:sticky md:top-16 md:self-start">
        <RuleEditor value={text} onChange={onText} onReady={setView} label="Scoring rule" />
        <IssueList issues={check.issues} view={view} />
        <div className="mt-2 flex flex-wrap items-center gap-2 text-xs text-soft">
          <span role="status" className="flex-1">
            {check.ok
              ? `No errors. Computes up to the stage ${check.rule.stage}; cost class ${check.rule.cost}.`
              : `${check.issues.filter(({ severity }) => severity === 'error').length} to mend before the rule can be previewed, saved or searched with.`}
          </span>
          <Button
            kind="quiet"
            unavailable={!check.ok && 'Only a rule without errors can be laid out.'}
            onClick={tidy}
          >
            Lay out
          </Button>
        </div>
      </div>
      <div className="min-w-0">
        <Tabs
          label="Beside the editor"
          value={tab}
          onChange={setTab}
          items={[
            {
              value: 'preview',
              label: 'Preview',
              content: (
                <>
                  <PreviewScope
                    campaign={campaign}
                    scope={scope}
                    onScope={setScope}
                    size={size}
                    onSize={setSize}
                  />
                  <PreviewPanel
                    campaign={campaign}
                    state={preview}
                    sound={check.ok}
                    hitOpen={check.ok && check.rule.hit === null}
                  />
                </>
              ),
            },
            { value: 'reference', label: 'Observables', content: <ReferenceList onInsert={insert} /> },
            ...(versions ? [{ value: 'versions', label: 'Versions', content: versions }] : []),
          ]}
        />
      </div>
    </div>
  )
}

function PreviewScope({
  campaign,
  scope,
  onScope,
  size,
  onSize,
}: {
  campaign: string
  scope: Scope
  onScope: (scope: Scope) => void
  size: number
  onSize: (size: number) => void
}) {
  return (
    <details className="mb-3 border-b pb-2" open={isEmptyScope(scope) || undefined}>
      <summary className="text-soft">
        Null sample of {size} from <span className="text-ink">{describeScope(scope)}</span>
      </summary>
      <div className="mt-3 flex flex-col gap-3 pb-1">
        <ScopeFields campaign={campaign} scope={scope} onScope={onScope} />
        <Select
          label="Candidates in the sample"
          className="max-w-48"
          value={size}
          onChange={(event) => onSize(Number(event.target.value))}
          options={[
            ['100', '100'],
            ['300', '300'],
            ['1000', '1000'],
            ['2000', '2000'],
          ]}
        />
      </div>
    </details>
  )
}
