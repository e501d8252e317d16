import { LoaderCircle } from 'lucide-react'
import type { ComponentProps, ReactNode } from 'react'
import { classNames } from './class-names'

export type ButtonLook = 'plain' | 'main' | 'quiet' | 'danger'
export type ButtonSize = 'small' | 'normal' | 'large'
type Shape = ButtonSize | `${ButtonSize} square`

const looks: Record<ButtonLook, string> = {
  plain: 'border-hair-2 bg-sheet text-ink hover:border-edge',
  main: 'border-brook bg-brook text-brook-ink font-semibold hover:border-brook-deep hover:bg-brook-deep',
  quiet: 'border-transparent bg-transparent text-ink-2 hover:bg-brook-wash hover:text-ink',
  danger: 'border-odds-edge bg-sheet text-odds-ink hover:bg-odds',
}

const shapes: Record<Shape, string> = {
  small: 'h-7 px-2.5 text-sm',
  normal: 'h-9 px-3.5',
  large: 'h-11 px-5 text-md',
  'small square': 'size-7',
  'normal square': 'size-9',
  'large square': 'size-11',
}

/** The classes of a button, for a link that looks like one. */
export function buttonClasses(look: ButtonLook = 'plain', shape: Shape = 'normal', className?: string): string {
  return classNames(
    'inline-flex items-center justify-center gap-2 rounded-control border leading-none whitespace-nowrap transition-colors',
    'aria-disabled:opacity-55 disabled:opacity-55',
    looks[look],
    shapes[shape],
    className,
  )
}

type ButtonProps = ComponentProps<'button'> & {
  look?: ButtonLook
  size?: Shape
  /** Work is under way: a turning mark is shown, presses do nothing, and the button keeps the focus. */
  busy?: boolean
}

export function Button({ look, size, busy, className, children, onClick, type, ...rest }: ButtonProps) {
  return (
    <button
      type={type ?? 'button'}
      className={buttonClasses(look, size, className)}
      aria-busy={busy || undefined}
      aria-disabled={busy || undefined}
      onClick={busy ? (event) => event.preventDefault() : onClick}
      {...rest}
    >
      {busy ? <LoaderCircle className="size-4 animate-spin" aria-hidden="true" /> : null}
      {children}
    </button>
  )
}

type IconButtonProps = Omit<ButtonProps, 'children' | 'aria-label' | 'size'> & {
  label: string
  size?: ButtonSize
  children: ReactNode
}

/** A button that shows only an icon; `label` is its accessible name and the hint under the pointer. */
export function IconButton({ label, look = 'quiet', size = 'normal', children, ...rest }: IconButtonProps) {
  return (
    <Button look={look} size={`${size} square`} aria-label={label} title={label} {...rest}>
      {children}
    </Button>
  )
}
