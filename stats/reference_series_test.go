package stats_test

// seriesDrivers drive the methods on one series: description, portmanteau,
// unit roots, stationarity, monotone trend.
var seriesDrivers = map[string]driver{}
