package stats_test

// modelDrivers drive the methods that relate series: correlation, regression
// and the checks on residuals.
var modelDrivers = map[string]driver{}
