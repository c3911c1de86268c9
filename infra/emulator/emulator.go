// Package emulator runs the Lambda programs under AWS's runtime interface emulator, which speaks the same runtime interface as
// Lambda does. The tests need the build tag "deployment" and are run by .ci/run; they build everything they need with the flags of
// infra/build.sh and the versions of infra/tools.mod, and fail where they cannot.
//
// broken and empty are programs for these tests alone.
package emulator
