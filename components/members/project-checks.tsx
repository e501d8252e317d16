import type { ProjectChoice } from './types'

type ProjectChecksProps = {
  id: string
  projects: readonly ProjectChoice[]
  chosen: readonly string[]
  onChange: (chosen: string[]) => void
  error?: string | undefined
}

/** Which projects an analyst or a reader belongs to. */
export function ProjectChecks({ id, projects, chosen, onChange, error }: ProjectChecksProps) {
  const toggle = (project: string, isChosen: boolean) =>
    onChange(isChosen ? [...chosen, project] : chosen.filter((other) => other !== project))
  return (
    <fieldset id={id} tabIndex={-1} aria-describedby={error ? `${id}-error` : undefined} className="grid gap-1">
      <legend className="mb-1 font-semibold">Projects</legend>
      {projects.length === 0 ? <p className="text-ink-2">The team has no project yet: make one first.</p> : null}
      <div className="max-h-56 overflow-y-auto rounded-control border border-hair-2">
        {projects.map((project) => (
          <label
            key={project.id}
            className="flex cursor-pointer items-center gap-3 border-b border-hair px-3 py-2 last:border-b-0 has-checked:bg-brook-wash"
          >
            <input
              type="checkbox"
              checked={chosen.includes(project.id)}
              onChange={(event) => toggle(project.id, event.currentTarget.checked)}
              className="size-4 accent-brook"
            />
            <span className="min-w-0 wrap-anywhere">{project.name}</span>
          </label>
        ))}
      </div>
      {error ? (
        <p id={`${id}-error`} className="text-sm font-semibold text-odds-ink">
          {error}
        </p>
      ) : null}
    </fieldset>
  )
}
