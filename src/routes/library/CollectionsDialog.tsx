import { useState } from 'react'
import { Link } from 'react-router-dom'
import { type CampaignSummary } from '../../../shared/campaigns.ts'
import { type CollectionView } from '../../../shared/collections.ts'
import { may } from '../../../shared/roles.ts'
import {
  useCollections,
  useDeleteCollection,
  useEditCollection,
  usePublishCollection,
} from '../../api/collections.ts'
import { Button } from '../../components/ui/Button.tsx'
import { ConfirmDialog } from '../../components/ui/ConfirmDialog.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { Empty, Failure, QueryView } from '../../components/ui/States.tsx'
import { counted } from '../../lib/numbers.ts'

/** All collections a campaign may read; its own can be renamed, published and deleted here. */
export function CollectionsDialog({
  campaign,
  open,
  onOpenChange,
}: {
  campaign: CampaignSummary
  open: boolean
  onOpenChange: (open: boolean) => void
}) {
  const collections = useCollections(campaign.id)
  return (
    <Dialog
      wide
      open={open}
      onOpenChange={onOpenChange}
      title="Collections"
      description="Named sets of polytopes. A published one is readable for every account, with the imports it holds."
    >
      <QueryView query={collections} what="the collections">
        {(list) =>
          list.length === 0 ? (
            <Empty title="No collection yet.">
              Select polytopes in the library, or filter it, and choose “Collect”.
            </Empty>
          ) : (
            <ul>
              {list.map((one) => (
                <CollectionItem
                  key={one.id}
                  campaign={campaign}
                  collection={one}
                  onLeave={() => onOpenChange(false)}
                />
              ))}
            </ul>
          )
        }
      </QueryView>
    </Dialog>
  )
}

type Question = 'publish' | 'withdraw' | 'delete'

function CollectionItem({
  campaign,
  collection,
  onLeave,
}: {
  campaign: CampaignSummary
  collection: CollectionView
  onLeave: () => void
}) {
  const { id, name, own, publishedAt, polytopes, campaignName, authorName } = collection
  const edit = useEditCollection(campaign.id)
  const remove = useDeleteCollection(campaign.id)
  const publish = usePublishCollection(campaign.id)
  const [renaming, setRenaming] = useState<string | null>(null)
  const [asked, setAsked] = useState<Question | null>(null)
  const lead = may(campaign.role, 'collections.publish')
  const editor = may(campaign.role, 'collections.edit') && (lead || publishedAt === null)
  const fault = edit.error ?? remove.error ?? publish.error
  const questions = {
    publish: {
      title: `Publish “${name}”?`,
      word: 'Publish',
      text: `Every account sees it then: its name, its author, the name of this campaign, and its polytopes, imports included, under the names they have here. Only a lead changes it from then on.`,
      run: () => publish.mutate({ id, published: true }),
    },
    withdraw: {
      title: `Withdraw “${name}”?`,
      word: 'Withdraw',
      text: 'Other campaigns no longer see it, nor the imports they saw only through it. Searches they have made keep running.',
      run: () => publish.mutate({ id, published: false }),
    },
    delete: {
      title: `Delete “${name}”?`,
      word: 'Delete',
      text: 'The polytopes stay in the library, and searches made in it stay as they are.',
      run: () => remove.mutate(id),
    },
  } as const
  return (
    <li className="border-b py-2 last:border-b-0">
      {renaming === null ? (
        <div className="flex flex-wrap items-baseline gap-x-4 gap-y-1">
          <Link
            to={`/library?campaign=${campaign.id}&collection=${id}`}
            onClick={onLeave}
            className="min-w-0 flex-1 basis-56 break-words text-action hover:underline"
          >
            {name}
          </Link>
          <span className="text-xs text-soft">
            {counted(polytopes, 'polytope')}, {own ? `by ${authorName}` : `published by “${campaignName}”`}
            {own && publishedAt !== null && ', published'}
          </span>
          {own && editor && (
            <span className="flex flex-wrap">
              <Button kind="quiet" onClick={() => setRenaming(name)}>
                Rename<span className="sr-only"> {name}</span>
              </Button>
              {lead && (
                <Button kind="quiet" onClick={() => setAsked(publishedAt === null ? 'publish' : 'withdraw')}>
                  {publishedAt === null ? 'Publish' : 'Withdraw'}
                  <span className="sr-only"> {name}</span>
                </Button>
              )}
              <Button kind="quiet" onClick={() => setAsked('delete')}>
                Delete<span className="sr-only"> {name}</span>
              </Button>
            </span>
          )}
        </div>
      ) : (
        <form
          className="flex flex-wrap items-end gap-2"
          onSubmit={(event) => {
            event.preventDefault()
            if (renaming.trim() === '') return
            edit.mutate({ id, name: renaming.trim() }, { onSuccess: () => setRenaming(null) })
          }}
        >
          <TextField
            className="min-w-0 flex-1 basis-56"
            label="New name"
            autoFocus
            maxLength={80}
            value={renaming}
            onChange={(event) => setRenaming(event.target.value)}
          />
          <Button type="submit" kind="primary" busy={edit.isPending}>
            Save
          </Button>
          <Button onClick={() => setRenaming(null)}>Cancel</Button>
        </form>
      )}
      {fault && <Failure title="That did not work." error={fault} />}
      {asked && (
        <ConfirmDialog
          open
          onOpenChange={(next) => !next && setAsked(null)}
          title={questions[asked].title}
          word={questions[asked].word}
          onConfirm={questions[asked].run}
        >
          {questions[asked].text}
        </ConfirmDialog>
      )}
    </li>
  )
}
