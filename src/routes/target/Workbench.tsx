import { useCallback, useMemo, useState, type ReactNode } from 'react'
import { type EditorView } from '@codemirror/view'
import { toast } from 'sonner'
import { type Scope } from '../../../shared/polytopes.ts'
import { type TargetDetail } from '../../../shared/targets.ts'
import { formatRule, parseRule, type OwnName, type RenamableName } from '../../../scoring/index.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { IssueList } from '../../components/editor/IssueList.tsx'
import { ReferenceList } from '../../components/editor/ReferenceList.tsx'
import { nameAtCursor } from '../../components/editor/renameCommand.ts'
import { RenameNameDialog, type AskedRename } from '../../components/editor/RenameNameDialog.tsx'
import { RuleEditor } from '../../components/editor/RuleEditor.tsx'
import { type CheckedText } from '../../components/editor/useRuleReport.ts'
import { counted } from '../../lib/numbers.ts'
import { Tabs } from '../../components/ui/Tabs.tsx'
import { PreviewPanel } from './PreviewPanel.tsx'
import { PreviewScope } from './PreviewScope.tsx'
import { usePreview } from './usePreview.ts'
import { useWorkScope } from './useWorkScope.ts'

interface WorkbenchProps {
  campaign: string
  /** The saved target that is worked on, if it is one. */
  target?: TargetDetail
  text: string
  onText: (text: string) => void
  checked: CheckedText
  /** What a starter is meant for. */
  proposed?: Scope | null
  /** A further tab, for the versions of a saved target. */
  versions?: ReactNode
}

const noNames: readonly OwnName[] = []

/** Editor on the left, live answer on the right. */
export function Workbench({ campaign, target, text, onText, checked, proposed, versions }: WorkbenchProps) {
  const [view, setView] = useState<EditorView | null>(null)
  const [tab, setTab] = useState('preview')
  const [size, setSize] = useState(200)
  const [asked, setAsked] = useState<AskedRename | null>(null)
  const work = useWorkScope(target?.id ?? campaign, target?.latestScope ?? null, proposed ?? null)
  const { report, current } = checked
  const sound = report?.sound ?? null
  const preview = usePreview(campaign, {
    rule: current ? (sound?.canonical ?? null) : null,
    scope: work.scope,
    size,
    seed: 1,
  })

  const insert = useCallback(
    (piece: string) => {
      if (!view) return
      view.dispatch({ ...view.state.replaceSelection(piece), scrollIntoView: true })
      view.focus()
    },
    [view],
  )
  const goTo = useCallback(
    (place: string) => {
      if (!view) return
      const [line = 1, column = 1] = place.split(':').map(Number)
      const { doc } = view.state
      const at = doc.line(Math.min(line, doc.lines))
      const anchor = Math.min(at.to, at.from + column - 1)
      view.dispatch({ selection: { anchor }, scrollIntoView: true })
      view.focus()
    },
    [view],
  )
  const ask = useCallback((editor: EditorView, name: RenamableName) => setAsked({ view: editor, name }), [])
  const tidy = () => {
    const { rule } = parseRule(text)
    if (rule) onText(formatRule(rule))
  }
  const rename = () => {
    const name = view && nameAtCursor(view)
    if (view && name) ask(view, name)
    else toast('Put the cursor at a name that the rule gives with let, or at the variable of a fold.')
  }
  const names = report?.names ?? noNames
  const reference = useMemo(() => <ReferenceList onInsert={insert} names={names} />, [insert, names])

  return (
    <div className="grid grid-cols-1 gap-x-8 gap-y-6 border-t pt-4 md:grid-cols-[minmax(0,11fr)_minmax(0,9fr)]">
      <div className="min-w-0 md:sticky md:top-16 md:self-start">
        <p className="prose-line mb-2 text-xs text-soft md:hidden">
          Writing rules wants a window of 900 px or more: there the answer stands beside the text. Here
          everything can be read, and small things mended.
        </p>
        <RuleEditor
          value={text}
          onChange={onText}
          onReady={setView}
          report={report}
          onRename={ask}
          label="Scoring rule"
        />
        {report && <IssueList issues={report.issues} view={view} outdated={!current} />}
        <div className="mt-2 flex flex-wrap items-center gap-x-2 gap-y-1 text-xs text-soft">
          <span role="status" className="min-w-48 flex-1">
            {standing(checked)}
          </span>
          <ActionButton
            kind="quiet"
            title="Rename the name at the cursor (F2 in the editor)"
            action={{ id: 'target.rename-name', label: 'Rename a name', section: 'Target', run: rename }}
          />
          <ActionButton
            kind="quiet"
            action={{
              ...{ id: 'target.lay-out', label: 'Lay out', section: 'Target', run: tidy },
              unavailable: !(current && sound) && 'Only a rule without errors can be laid out.',
            }}
          />
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
                  <PreviewScope campaign={campaign} work={work} size={size} onSize={setSize} />
                  <PreviewPanel
                    campaign={campaign}
                    state={preview}
                    sound={!current || sound !== null}
                    hitOpen={sound?.hitOpen ?? false}
                    places={current ? (sound?.places ?? null) : null}
                    onPlace={goTo}
                  />
                </>
              ),
            },
            { value: 'reference', label: 'Observables', content: reference },
            ...(versions ? [{ value: 'versions', label: 'Versions', content: versions }] : []),
          ]}
        />
      </div>
      <RenameNameDialog asked={asked} onClose={() => setAsked(null)} />
    </div>
  )
}

/** The line under the editor. */
function standing({ report, current }: CheckedText): string {
  if (!report) return 'Checking the rule.'
  if (report.sound) {
    const { stage, cost } = report.sound
    return `No errors. Computes up to the stage ${stage}; cost class ${cost}.`
  }
  const errors = report.issues.filter(({ severity }) => severity === 'error').length
  const verb = errors === 1 ? 'is' : 'are'
  return current
    ? `${counted(errors, 'error')} ${verb} to be mended before the rule can be previewed, saved or searched with.`
    : 'Checking the rule.'
}
