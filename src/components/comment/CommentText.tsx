import { partsOf } from './mentioning.ts'

/** A comment as it was written, never as HTML; names of members stand out. */
export function CommentText({ text, names }: { text: string; names: readonly string[] }) {
  return (
    <p className="prose-line break-words whitespace-pre-wrap">
      {partsOf(text, names).map((part, at) =>
        part.named ? (
          <strong key={at} className="font-medium text-action">
            {part.text}
          </strong>
        ) : (
          part.text
        ),
      )}
    </p>
  )
}
