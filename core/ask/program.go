package ask

// Version is the program's version, as "tailgap version" prints it.
const Version = "0.1.0"

// Program names the program and its version in an Answer.
const Program = "tailgap " + Version
