export { ToastRegion } from './toast-region';
export { closeToast, showProblem, showToast, type ToastInput } from './toasts';
