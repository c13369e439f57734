import type { Preview, Request } from '../tools/tool';

/** What stays to be seen of a finished gesture while the person is asked about it. */
export function requestPreview(request: Request | null): Preview | null {
  switch (request?.kind) {
    case 'area':
      return { kind: 'polygon', points: [...request.points, request.points[0]!], pending: null };
    case 'face':
      return { kind: 'face', foot: request.foot, top: request.top, pending: null, waitsForTop: false };
    case 'tree':
      return { kind: 'tree', foot: request.foot, outline: request.outline, pending: null };
    case 'note':
      return { kind: 'place', at: request.at, mark: { kind: 'note' }, snapped: false };
    case 'scale-length':
      return { kind: 'scale', shape: 'length', points: [request.a, request.b], pending: null };
    case 'scale-rectangle':
      return { kind: 'scale', shape: 'rectangle', points: request.corners, pending: null };
    case 'confirm':
    case undefined:
      return null;
  }
}
