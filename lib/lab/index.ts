export * from './model'
export { readLabFile } from './read-file'
export { readLabText } from './read-text'
