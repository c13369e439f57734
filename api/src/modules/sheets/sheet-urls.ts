export const imageUrl = (sheetId: string): string => `/api/sheets/${sheetId}/image`;
export const thumbnailUrl = (sheetId: string): string => `/api/sheets/${sheetId}/thumbnail`;
