import { Mark } from '../number/Mark.tsx'
import { Icon } from './Icon.tsx'
import { type Notice, useNoticeStore } from './notice-store.ts'

const words = { error: 'Error', caution: 'Caution', remark: 'Note' }

function NoticeLine({ notice }: { notice: Notice }) {
  const dismiss = useNoticeStore((state) => state.dismiss)
  return (
    <li className="notice" data-severity={notice.severity}>
      <Mark name={notice.severity} />
      <strong>{words[notice.severity]}</strong>
      <span className="notice-text">{notice.text}</span>
      {notice.actions?.map((action) => (
        <button key={action.name} type="button" className="button" onClick={() => action.run()}>
          {action.name}
        </button>
      ))}
      {!notice.lasting && (
        <button
          type="button"
          className="icon-button notice-close"
          aria-label="Close this note"
          onClick={() => dismiss(notice.id)}
        >
          <Icon name="close" size={12} />
        </button>
      )}
    </li>
  )
}

/** Lines below the strip, newest last. They take their own room and cover nothing. */
export function Notices() {
  const notices = useNoticeStore((state) => state.notices)
  return (
    <ul className="notices" aria-label="Notes" aria-live="polite">
      {notices.map((notice) => (
        <NoticeLine key={notice.id} notice={notice} />
      ))}
    </ul>
  )
}
