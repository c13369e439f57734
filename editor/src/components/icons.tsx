import type { ReactNode } from 'react';

/** Line icons on a 20-unit grid; always beside words or under an aria-label, so they are hidden themselves. */
function Icon({ children }: { children: ReactNode }) {
  return (
    <svg
      viewBox="0 0 20 20"
      width="18"
      height="18"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.6"
      strokeLinecap="round"
      strokeLinejoin="round"
      aria-hidden="true"
      focusable="false"
    >
      {children}
    </svg>
  );
}

export const JobsIcon = () => (
  <Icon>
    <path d="M3 5.5h14M3 10h14M3 14.5h9" />
  </Icon>
);
export const BoardIcon = () => (
  <Icon>
    <path d="M3.5 4h3.6v12H3.5zM8.2 4h3.6v7H8.2zM12.9 4h3.6v9.5h-3.6z" />
  </Icon>
);
export const NumbersIcon = () => (
  <Icon>
    <path d="M3.5 16.5h13M5.5 13v-2.5M10 13V7M14.5 13V4" />
  </Icon>
);
export const ClientsIcon = () => (
  <Icon>
    <circle cx="10" cy="7" r="3.2" />
    <path d="M3.8 16.5c.8-3 3.2-4.5 6.2-4.5s5.4 1.5 6.2 4.5" />
  </Icon>
);
export const CatalogueIcon = () => (
  <Icon>
    <path d="M5 9a5 5 0 0 1 10 0zM10 9v4.5M6.5 16.5h7M8 13.5h4" />
  </Icon>
);
export const CompanyIcon = () => (
  <Icon>
    <path d="M3.5 9 10 3.8 16.5 9v7.5h-13zM8 16.5v-4.5h4v4.5" />
  </Icon>
);
export const ChevronDown = () => (
  <Icon>
    <path d="m6 8 4 4 4-4" />
  </Icon>
);
export const ChevronLeft = () => (
  <Icon>
    <path d="m12 5-5 5 5 5" />
  </Icon>
);
export const ChevronRight = () => (
  <Icon>
    <path d="m8 5 5 5-5 5" />
  </Icon>
);
export const PlusIcon = () => (
  <Icon>
    <path d="M10 4.5v11M4.5 10h11" />
  </Icon>
);
export const SearchIcon = () => (
  <Icon>
    <circle cx="9" cy="9" r="5" />
    <path d="m13 13 3.5 3.5" />
  </Icon>
);
export const MoreIcon = () => (
  <Icon>
    <path d="M4.5 10h.01M10 10h.01M15.5 10h.01" strokeWidth="2.6" />
  </Icon>
);
export const CheckIcon = () => (
  <Icon>
    <path d="m4.5 10.5 3.5 3.5 7.5-8" />
  </Icon>
);
export const UploadIcon = () => (
  <Icon>
    <path d="M10 13.5v-9M6.5 7.5 10 4l3.5 3.5M4 16h12" />
  </Icon>
);
export const CloseIcon = () => (
  <Icon>
    <path d="m5 5 10 10M15 5 5 15" />
  </Icon>
);
