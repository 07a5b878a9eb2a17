"""Everything that reads or writes: project file, drawings, schedules, pictures, the command line."""
