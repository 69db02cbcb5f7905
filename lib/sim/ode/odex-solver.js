// The package ships its TypeScript source, which a strict compiler does not accept; its types stand beside this file.
export { Solver } from 'odex';
