# What is installed: the library with its headers and package files (component development), the
# command with manual, completions and examples (component command). CPack makes a .deb of each.
include(CMakePackageConfigHelpers)
include(GNUInstallDirs)

set(steelyard_config_dir "${CMAKE_INSTALL_LIBDIR}/cmake/steelyard")
set(steelyard_package_files "${PROJECT_SOURCE_DIR}/src/cmake/package")

set_target_properties(steelyard PROPERTIES VERSION ${PROJECT_VERSION} SOVERSION ${PROJECT_VERSION_MAJOR})
install(TARGETS steelyard EXPORT steelyard
        ARCHIVE DESTINATION "${CMAKE_INSTALL_LIBDIR}" COMPONENT development
        LIBRARY DESTINATION "${CMAKE_INSTALL_LIBDIR}" COMPONENT development
        INCLUDES DESTINATION "${CMAKE_INSTALL_INCLUDEDIR}")
install(DIRECTORY "${PROJECT_SOURCE_DIR}/include/steelyard" DESTINATION "${CMAKE_INSTALL_INCLUDEDIR}"
        COMPONENT development)
install(EXPORT steelyard NAMESPACE steelyard:: FILE steelyard-targets.cmake
        DESTINATION "${steelyard_config_dir}" COMPONENT development)

configure_package_config_file("${steelyard_package_files}/steelyard-config.cmake.in"
                              "${PROJECT_BINARY_DIR}/steelyard-config.cmake"
                              INSTALL_DESTINATION "${steelyard_config_dir}")
write_basic_package_version_file("${PROJECT_BINARY_DIR}/steelyard-config-version.cmake"
                                 COMPATIBILITY SameMinorVersion)
# From the folder of the .pc file up to the prefix, so that the tree can be moved.
file(RELATIVE_PATH steelyard_pc_to_prefix "/${CMAKE_INSTALL_LIBDIR}/pkgconfig" "/")
configure_file("${steelyard_package_files}/steelyard.pc.in" "${PROJECT_BINARY_DIR}/steelyard.pc" @ONLY)
install(FILES "${PROJECT_BINARY_DIR}/steelyard-config.cmake"
              "${PROJECT_BINARY_DIR}/steelyard-config-version.cmake"
        DESTINATION "${steelyard_config_dir}" COMPONENT development)
install(FILES "${PROJECT_BINARY_DIR}/steelyard.pc" DESTINATION "${CMAKE_INSTALL_LIBDIR}/pkgconfig"
        COMPONENT development)

if(TARGET steelyard_command)
  set(native "${PROJECT_BINARY_DIR}/native")
  install(TARGETS steelyard_command RUNTIME DESTINATION "${CMAKE_INSTALL_BINDIR}" COMPONENT command)
  install(DIRECTORY "${native}/man/" DESTINATION "${CMAKE_INSTALL_MANDIR}/man1" COMPONENT command
          FILES_MATCHING PATTERN "*.1.gz")
  install(FILES "${native}/bash/steelyard" DESTINATION "${CMAKE_INSTALL_DATADIR}/bash-completion/completions"
          COMPONENT command)
  install(FILES "${native}/zsh/_steelyard" DESTINATION "${CMAKE_INSTALL_DATADIR}/zsh/vendor-completions"
          COMPONENT command)
  install(FILES "${native}/fish/steelyard.fish"
          DESTINATION "${CMAKE_INSTALL_DATADIR}/fish/vendor_completions.d" COMPONENT command)
  file(GLOB examples CONFIGURE_DEPENDS "${PROJECT_SOURCE_DIR}/datasets/*.csv")
  install(FILES ${examples} "${PROJECT_SOURCE_DIR}/datasets/README.md"
          DESTINATION "${CMAKE_INSTALL_DATADIR}/doc/steelyard/examples" COMPONENT command)
  install(DIRECTORY "${PROJECT_SOURCE_DIR}/docs/schema" DESTINATION "${CMAKE_INSTALL_DATADIR}/steelyard"
          COMPONENT command OPTIONAL)
endif()

include(SteelyardPackage)
