const TRAJECTORY =
  /^(traj(ectory|ectories)?|sample|run|seed|reali[sz]ation|replica|shot|walker|copy)([_ ]?(id|no|nr|num|number|index|idx))?$/i

/** Whether a column is called what numbers trajectories are called. */
export const isTrajectoryName = (name: string): boolean => TRAJECTORY.test(name.trim())
