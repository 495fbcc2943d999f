export { BRANCHING_CAPTION, BranchingPicture } from "./branching-picture.tsx";
export { Button, Command, CommandLink } from "./command.tsx";
export { Dialog } from "./dialog.tsx";
export { Choice, Field } from "./field.tsx";
export { RunningHead, TailLine } from "./frame.tsx";
export { Mark } from "./mark.tsx";
export { NonceProvider, useNonce } from "./nonce.tsx";
export { NumberText } from "./number-text.tsx";
export { momentInWords, When } from "./when.tsx";
