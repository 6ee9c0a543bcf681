# Two Debian packages by CPack: tests/package/deb.sh makes them from a Release build and asks lintian.
set(CPACK_PACKAGE_NAME steelyard)
set(CPACK_PACKAGE_VENDOR "Steelyard")
set(CPACK_PACKAGE_CONTACT "Steelyard maintainers <maintainers@steelyard.invalid>")
set(CPACK_PACKAGE_VERSION "${PROJECT_VERSION}")
set(CPACK_RESOURCE_FILE_LICENSE "${PROJECT_SOURCE_DIR}/LICENSE")
set(CPACK_PACKAGING_INSTALL_PREFIX /usr)
set(CPACK_STRIP_FILES ON)
set(CPACK_GENERATOR DEB)
set(CPACK_COMPONENTS_ALL command development)
set(CPACK_COMPONENTS_GROUPING IGNORE)
set(CPACK_DEB_COMPONENT_INSTALL ON)
set(CPACK_DEBIAN_FILE_NAME DEB-DEFAULT)

set(CPACK_DEBIAN_COMMAND_PACKAGE_NAME steelyard)
set(CPACK_DEBIAN_COMMAND_PACKAGE_SECTION science)
set(CPACK_DEBIAN_COMMAND_PACKAGE_SHLIBDEPS ON)
set(CPACK_PACKAGE_DESCRIPTION_SUMMARY "weighs the evidence that papers print")
set(CPACK_COMPONENT_COMMAND_DESCRIPTION "Steelyard reads what publications report (a t value, group sizes, means and
SDs, a confidence interval, a p value) and says how strongly the printed
evidence, taken together, speaks for an effect, for no effect, or for an
effect that varies from study to study, how large the effect is, and whether
the printed numbers agree with each other.")

set(CPACK_DEBIAN_DEVELOPMENT_PACKAGE_NAME libsteelyard-dev)
set(CPACK_DEBIAN_DEVELOPMENT_PACKAGE_SECTION libdevel)
set(CPACK_DEBIAN_DEVELOPMENT_PACKAGE_DEPENDS "libfmt-dev")
set(CPACK_COMPONENT_DEVELOPMENT_DESCRIPTION "Steelyard rebuilds test statistics from what publications report and pools
their evidence with the exact likelihood. This package holds the headers, the
static library and the package files for CMake and pkg-config.")

# What Debian's policy asks of every package: copyright and changelog.
configure_file("${steelyard_package_files}/copyright.in" "${PROJECT_BINARY_DIR}/package/copyright" @ONLY)
configure_file("${steelyard_package_files}/changelog.in" "${PROJECT_BINARY_DIR}/package/changelog" @ONLY)
execute_process(COMMAND gzip -9nkf "${PROJECT_BINARY_DIR}/package/changelog" COMMAND_ERROR_IS_FATAL ANY)
foreach(pair "command;steelyard" "development;libsteelyard-dev")
  list(GET pair 0 component)
  list(GET pair 1 package)
  install(FILES "${PROJECT_BINARY_DIR}/package/copyright" "${PROJECT_BINARY_DIR}/package/changelog.gz"
          DESTINATION "${CMAKE_INSTALL_DATADIR}/doc/${package}" COMPONENT ${component})
endforeach()

include(CPack)
