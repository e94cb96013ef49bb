/** What a place says while it holds nothing: the next step, and the way to take it. */
export function EmptyPlace({
  title,
  children,
  action,
}: {
  title: string
  children?: React.ReactNode
  action?: React.ReactNode
}) {
  return (
    <div className="my-4 border-y border-dashed border-rule py-8">
      <p className="m-0 font-serif text-lead">{title}</p>
      {children && <div className="measure mt-1 text-soft">{children}</div>}
      {action && <div className="mt-4 flex flex-wrap gap-3">{action}</div>}
    </div>
  )
}
