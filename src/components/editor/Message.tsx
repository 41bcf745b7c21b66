import { codeParts } from './codeParts.ts'

/** A message of the checker with its quoted pieces of rule in mono type. */
export function Message({ text }: { text: string }) {
  return (
    <>
      {codeParts(text).map((part, index) =>
        part.code ? (
          <code key={index} className="font-mono text-[0.92em]">
            {part.text}
          </code>
        ) : (
          <span key={index}>{part.text}</span>
        ),
      )}
    </>
  )
}
