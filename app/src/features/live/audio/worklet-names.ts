export const GENERATOR = 'benchlark-generator';
export const PRACTICE = 'benchlark-practice';
export const CAPTURE = 'benchlark-capture';
