import { Component, type ReactNode } from "react";
import { type Problem, problemOf } from "../state/problem.ts";
import { ProblemNote } from "./problem-note.tsx";

/** Holds a fault of one part of the page to that part: the rest, and all results, stay. */
export class Catcher extends Component<{ children: ReactNode }, { problem: Problem | null }> {
  override state = { problem: null };

  static getDerivedStateFromError(error: unknown): { problem: Problem } {
    return { problem: problemOf("This part of the page broke down", error) };
  }

  override render(): ReactNode {
    const { problem } = this.state;
    return problem ? (
      <ProblemNote problem={problem} dismiss={() => this.setState({ problem: null })} />
    ) : (
      this.props.children
    );
  }
}
