"""What the screens say: pure functions from state to rows of spans."""
