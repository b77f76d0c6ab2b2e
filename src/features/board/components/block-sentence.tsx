const letter = 5.9;
const margins = 16;

/** Why a stretch is closed: in one line where it has the room, on two where it would be cut. */
export function BlockSentence(props: {
  text: string;
  /** Read out, but written already on the row above. */
  isSaid: boolean;
  width: number;
  hiddenLeft: number;
  room: number;
}) {
  if (props.isSaid) {
    return <span className="mp-hidden">{props.text}</span>;
  }
  const free = props.width - props.hiddenLeft + props.room - margins;
  return props.text.length * letter <= free ? (
    <span className="mp-board-sentence">{props.text}</span>
  ) : (
    <span className="mp-board-sentence mp-board-wrapped" style={{ maxWidth: free }}>
      {props.text}
    </span>
  );
}
