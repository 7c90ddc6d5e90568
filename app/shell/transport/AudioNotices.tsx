// What the sound has to say: the guard, an interruption, a failure, a rate that could not be had. Each goes by itself when its cause does.
import { useState } from 'react'
import { restart, resumeFromGuard } from '../../audio/audition.ts'
import { useSession } from '../../state/session.ts'

export function AudioNotices() {
  const guard = useSession((s) => s.guard)
  const error = useSession((s) => s.error)
  const stopped = useSession((s) => s.status === 'failed' || s.status === 'interrupted')
  const remark = useSession((s) => s.remark)
  const held = useSession((s) => s.delaysHeld)
  const [readRemark, setReadRemark] = useState<string | null>(null)
  return (
    <section className="cw-audio-notices" aria-label="About the sound">
      {guard && (
        <Notice kind="alert" text={guard}>
          <button type="button" className="cw-button" onClick={resumeFromGuard}>
            Resume
          </button>
        </Notice>
      )}
      {error && (
        <Notice kind="alert" text={error}>
          <button type="button" className="cw-button" onClick={stopped ? restart : () => useSession.setState({ error: null })}>
            {stopped ? 'Restart' : 'Dismiss'}
          </button>
        </Notice>
      )}
      {held && (
        <Notice
          kind="note"
          text="A delay comes closer than its interpolator can read, or reaches past the line: it is held at the limit."
        />
      )}
      {remark && remark !== readRemark && (
        <Notice kind="note" text={sentence(remark)}>
          <button type="button" className="cw-button" onClick={() => setReadRemark(remark)}>
            Dismiss
          </button>
        </Notice>
      )}
    </section>
  )
}

const sentence = (text: string) => `${text.charAt(0).toUpperCase()}${text.slice(1)}.`

interface NoticeProps {
  readonly kind: 'alert' | 'note'
  readonly text: string
  readonly children?: React.ReactNode
}

const Notice = ({ kind, text, children }: NoticeProps) => (
  <div className="cw-audio-notice" data-kind={kind} role={kind === 'alert' ? 'alert' : 'status'}>
    <p>
      <span aria-hidden="true">{kind === 'alert' ? '■ ' : '· '}</span>
      {text}
    </p>
    {children}
  </div>
)
