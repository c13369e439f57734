import type { StoreApi } from 'zustand/vanilla';
import type { Mode, SessionState } from '../store/session';

/** Shows the sheet by day or by night, with what stands beside it then. */
export function setMode(session: StoreApi<SessionState>, mode: Mode): void {
  const { drawer } = session.getState();
  const gone = mode === 'night' ? 'profile' : 'light';
  session.setState({ mode, side: 'light', drawer: drawer === gone ? 'none' : drawer });
}

export function toggleMode(session: StoreApi<SessionState>): void {
  setMode(session, session.getState().mode === 'day' ? 'night' : 'day');
}
